import { createHash } from 'node:crypto';
import { sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { layFloor } from '@/paving/laying';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { floorReport } from '@/paving/report';
import { ROUND_TERRACE, SIDE_YARD } from '@/server/demo-layouts';
import { court, crossing, moved, newFirm, newProject, newVersion, putEvent } from './firm';
import { db, endpoints, useEmptyDatabase } from './site';

useEmptyDatabase();

const start = async (document = court()) => {
  const owner = await newFirm();
  const made = await newProject(owner.visitor, document);
  return { ...owner, ...made, url: `/api/layouts/${made.layoutId}/versions` };
};

/** The report as the browser computes it, as JSON carries it. */
const ownReport = (document: unknown) => {
  const parsed = parseLayoutDocument(document);
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.problems));
  return JSON.parse(JSON.stringify(floorReport(layFloor(parsed.document))));
};

test.each([
  ['the court', court()],
  ['the round terrace', ROUND_TERRACE],
  ['the side yard', SIDE_YARD],
])('the report of %s through the API is the core’s own', async (_name, document) => {
  const { visitor, url } = await start(document);
  const report = await visitor.post('/api/report', { document });
  expect(report.body.report).toEqual(ownReport(document));
  const version = await visitor.post(url, { baseRevision: 1, label: 'One' });
  expect(version.body.report).toEqual(ownReport(document));
  const { edges, ...figures } = ownReport(document);
  expect(version.body.figures).toEqual(figures);
  expect(edges.length).toBeGreaterThan(0);
});

test('a version cut at its edge keeps its pieces, and lists carry only what they come to', async () => {
  const document = { ...court(), cutting: 'edge' as const };
  const { visitor, url } = await start(document);
  const saved = (await visitor.post(url, { baseRevision: 1, label: 'Cut' })).body;
  const { edges: _, cut, ...figures } = ownReport(document);
  const { pieces, ...sums } = cut;
  expect(saved.report.cut.pieces).toEqual(pieces);
  expect(pieces.length).toBe(sums.count);
  expect(saved.figures).toEqual({ ...figures, cut: sums });
  const list = (await visitor.get(url)).body.versions;
  expect(list[0].figures).toEqual({ ...figures, cut: sums });
});

test('a version holds the document, the figures, who, when and the event of its saving', async () => {
  const { visitor, actor, url } = await start();
  const saved = await visitor.post(url, { baseRevision: 1, label: ' First ', note: 'As measured' });
  expect(saved.status).toBe(201);
  const version = (await visitor.get(`/api/versions/${saved.body.id}`)).body;
  expect(version).toEqual(saved.body);
  expect(version).toMatchObject({
    number: 1,
    label: 'First',
    note: 'As measured',
    state: 'saved',
    document: court(),
    createdBy: { id: actor.personId },
    events: [{ kind: 'saved', person: { id: actor.personId } }],
  });
  expect(Date.now() - Date.parse(version.createdAt)).toBeLessThan(60_000);
});

test('figures that the browser sends along are not believed', async () => {
  const { visitor, url } = await start();
  const saved = await visitor.post(url, {
    baseRevision: 1,
    label: 'One',
    report: { wholeUnits: 1_000_000 },
    fingerprint: 'f'.repeat(64),
  });
  expect(saved.body.report).toEqual(ownReport(court()));
});

test('the fingerprint is the SHA-256 of the document’s canonical JSON, and changes with it', async () => {
  const { visitor, url, layoutId } = await start();
  const first = (await visitor.post(url, { baseRevision: 1, label: 'One' })).body;
  // Members sorted by hand for this one document: an independent writing of RFC 8785's rule.
  const sorted = (value: unknown): unknown =>
    Array.isArray(value)
      ? value.map(sorted)
      : value && typeof value === 'object'
        ? Object.fromEntries(
            Object.keys(value)
              .sort()
              .map((name) => [name, sorted((value as Record<string, unknown>)[name])]),
          )
        : value;
  const expected = createHash('sha256')
    .update(JSON.stringify(sorted(first.document)))
    .digest('hex');
  expect(first.fingerprint).toBe(expected);
  expect(first.shortFingerprint).toBe(expected.slice(0, 10));
  await visitor.put(`/api/layouts/${layoutId}/draft`, {
    baseRevision: 1,
    document: moved(court(), 396.81),
  });
  const second = (await visitor.post(url, { baseRevision: 2, label: 'Two' })).body;
  expect(second.fingerprint).not.toBe(first.fingerprint);
});

