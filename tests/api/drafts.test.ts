import { sql } from 'drizzle-orm';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { setAsideDrafts } from '@/db/schema';
import { court, crossing, moved, newFirm, newMember, newProject, newVersion } from './firm';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

const start = async () => {
  const owner = await newFirm();
  const made = await newProject(owner.visitor);
  const other = await newMember(owner.actor.firmId, 'designer');
  return { owner, other, ...made, url: `/api/layouts/${made.layoutId}/draft` };
};

test('a new layout without a document starts from one that can be laid, in the person’s measures', async () => {
  const { visitor } = await newFirm();
  await visitor.patch('/api/account', { display: 'imperial' });
  const project = await visitor.post('/api/projects', { name: 'Empty' });
  const layout = await visitor.post(`/api/projects/${project.body.id}/layouts`, { name: 'First' });
  const { document } = (await visitor.get(`/api/layouts/${layout.body.id}/draft`)).body;
  expect(document.display).toBe('imperial');
  const report = await visitor.post('/api/report', { document });
  expect(report.body.report.wholeUnits).toBeGreaterThan(0);
});

test('each save counts the revision up by one and is what is read next', async () => {
  const { owner, url } = await start();
  const saved = await owner.visitor.put(url, { baseRevision: 1, document: moved(court(), 5) });
  expect(saved).toMatchObject({ status: 200, body: { revision: 2 } });
  const draft = (await owner.visitor.get(url)).body;
  expect(draft).toMatchObject({
    revision: 2,
    document: moved(court(), 5),
    savedBy: { id: owner.actor.personId },
    basedOn: null,
  });
});

test('a stale save is refused and both sides are kept and told', async () => {
  const { owner, other, url, layoutId } = await start();
  const theirs = moved(court(), 11);
  const mine = moved(court(), 22);
  await other.visitor.put(url, { baseRevision: 1, document: theirs });
  const refused = await owner.visitor.put(url, { baseRevision: 1, document: mine });
  expect(refused.status).toBe(409);
  expect(refused.headers.get('content-type')).toMatch(/problem\+json/);
  expect(refused.body.current).toMatchObject({ revision: 2, document: theirs });
  expect(refused.body.setAside).toMatchObject({ baseRevision: 1, layoutId });
  expect((await owner.visitor.get(url)).body.document).toEqual(theirs);
  const aside = await owner.visitor.get(`/api/set-aside/${refused.body.setAside.id}`);
  expect(aside.body.document).toEqual(mine);
  const list = await other.visitor.get(`/api/layouts/${layoutId}/set-aside`);
  expect(list.body.setAside).toEqual([refused.body.setAside]);
});

test('the same stale save sent again is kept once', async () => {
  const { owner, other, url, layoutId } = await start();
  await other.visitor.put(url, { baseRevision: 1, document: moved(court(), 11) });
  const body = { baseRevision: 1, document: moved(court(), 22) };
  const first = await owner.visitor.put(url, body);
  const second = await owner.visitor.put(url, body);
  expect(second.body.setAside).toEqual(first.body.setAside);
  const list = await owner.visitor.get(`/api/layouts/${layoutId}/set-aside`);
  expect(list.body.setAside).toHaveLength(1);
});

test('going on with one’s own side sets the other’s aside', async () => {
  const { owner, other, url } = await start();
  const theirs = moved(court(), 11);
  const mine = moved(court(), 22);
  await other.visitor.put(url, { baseRevision: 1, document: theirs });
  const taken = await owner.visitor.put(url, {
    baseRevision: 2,
    document: mine,
    setCurrentAside: true,
  });
  expect(taken.body.revision).toBe(3);
  const kept = await (await db()).select().from(setAsideDrafts);
  expect(kept.some(({ document }) => document.placement.origin[0] === 11)).toBe(true);
});

test('a save whose answer was lost may be sent again, by itself or with later work', async () => {
  const { owner, url } = await start();
  const tab = 'tab-of-owner';
  const save = (n: number, x: number) =>
    owner.visitor.put(url, {
      baseRevision: 1,
      document: moved(court(), x),
      tab: { id: tab, save: n },
    });
  expect((await save(1, 5)).body.revision).toBe(2);
  expect((await save(1, 5)).body.revision).toBe(2);
  expect((await save(2, 6)).body.revision).toBe(3);
});

