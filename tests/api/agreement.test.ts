import { eq, sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { firms, people } from '@/db/schema';
import { fingerprintOf } from '@/server/fingerprint';
import { court, newVersion } from './firm';
import { acceptance, letters, newOffice, versionThatIs } from './office';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

test('an acceptance keeps the typed name, the terms as shown, the fingerprint, who and when', async () => {
  const office = await newOffice();
  const terms = 'We lay the floor as drawn.\nBalance on the last day.';
  await (await db()).update(firms).set({ terms }).where(eq(firms.id, office.owner.actor.firmId));
  const id = await versionThatIs(office, 'shared');
  const shown = (await office.client.visitor.get(`/api/versions/${id}/agreement`)).body;
  expect(shown).toMatchObject({ terms, acceptance: null, state: 'shared' });
  expect(shown.fingerprint).toBe(fingerprintOf(court()));
  const before = Date.now();
  const accepted = await office.client.visitor.post(`/api/versions/${id}/accept`, {
    typedName: ' Odile Marrow ',
    fingerprint: shown.fingerprint,
    terms: shown.terms,
    note: 'Go ahead',
  });
  expect(accepted.status).toBe(200);
  // The firm's terms move on; what was agreed to does not.
  await (
    await db()
  )
    .update(firms)
    .set({ terms: 'Other terms' })
    .where(eq(firms.id, office.owner.actor.firmId));
  for (const { visitor } of [office.client, office.owner]) {
    const record = (await visitor.get(`/api/versions/${id}/acceptance`)).body;
    expect(record).toEqual(accepted.body);
    expect(record).toMatchObject({
      typedName: 'Odile Marrow',
      terms,
      fingerprint: shown.fingerprint,
      person: { id: office.client.actor.personId },
      number: 1,
    });
    expect(Date.parse(record.at)).toBeGreaterThanOrEqual(before - 1);
    expect(Date.parse(record.at)).toBeLessThanOrEqual(Date.now() + 1);
  }
});

test('what was not shown cannot be accepted: other terms, another fingerprint, no name', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const url = `/api/versions/${id}/accept`;
  const shown = await acceptance(office, id);
  await (
    await db()
  )
    .update(firms)
    .set({ terms: 'New terms' })
    .where(eq(firms.id, office.owner.actor.firmId));
  const stale = await office.client.visitor.post(url, shown);
  expect(stale.status).toBe(409);
  expect(stale.body.terms).toBe('New terms');
  const fresh = { ...shown, terms: 'New terms' };
  const other = { ...fresh, fingerprint: fingerprintOf({ ...court(), clearance: 7 }) };
  expect((await office.client.visitor.post(url, other)).status).toBe(409);
  expect((await office.client.visitor.post(url, { ...fresh, typedName: '  ' })).status).toBe(422);
  expect((await office.client.visitor.get(`/api/versions/${id}`)).body.state).toBe('shared');
  expect((await office.client.visitor.get(`/api/versions/${id}/acceptance`)).status).toBe(404);
  expect((await office.client.visitor.post(url, fresh)).status).toBe(200);
});

test('accepted by five browsers at once, it is accepted once, with one record and one letter to each', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const body = await acceptance(office, id);
  const answers = await Promise.all(
    Array.from({ length: 5 }, () => office.client.visitor.post(`/api/versions/${id}/accept`, body)),
  );
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409, 409]);
  const events = (await office.owner.visitor.get(`/api/versions/${id}`)).body.events;
  expect(events.map(({ kind }: { kind: string }) => kind)).toEqual(['saved', 'shared', 'accepted']);
  const written = await letters(office.owner.actor.firmId, 'version-accepted');
  expect(written.map(({ to }) => to).sort()).toEqual(
    [office.designer.email, office.owner.email].sort(),
  );
});

test('two versions issued at once leave one issued and the other superseded', async () => {
  const office = await newOffice();
  const ids = [await versionThatIs(office, 'accepted'), await versionThatIs(office, 'accepted')];
  const answers = await Promise.all(
    ids.map((id) => office.owner.visitor.post(`/api/versions/${id}/issue`)),
  );
  expect(answers.map(({ status }) => status)).toEqual([200, 200]);
  const states = await Promise.all(
    ids.map(async (id) => (await office.owner.visitor.get(`/api/versions/${id}`)).body.state),
  );
  expect(states.sort()).toEqual(['issued', 'superseded']);
});

test('issuing another version says which plan to put away, to the crew and to the client', async () => {
  const office = await newOffice();
  const first = await versionThatIs(office, 'issued');
  const second = await versionThatIs(office, 'issued');
  const { firmId } = office.owner.actor;
  const [one, other] = [0, 2].map((n) => letters(firmId, 'version-issued').then((all) => all[n]));
  expect((await one).text).not.toContain('takes the place');
  expect((await other).text).toMatch(/takes the place of version 1/);
  expect((await other).text).toContain(`/versions/${second}`);
  expect((await other).html).toContain(`/versions/${second}`);
  for (const { visitor } of [office.installer, office.client, office.owner]) {
    const old = (await visitor.get(`/api/versions/${first}/agreement`)).body;
    expect(old).toMatchObject({ state: 'superseded', issued: { id: second, number: 2 } });
  }
});

