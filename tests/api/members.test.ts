import { eq } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { auditEvents, memberships, sessions } from '@/db/schema';
import { newFirm, newMember, newProject, newVersion, PASSWORD } from './firm';
import { lettersTo, tokenFor } from './letters-to';
import { db, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

const owners = async (firmId: string) =>
  (await (await db()).select().from(memberships).where(eq(memberships.firmId, firmId))).filter(
    ({ role }) => role === 'owner',
  );

test('the owner sees who is of the firm, in which role and on which projects', async () => {
  const owner = await newFirm();
  const { projectId } = await newProject(owner.visitor);
  const client = await newMember(owner.actor.firmId, 'client');
  const personId = client.actor.personId;
  await owner.visitor.post(`/api/projects/${projectId}/people`, { personId });
  const { people } = (await owner.visitor.get('/api/people')).body;
  expect(people).toHaveLength(2);
  const listed = people.find(({ id }: { id: string }) => id === personId);
  expect(listed).toMatchObject({
    email: client.email,
    role: 'client',
    projects: [{ id: projectId, name: 'Court' }],
  });
  expect(Date.parse(listed.lastSeenAt)).toBeGreaterThan(0);
});

test('a changed role holds from the next request on', async () => {
  const owner = await newFirm();
  const member = await newMember(owner.actor.firmId, 'installer');
  expect((await member.visitor.post('/api/projects', { name: 'Own' })).status).toBe(403);
  const url = `/api/people/${member.actor.personId}`;
  const changed = await owner.visitor.patch(url, { role: 'designer' });
  expect(changed).toMatchObject({ status: 200, body: { role: 'designer' } });
  expect((await member.visitor.post('/api/projects', { name: 'Own' })).status).toBe(201);
});

test('somebody removed is signed out at once and cannot come back in', async () => {
  const owner = await newFirm();
  const member = await newMember(owner.actor.firmId, 'designer');
  const { layoutId } = await newProject(member.visitor);
  const version = await newVersion(member.visitor, layoutId);
  const url = `/api/people/${member.actor.personId}`;
  expect((await owner.visitor.call('DELETE', url)).status).toBe(200);
  expect((await member.visitor.get('/api/account')).status).toBe(401);
  const rows = await (
    await db()
  )
    .select()
    .from(sessions)
    .where(eq(sessions.userId, member.actor.personId));
  expect(rows).toEqual([]);
  const again = await new Visitor().post('/api/sign-in', {
    email: member.email,
    password: PASSWORD,
  });
  expect(again.status).toBe(401);
  expect(again.body.detail).toMatch(/no longer of any firm/);
  // What they made stays, under their name.
  const kept = await owner.visitor.get(`/api/versions/${version.id}`);
  expect(kept.body.createdBy.id).toBe(member.actor.personId);
  expect((await lettersTo(member.email))[0].kind).toBe('removed');
});

test('removal ends no session in another firm of the person’s', async () => {
  const owner = await newFirm();
  const other = await newFirm();
  await owner.visitor.post('/api/invitations', { email: other.email, role: 'designer' });
  const here = new Visitor();
  const token = await tokenFor(other.email);
  await here.post('/api/accept-invitation', { token, password: PASSWORD });
  await owner.visitor.call('DELETE', `/api/people/${other.actor.personId}`);
  expect((await here.get('/api/account')).status).toBe(401);
  expect((await other.visitor.get('/api/account')).status).toBe(200);
});

test('somebody removed can be invited again, with the account they had', async () => {
  const owner = await newFirm();
  const member = await newMember(owner.actor.firmId, 'designer');
  await owner.visitor.call('DELETE', `/api/people/${member.actor.personId}`);
  await owner.visitor.post('/api/invitations', { email: member.email, role: 'installer' });
  const token = await tokenFor(member.email);
  const back = await new Visitor().post('/api/accept-invitation', { token, password: PASSWORD });
  expect(back.body).toMatchObject({ id: member.actor.personId, role: 'installer' });
});

test('the last owner can neither leave, nor be removed, nor take another role', async () => {
  const owner = await newFirm();
  const url = `/api/people/${owner.actor.personId}`;
  for (const answer of [
    await owner.visitor.post('/api/account/leave'),
    await owner.visitor.call('DELETE', url),
    await owner.visitor.patch(url, { role: 'designer' }),
  ]) {
    expect(answer.status).toBe(403);
    expect(answer.body.detail).toMatch(/needs an owner/);
  }
  const second = await newMember(owner.actor.firmId, 'designer');
  await owner.visitor.patch(`/api/people/${second.actor.personId}`, { role: 'owner' });
  expect((await owner.visitor.post('/api/account/leave')).status).toBe(200);
  expect((await owner.visitor.get('/api/account')).status).toBe(401);
});

test('two owners who take the role from each other at once leave one', async () => {
  for (let round = 0; round < 5; round += 1) {
    const first = await newFirm();
    const second = await newMember(first.actor.firmId, 'owner');
    const answers = await Promise.all([
      first.visitor.patch(`/api/people/${second.actor.personId}`, { role: 'designer' }),
      second.visitor.patch(`/api/people/${first.actor.personId}`, { role: 'designer' }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 403]);
    expect(await owners(first.actor.firmId)).toHaveLength(1);
  }
});

test('two owners who leave at once leave one', async () => {
  const first = await newFirm();
  const second = await newMember(first.actor.firmId, 'owner');
  const answers = await Promise.all([
    first.visitor.post('/api/account/leave'),
    second.visitor.post('/api/account/leave'),
  ]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 403]);
  expect(await owners(first.actor.firmId)).toHaveLength(1);
});

test('anybody may leave a firm, but takes nobody else along', async () => {
  const owner = await newFirm();
  const client = await newMember(owner.actor.firmId, 'client');
  const other = await newMember(owner.actor.firmId, 'client');
  const removed = await client.visitor.call('DELETE', `/api/people/${other.actor.personId}`);
  expect(removed.status).toBe(403);
  expect((await client.visitor.post('/api/account/leave')).status).toBe(200);
  expect((await client.visitor.get('/api/account')).status).toBe(401);
});

test('a designer puts an installer on a project and takes them off, and the installer is told', async () => {
  const owner = await newFirm();
  const designer = await newMember(owner.actor.firmId, 'designer');
  const installer = await newMember(owner.actor.firmId, 'installer');
  const { projectId } = await newProject(owner.visitor);
  const { personId } = installer.actor;
  const url = `/api/projects/${projectId}/people`;
  expect((await installer.visitor.get(`/api/projects/${projectId}`)).status).toBe(404);
  const before = (await designer.visitor.get(url)).body;
  expect(before.people).toEqual([]);
  expect(before.others).toMatchObject([{ id: personId, role: 'installer' }]);
  for (let twice = 0; twice < 2; twice += 1) {
    const put = await designer.visitor.post(url, { personId });
    expect(put.body.people).toMatchObject([{ id: personId, role: 'installer' }]);
  }
  expect((await lettersTo(installer.email)).map(({ kind }) => kind)).toEqual(['put-on-project']);
  expect((await installer.visitor.get(`/api/projects/${projectId}`)).status).toBe(200);
  expect((await designer.visitor.post(`${url}/remove`, { personId })).body.people).toEqual([]);
  expect((await installer.visitor.get(`/api/projects/${projectId}`)).status).toBe(404);
});

test('only installers and clients of the firm are put on projects', async () => {
  const owner = await newFirm();
  const stranger = await newFirm();
  const designer = await newMember(owner.actor.firmId, 'designer');
  const { projectId } = await newProject(owner.visitor);
  const url = `/api/projects/${projectId}/people`;
  for (const { actor } of [designer, stranger]) {
    const answer = await owner.visitor.post(url, { personId: actor.personId });
    expect(answer.status).toBe(422);
    expect(answer.body.errors[0].path).toEqual(['personId']);
  }
});

test('an owner changes the firm’s name and terms, on record', async () => {
  const owner = await newFirm();
  const terms = 'Half on acceptance, half when it lies.';
  const changed = await owner.visitor.patch('/api/firm', { name: ' Renamed ', terms });
  expect(changed.body).toMatchObject({ name: 'Renamed', terms });
  expect((await owner.visitor.get('/api/firm')).body).toEqual(changed.body);
  expect((await owner.visitor.get('/api/account')).body.firm.name).toBe('Renamed');
  const deeds = await (
    await db()
  )
    .select()
    .from(auditEvents)
    .where(eq(auditEvents.firmId, owner.actor.firmId));
  expect(deeds).toMatchObject([{ what: 'firm.changed', personId: owner.actor.personId }]);
});
