import { expect, test } from 'vitest';
import { putOnProject } from '@/server/projects';
import { court, moved, newVersion } from './firm';
import { newOffice, versionThatIs, type Office } from './office';
import { db, useEmptyDatabase } from './site';

useEmptyDatabase();

const newProjectOf = async ({ designer }: Office): Promise<string> =>
  (await designer.visitor.post('/api/projects', { name: 'Another' })).body.id;

const change = ({ designer, layoutId }: Office, body: unknown) =>
  designer.visitor.patch(`/api/layouts/${layoutId}`, body);

test('a layout is duplicated from its draft or from a version, here or in another project', async () => {
  const office = await newOffice();
  const { designer, layoutId, projectId } = office;
  const version = await newVersion(designer.visitor, layoutId);
  await designer.visitor.put(`/api/layouts/${layoutId}/draft`, {
    baseRevision: 1,
    document: moved(court(), 9),
  });
  const url = `/api/layouts/${layoutId}/duplicate`;
  const copy = await designer.visitor.post(url, {});
  expect(copy.status).toBe(201);
  expect(copy.body).toMatchObject({
    name: 'Copy of Chequer',
    projectId,
    versions: 0,
    document: moved(court(), 9),
  });
  const other = await newProjectOf(office);
  const named = { name: 'First idea', projectId: other, versionId: version.id };
  expect((await designer.visitor.post(url, named)).body).toMatchObject({
    name: 'First idea',
    projectId: other,
    document: court(),
  });
  expect((await designer.visitor.post(url, { versionId: 'none' })).status).toBe(404);
  expect(
    (await designer.visitor.post(url, { projectId: office.stranger.actor.firmId })).status,
  ).toBe(404);
  // The first is as it was.
  expect((await designer.visitor.get(`/api/layouts/${layoutId}`)).body).toMatchObject({
    versions: 1,
    name: 'Chequer',
  });
});

test('a layout is renamed, archived and restored; an archived one counts no more in its project', async () => {
  const office = await newOffice();
  const { designer, projectId } = office;
  await versionThatIs(office, 'shared');
  const project = async () => {
    const { projects } = (await designer.visitor.get('/api/projects')).body;
    return projects.find(({ id }: { id: string }) => id === projectId);
  };
  expect((await change(office, { name: ' Chequer two ' })).body.name).toBe('Chequer two');
  expect(await project()).toMatchObject({ layouts: 1, stage: 'shared' });
  expect((await change(office, { archived: true })).body.archivedAt).not.toBeNull();
  expect(await project()).toMatchObject({ layouts: 0, stage: 'draft', document: null });
  const ofClient = (await office.client.visitor.get('/api/projects')).body.projects[0];
  expect(ofClient).toMatchObject({ layouts: 0, stage: 'draft', document: null });
  expect((await change(office, { archived: false })).body.archivedAt).toBeNull();
  expect(await project()).toMatchObject({ layouts: 1, stage: 'shared' });
});

test('a layout that only the firm has seen moves, with its versions and comments', async () => {
  const office = await newOffice();
  const { designer, layoutId, projectId } = office;
  const version = await versionThatIs(office, 'saved');
  await designer.visitor.post(`/api/versions/${version}/comments`, { body: 'Ours', pin: [5, 6] });
  const other = await newProjectOf(office);
  expect((await change(office, { projectId: other })).body.projectId).toBe(other);
  expect((await designer.visitor.get(`/api/versions/${version}`)).body.projectId).toBe(other);
  const { threads } = (await designer.visitor.get(`/api/layouts/${layoutId}/comments`)).body;
  expect(threads).toMatchObject([{ projectId: other, pin: [5, 6] }]);
  const left = (await designer.visitor.get(`/api/projects/${projectId}`)).body;
  expect(left).toMatchObject({ layouts: [], stage: 'draft' });
  expect((await designer.visitor.get(`/api/projects/${other}`)).body).toMatchObject({
    stage: 'saved',
  });
});

test('one that was shared stays among those who have seen it', async () => {
  const office = await newOffice();
  const { firmId } = office.owner.actor;
  const version = await versionThatIs(office, 'shared');
  const other = await newProjectOf(office);
  await putOnProject(await db(), firmId, other, office.clientElsewhere.actor.personId);
  const refused = await change(office, { projectId: other });
  expect(refused.status).toBe(422);
  expect(refused.body.detail).toContain('Duplicate');
  expect((await office.clientElsewhere.visitor.get(`/api/versions/${version}`)).status).toBe(404);
  const same = await newProjectOf(office);
  for (const { actor } of [office.installer, office.client]) {
    await putOnProject(await db(), firmId, same, actor.personId);
  }
  expect((await change(office, { projectId: same })).status).toBe(200);
  expect((await office.client.visitor.get(`/api/versions/${version}`)).body.projectId).toBe(same);
});

test('a layout moves to no project of another firm, and to none that there is not', async () => {
  const office = await newOffice();
  const theirs = (await office.stranger.visitor.post('/api/projects', { name: 'Theirs' })).body.id;
  const bodies = [];
  for (const projectId of [theirs, 'nowhere']) {
    const answer = await change(office, { projectId });
    expect(answer.status).toBe(422);
    bodies.push(answer.body);
  }
  expect(bodies[0]).toEqual(bodies[1]);
});