test('a save held up on the way does not undo a later one of the same tab', async () => {
  const { owner, url } = await start();
  const tab = 'tab-of-owner';
  const save = (n: number, x: number) =>
    owner.visitor.put(url, {
      baseRevision: 1,
      document: moved(court(), x),
      tab: { id: tab, save: n },
    });
  await save(2, 6);
  expect((await save(1, 5)).status).toBe(200);
  expect((await owner.visitor.get(url)).body.document).toEqual(moved(court(), 6));
});

test('a draft may be half drawn, but must have the shape of a document', async () => {
  const { owner, url } = await start();
  const half = await owner.visitor.put(url, { baseRevision: 1, document: crossing() });
  expect(half.status).toBe(200);
  const shapeless = await owner.visitor.put(url, {
    baseRevision: 2,
    document: { ...court(), clearance: 'wide' },
  });
  expect(shapeless.status).toBe(422);
  expect(shapeless.body.errors[0].path).toEqual(['document', 'clearance']);
});

test('a draft started from a version takes its document and sets aside what it held', async () => {
  const { owner, url, layoutId } = await start();
  const version = await newVersion(owner.visitor, layoutId);
  await owner.visitor.put(url, { baseRevision: 1, document: moved(court(), 77) });
  const stale = await owner.visitor.post(`${url}/from-version`, {
    versionId: version.id,
    baseRevision: 1,
  });
  expect(stale.status).toBe(409);
  const begun = await owner.visitor.post(`${url}/from-version`, {
    versionId: version.id,
    baseRevision: 2,
  });
  expect(begun.body).toMatchObject({
    revision: 3,
    document: court(),
    basedOn: { id: version.id, number: 1 },
  });
  const [aside] = (await owner.visitor.get(`/api/layouts/${layoutId}/set-aside`)).body.setAside;
  const kept = await owner.visitor.get(`/api/set-aside/${aside.id}`);
  expect(kept.body.document).toEqual(moved(court(), 77));
});

test('a draft cannot start from a version of another layout', async () => {
  const { owner, url } = await start();
  const elsewhere = await newProject(owner.visitor);
  const version = await newVersion(owner.visitor, elsewhere.layoutId);
  const answer = await owner.visitor.post(`${url}/from-version`, {
    versionId: version.id,
    baseRevision: 1,
  });
  expect(answer.status).toBe(404);
});

test('whatever two people save, in whatever order, every document is the draft, was the draft, or is set aside', async () => {
  const { owner, other, url, layoutId } = await start();
  let stamp = 1000;
  await fc.assert(
    fc.asyncProperty(
      fc.array(fc.record({ mine: fc.boolean(), behind: fc.nat(2) }), {
        minLength: 1,
        maxLength: 8,
      }),
      async (saves) => {
        for (const { mine, behind } of saves) {
          const { revision } = (await owner.visitor.get(url)).body;
          const document = moved(court(), (stamp += 1));
          const baseRevision = Math.max(1, revision - behind);
          const answer = await (mine ? owner : other).visitor.put(url, { baseRevision, document });
          if (baseRevision === revision) {
            expect(answer.body.revision).toBe(revision + 1);
            expect((await owner.visitor.get(url)).body.document).toEqual(document);
          } else {
            expect(answer.status).toBe(409);
            const id = answer.body.setAside.id;
            expect((await owner.visitor.get(`/api/set-aside/${id}`)).body.document).toEqual(
              document,
            );
            expect((await owner.visitor.get(url)).body.revision).toBe(revision);
          }
        }
      },
    ),
    { numRuns: 15 },
  );
  const [{ n }] = await (
    await db()
  )
    .select({ n: sql<number>`count(*)`.mapWith(Number) })
    .from(setAsideDrafts)
    .where(sql`${setAsideDrafts.layoutId} = ${layoutId}`);
  expect(n).toBe(
    (await owner.visitor.get(`/api/layouts/${layoutId}/set-aside`)).body.setAside.length,
  );
});

test('of many saves at once from one revision exactly one is stored', async () => {
  const { owner, other, url, layoutId } = await start();
  const answers = await Promise.all(
    Array.from({ length: 8 }, (_, n) =>
      (n % 2 ? owner : other).visitor.put(url, {
        baseRevision: 1,
        document: moved(court(), 500 + n),
      }),
    ),
  );
  expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  expect(answers.filter(({ status }) => status === 409)).toHaveLength(7);
  const list = await owner.visitor.get(`/api/layouts/${layoutId}/set-aside`);
  expect(list.body.setAside).toHaveLength(7);
});
