import { expect, test } from 'vitest';
import type { ClientChoices } from '@/api-types/choices';
import { acceptance, newOffice, versionThatIs, type Office } from './office';
import { useEmptyDatabase } from './site';
import type { Signed } from './firm';

useEmptyDatabase();

const path = ({ projectId }: Office) => `/api/projects/${projectId}/choices`;
const seenBy = async (who: Signed, office: Office): Promise<ClientChoices> =>
  (await who.visitor.get(path(office))).body;
const ids = ({ versions }: ClientChoices) => versions.map(({ id }) => id);

const threeShared = async (office: Office) => [
  await versionThatIs(office, 'shared'),
  await versionThatIs(office, 'shared'),
  await versionThatIs(office, 'shared'),
];

test('every shared version is a choice until a designer picks; a saved one never is', async () => {
  const office = await newOffice();
  const [first, second, third] = await threeShared(office);
  await versionThatIs(office, 'saved');
  const seen = await seenBy(office.client, office);
  expect(seen.picked).toBeNull();
  expect(ids(seen)).toEqual([first, second, third]);
});

test('a pick puts versions before the client in its order; those taken back are seen and not accepted', async () => {
  const office = await newOffice();
  const [first, second, third] = await threeShared(office);
  const picked = await office.designer.visitor.put(path(office), {
    versionIds: [third, first],
    note: 'The one we talked of first.',
  });
  expect(picked.status).toBe(200);
  expect(picked.body.others.map(({ id }: { id: string }) => id)).toEqual([second]);
  const seen = await seenBy(office.client, office);
  expect(ids(seen)).toEqual([third, first]);
  expect(seen.others).toEqual([]);
  expect(seen.picked).toMatchObject({
    note: 'The one we talked of first.',
    by: { id: office.designer.actor.personId },
  });

  const { visitor } = office.client;
  const agreement = (await visitor.get(`/api/versions/${second}/agreement`)).body;
  expect(agreement.steps.accept).toMatchObject({ may: false, why: expect.stringMatching(/back/) });
  expect(agreement.steps.askChange.may).toBe(true);
  const refused = await visitor.post(
    `/api/versions/${second}/accept`,
    await acceptance(office, second),
  );
  expect(refused.status).toBe(409);
  const still = await visitor.get(`/api/versions/${second}`);
  expect([still.status, still.body.state]).toEqual([200, 'shared']);
  const said = await visitor.post(`/api/versions/${second}/comments`, { body: 'A pity.' });
  expect(said.status).toBe(201);
  const accepted = await visitor.post(
    `/api/versions/${third}/accept`,
    await acceptance(office, third),
  );
  expect(accepted.status).toBe(200);
});

test('what is shared after a pick goes last among the choices, once', async () => {
  const office = await newOffice();
  const [first, second] = await threeShared(office);
  await office.designer.visitor.put(path(office), { versionIds: [second] });
  const late = await versionThatIs(office, 'shared');
  expect(ids(await seenBy(office.client, office))).toEqual([second, late]);
  // Shared again after a change was asked for, it stays where it was.
  await office.client.visitor.post(`/api/versions/${second}/ask-change`, { note: 'Lighter' });
  await office.designer.visitor.post(`/api/versions/${second}/share`);
  expect(ids(await seenBy(office.client, office))).toEqual([second, late]);
  // And one that was taken back is a choice again, by being shared again.
  await office.client.visitor.post(`/api/versions/${first}/ask-change`, { note: 'Darker' });
  await office.designer.visitor.post(`/api/versions/${first}/share`);
  expect(ids(await seenBy(office.client, office))).toEqual([second, late, first]);
});

test('giving the pick up makes every shared version a choice again', async () => {
  const office = await newOffice();
  const [first, second, third] = await threeShared(office);
  await office.designer.visitor.put(path(office), { versionIds: [second] });
  const opened = await office.owner.visitor.call('DELETE', path(office));
  expect(opened.status).toBe(200);
  expect(ids(await seenBy(office.client, office))).toEqual([first, second, third]);
  const accepted = await office.client.visitor.post(
    `/api/versions/${first}/accept`,
    await acceptance(office, first),
  );
  expect(accepted.status).toBe(200);
});

test('only shared versions of the project can be picked, each once, and at least one', async () => {
  const office = await newOffice();
  const other = await newOffice();
  const shared = await versionThatIs(office, 'shared');
  const saved = await versionThatIs(office, 'saved');
  const elsewhere = await versionThatIs(other, 'shared');
  for (const versionIds of [[shared, saved], [elsewhere], [shared, shared], ['no-such'], []]) {
    const refused = await office.designer.visitor.put(path(office), { versionIds });
    expect(refused.status).toBe(422);
    expect(refused.body.errors[0].path[0]).toBe('versionIds');
  }
  expect((await seenBy(office.client, office)).picked).toBeNull();
});

test('those who have the project open hear of a new pick', async () => {
  const office = await newOffice();
  const [first, second] = await threeShared(office);
  const live = async () =>
    (await office.client.visitor.get(`/api/projects/${office.projectId}/live`)).body;
  const before = await live();
  expect(before.choices).toBeNull();
  await office.designer.visitor.put(path(office), { versionIds: [first] });
  const picked = await live();
  expect(picked.stamp).not.toBe(before.stamp);
  await office.designer.visitor.put(path(office), { versionIds: [second] });
  expect((await live()).choices).not.toBe(picked.choices);
});

test('two picks at once leave one of the two, whole', async () => {
  const office = await newOffice();
  const [first, second, third] = await threeShared(office);
  await Promise.all([
    office.designer.visitor.put(path(office), { versionIds: [first, second] }),
    office.owner.visitor.put(path(office), { versionIds: [third, second] }),
  ]);
  expect([
    [first, second],
    [third, second],
  ]).toContainEqual(ids(await seenBy(office.client, office)));
});