test('a draft that cannot be laid is refused with the paths and the place, and no version is made', async () => {
  const { visitor, url } = await start(crossing());
  const refused = await visitor.post(url, { baseRevision: 1, label: 'One' });
  expect(refused.status).toBe(422);
  expect(refused.headers.get('content-type')).toMatch(/problem\+json/);
  const [error] = refused.body.errors;
  expect(error.path.slice(0, 2)).toEqual(['ground', 'perimeter']);
  // The diagonals of a 4000 × 3000 rectangle cross at its middle.
  expect(error.at[0]).toBeCloseTo(2000, 3);
  expect(error.at[1]).toBeCloseTo(1500, 3);
  expect((await visitor.get(url)).body.versions).toEqual([]);
});

test('a version is made only of the draft that the person saw', async () => {
  const { visitor, url, layoutId } = await start();
  await visitor.put(`/api/layouts/${layoutId}/draft`, {
    baseRevision: 1,
    document: moved(court(), 1),
  });
  expect((await visitor.post(url, { baseRevision: 1, label: 'One' })).status).toBe(409);
  expect((await visitor.get(url)).body.versions).toEqual([]);
});

test('a request sent twice saves once', async () => {
  const { visitor, url } = await start();
  const body = { baseRevision: 1, label: 'One', requestId: 'request-0001' };
  const first = await visitor.post(url, body);
  const again = await visitor.post(url, body);
  expect(again.body).toEqual(first.body);
  const both = await Promise.all(
    [1, 2].map(() => visitor.post(url, { ...body, requestId: 'request-0002' })),
  );
  expect(both[0].body.id).toBe(both[1].body.id);
  expect((await visitor.get(url)).body.versions).toHaveLength(2);
});

test('versions saved at once get the numbers that follow, each once', async () => {
  const { visitor, url } = await start();
  const answers = await Promise.all(
    Array.from({ length: 6 }, (_, n) =>
      visitor.post(url, { baseRevision: 1, label: `Label ${n}` }),
    ),
  );
  expect(answers.map(({ body }) => body.number).sort()).toEqual([1, 2, 3, 4, 5, 6]);
  const listed = (await visitor.get(url)).body.versions;
  expect(listed.map(({ number }: { number: number }) => number)).toEqual([6, 5, 4, 3, 2, 1]);
});

test('no endpoint, by any method, alters or deletes a version', async () => {
  const { visitor, url, layoutId, projectId } = await start();
  const version = await newVersion(visitor, layoutId);
  const before = (await visitor.get(`/api/versions/${version.id}`)).body;
  const body = {
    id: version.id,
    versionId: version.id,
    baseRevision: 1,
    label: 'Altered',
    note: 'Altered',
    name: 'Altered',
    number: 1,
    document: moved(court(), 9),
    report: {},
    archived: true,
  };
  for (const address of endpoints.keys()) {
    if (address === '/api/sign-out') continue;
    for (const method of ['POST', 'PUT', 'PATCH', 'DELETE']) {
      for (const id of [version.id, layoutId, projectId]) {
        await visitor.call(method, address.replace('[id]', id), body);
      }
    }
  }
  const after = (await visitor.get(`/api/versions/${version.id}`)).body;
  // Names of people, project and layout are theirs to change; what the version froze is not.
  const frozen = (version: typeof before) => [
    version.number,
    version.label,
    version.note,
    version.document,
    version.report,
    version.fingerprint,
    version.createdAt,
    // Steps, such as sharing it, add to what happened; what had happened stays.
    version.events
      .slice(0, before.events.length)
      .map(({ kind, at, note }: typeof before) => [kind, at, note]),
  ];
  expect(frozen(after)).toEqual(frozen(before));
  expect((await visitor.get(url)).body.versions.at(-1).id).toBe(version.id);
});

test.each([
  ['update versions set note = $$altered$$'],
  ['delete from version_events'],
  ['update version_events set note = $$altered$$'],
  ['delete from versions'],
  ['truncate versions cascade'],
  ['truncate version_events cascade'],
])('the database itself refuses: %s', async (statement) => {
  const { visitor, layoutId } = await start();
  await newVersion(visitor, layoutId);
  await expect((await db()).execute(sql.raw(statement))).rejects.toMatchObject({
    cause: { message: expect.stringMatching(/never altered or deleted/) },
  });
});

test('a version’s state is its last event’s', async () => {
  const { visitor, actor, url, layoutId } = await start();
  const { id } = await newVersion(visitor, layoutId);
  await putEvent(actor, id, 'shared', 'Have a look');
  await putEvent(actor, id, 'issued');
  const version = (await visitor.get(`/api/versions/${id}`)).body;
  expect(version.state).toBe('issued');
  expect(version.events.map(({ kind }: { kind: string }) => kind)).toEqual([
    'saved',
    'shared',
    'issued',
  ]);
  expect((await visitor.get(url)).body.versions[0].state).toBe('issued');
  const project = (await visitor.get('/api/projects')).body.projects[0];
  expect(project).toMatchObject({ stage: 'issued', layouts: 1 });
});