test('versions of other layouts are left as they are when one is issued', async () => {
  const office = await newOffice();
  const first = await versionThatIs(office, 'issued');
  const layout = await office.designer.visitor.post(`/api/projects/${office.projectId}/layouts`, {
    name: 'Other',
    document: court(),
  });
  await versionThatIs(office, 'issued', layout.body.id);
  expect((await office.owner.visitor.get(`/api/versions/${first}`)).body.state).toBe('issued');
});

test('a change asked for with pins begins a thread at each spot, to the hundredth of a millimetre', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'shared');
  const pins = [
    { at: [1234.56, -78.9], body: 'Nearer to the gate' },
    { at: [0, 0], body: 'Start here' },
  ];
  const asked = await office.client.visitor.post(`/api/versions/${id}/ask-change`, {
    note: 'Two things',
    pins,
  });
  expect(asked.body).toMatchObject({ state: 'change_asked' });
  const { threads } = (await office.designer.visitor.get(`/api/versions/${id}/comments`)).body;
  expect(
    threads.map(({ pin, comments }: never) => ({
      at: pin,
      body: (comments as { body: string }[])[0].body,
    })),
  ).toEqual(pins);
  const [letter] = await letters(office.owner.actor.firmId, 'version-change-asked');
  expect(letter.text).toContain('Two things');
});

test('the steps that a person may take are told with why not the others', async () => {
  const office = await newOffice();
  const id = await versionThatIs(office, 'accepted');
  const may = async (who: 'owner' | 'client') => {
    const { steps } = (await office[who].visitor.get(`/api/versions/${id}/agreement`)).body;
    for (const { may, why } of Object.values<{ may: boolean; why: string | null }>(steps)) {
      expect(may).toBe(why === null);
    }
    return Object.keys(steps).filter((step) => steps[step].may);
  };
  expect(await may('owner')).toEqual(['issue']);
  expect(await may('client')).toEqual([]);
});

test('whoever does not want letters about steps gets none', async () => {
  const office = await newOffice();
  await (
    await db()
  )
    .update(people)
    .set({ mailSteps: false })
    .where(eq(people.id, office.client.actor.personId));
  await versionThatIs(office, 'shared');
  expect(await letters(office.owner.actor.firmId, 'version-shared')).toEqual([]);
});

test.each(['update acceptances set typed_name = $$x$$', 'delete from acceptances'])(
  'the database refuses: %s',
  async (statement) => {
    const office = await newOffice();
    await versionThatIs(office, 'accepted');
    await expect((await db()).execute(sql.raw(statement))).rejects.toMatchObject({
      cause: { message: expect.stringMatching(/never altered or deleted/) },
    });
  },
);

test('the timeline tells everybody what they may see, newest first, page by page', async () => {
  const office = await newOffice();
  const issued = await versionThatIs(office, 'issued');
  await office.client.visitor.post(`/api/versions/${issued}/comments`, {
    body: 'Lovely',
    pin: [1, 2],
  });
  await newVersion(office.designer.visitor, office.layoutId, 'Only saved');
  const url = `/api/projects/${office.projectId}/timeline`;
  const told = async (who: 'owner' | 'installer' | 'client') =>
    (await office[who].visitor.get(url)).body.entries.map(({ kind }: { kind: string }) => kind);
  const seen = ['commented', 'issued', 'accepted', 'shared', 'saved'];
  expect(await told('owner')).toEqual(['saved', ...seen]);
  expect(await told('installer')).toEqual(seen);
  expect(await told('client')).toEqual(seen);
  const all = (await office.owner.visitor.get(url)).body;
  const paged: unknown[] = [];
  for (let next: string | null = ''; next !== null;) {
    const page: { entries: unknown[]; next: string | null } = (
      await office.owner.visitor.get(`${url}?size=2&after=${next}`)
    ).body;
    expect(page.entries.length).toBeLessThanOrEqual(2);
    paged.push(...page.entries);
    next = page.next;
  }
  expect(paged).toEqual(all.entries);
  expect((await office.owner.visitor.get(`/api/layouts/${office.layoutId}/timeline`)).body).toEqual(
    all,
  );
});

test('two versions are compared in figures and units; versions of two projects are not', async () => {
  const office = await newOffice();
  const one = await versionThatIs(office, 'shared');
  const other = await versionThatIs(office, 'shared');
  const { body } = await office.client.visitor.get(`/api/comparison?a=${one}&b=${other}`);
  const whole = body.a.report.wholeUnits;
  expect(body.units).toEqual({ kept: whole, moved: 0, gone: 0, added: 0 });
  expect(body.figures.wholeUnits).toEqual({ a: whole, b: whole, change: 0 });
  const elsewhere = await office.designer.visitor.post('/api/projects', { name: 'Elsewhere' });
  const layout = await office.designer.visitor.post(`/api/projects/${elsewhere.body.id}/layouts`, {
    name: 'Other',
    document: court(),
  });
  const far = await newVersion(office.designer.visitor, layout.body.id);
  const refused = await office.designer.visitor.get(`/api/comparison?a=${one}&b=${far.id}`);
  expect(refused.status).toBe(422);
  expect((await office.designer.visitor.get(`/api/comparison?a=${one}`)).status).toBe(422);
});
