import { and, eq, sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { auditEvents, invitations, memberships, outbox, people } from '@/db/schema';
import { INVITATIONS_AN_HOUR } from '@/server/invitations';
import { newFirm, newMember, newProject, PASSWORD } from './firm';
import { lettersTo, tokenFor } from './letters-to';
import { db, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

let addresses = 0;
const newAddress = () => `guest${(addresses += 1)}@elsewhere.example`;

const start = async () => {
  const owner = await newFirm();
  return { owner, email: newAddress() };
};

const accept = (token: string, body: Record<string, unknown> = {}, visitor = new Visitor()) =>
  visitor.post('/api/accept-invitation', { token, name: 'Guest', password: PASSWORD, ...body });

test('an invitation’s letter brings a new person into the firm in the role, signed in', async () => {
  const { owner, email } = await start();
  const invited = await owner.visitor.post('/api/invitations', { email, role: 'designer' });
  expect(invited.status).toBe(201);
  expect(invited.body).toMatchObject({ email, role: 'designer', project: null, letter: 'waiting' });
  const visitor = new Visitor();
  const accepted = await accept(await tokenFor(email), { display: 'imperial' }, visitor);
  expect(accepted.status).toBe(200);
  expect(accepted.body).toMatchObject({
    email,
    name: 'Guest',
    role: 'designer',
    display: 'imperial',
    firm: { id: owner.actor.firmId },
  });
  expect((await visitor.get('/api/account')).body).toEqual(accepted.body);
  expect((await owner.visitor.get('/api/invitations')).body.invitations).toEqual([]);
  const again = await new Visitor().post('/api/sign-in', { email, password: PASSWORD });
  expect(again.status).toBe(200);
});

test('the letter says who invites, to what, and is readable in both parts', async () => {
  const { owner, email } = await start();
  const { projectId } = await newProject(owner.visitor);
  await owner.visitor.patch(`/api/projects/${projectId}`, { name: 'Court <of> Tom & Jo' });
  await owner.visitor.post('/api/invitations', { email, role: 'client', projectId });
  const [letter] = await lettersTo(email);
  expect(letter).toMatchObject({ kind: 'invitation', firmId: owner.actor.firmId });
  expect(letter.subject).toContain('Court <of> Tom & Jo');
  expect(letter.text).toContain('Court <of> Tom & Jo');
  expect(letter.text).toContain('http://localhost:4321/accept-invitation?token=');
  expect(letter.html).toContain('Court &lt;of&gt; Tom &amp; Jo');
  expect(letter.html).not.toContain('<of>');
  expect(letter.html).toContain(await tokenFor(email));
});

test('a client invited to a project sees that project and no other', async () => {
  const { owner, email } = await start();
  const { projectId } = await newProject(owner.visitor);
  const other = await newProject(owner.visitor);
  await owner.visitor.post('/api/invitations', { email, role: 'client', projectId });
  const visitor = new Visitor();
  await accept(await tokenFor(email), {}, visitor);
  expect((await visitor.get(`/api/projects/${projectId}`)).status).toBe(200);
  expect((await visitor.get(`/api/projects/${other.projectId}`)).status).toBe(404);
});

test.each([
  ['a client without a project', { role: 'client' }],
  ['a designer to a project', { role: 'designer', projectId: 'any' }],
  ['an owner to a project', { role: 'owner', projectId: 'any' }],
  ['a role that there is not', { role: 'mason' }],
  ['what is no address', { role: 'owner', email: 'nobody' }],
])('%s is not invited', async (_what, body) => {
  const { owner, email } = await start();
  const answer = await owner.visitor.post('/api/invitations', { email, ...body });
  expect(answer.status).toBe(422);
  expect(await lettersTo(email)).toEqual([]);
});

test('nobody is invited to another firm’s project', async () => {
  const { owner, email } = await start();
  const stranger = await newFirm();
  const { projectId } = await newProject(stranger.visitor);
  const body = { email, role: 'client', projectId };
  expect((await owner.visitor.post('/api/invitations', body)).status).toBe(404);
});

test('who is of the firm already is not invited again', async () => {
  const { owner } = await start();
  const member = await newMember(owner.actor.firmId, 'installer');
  const body = { email: member.email.toUpperCase(), role: 'designer' };
  const answer = await owner.visitor.post('/api/invitations', body);
  expect(answer.status).toBe(422);
  expect(answer.body.errors[0].path).toEqual(['email']);
});

test('an invitation works once, also when it is accepted twice at the same moment', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email, role: 'installer' });
  const token = await tokenFor(email);
  const answers = await Promise.all([accept(token), accept(token), accept(token)]);
  expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  expect((await accept(token)).status).toBe(404);
  const members = await (
    await db()
  )
    .select()
    .from(memberships)
    .where(eq(memberships.firmId, owner.actor.firmId));
  expect(members).toHaveLength(2);
});

test('an invitation too old is not accepted', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email, role: 'installer' });
  const token = await tokenFor(email);
  await (
    await db()
  )
    .update(invitations)
    .set({ expiresAt: sql`now() - interval '1 second'` })
    .where(eq(invitations.email, email));
  const answer = await accept(token);
  expect(answer.status).toBe(404);
  expect(answer.body.detail).toMatch(/Ask whoever invited you/);
  const listed = (await owner.visitor.get('/api/invitations')).body.invitations;
  expect(listed).toMatchObject([{ email, expired: true }]);
});

test('a withdrawn invitation is not accepted, and a letter sent again replaces the one before', async () => {
  const { owner, email } = await start();
  const first = await owner.visitor.post('/api/invitations', { email, role: 'installer' });
  const firstToken = await tokenFor(email);
  const second = await owner.visitor.post(`/api/invitations/${first.body.id}/again`);
  expect(second.status).toBe(200);
  const secondToken = await tokenFor(email);
  expect((await accept(firstToken)).status).toBe(404);
  expect((await owner.visitor.get('/api/invitations')).body.invitations).toEqual([second.body]);
  await owner.visitor.call('DELETE', `/api/invitations/${second.body.id}`);
  expect((await accept(secondToken)).status).toBe(404);
  expect((await owner.visitor.get('/api/invitations')).body.invitations).toEqual([]);
});

test('the token is not in the database but in the letter that waits to be sent', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email, role: 'owner' });
  const token = await tokenFor(email);
  const rows = await (await db()).select().from(invitations);
  const deeds = await (await db()).select().from(auditEvents);
  expect(JSON.stringify([rows, deeds])).not.toContain(token);
});

test('a person with an account joins a second firm with their password, and acts in either', async () => {
  const { owner } = await start();
  const known = await newFirm();
  const body = { email: known.email, role: 'designer' };
  await owner.visitor.post('/api/invitations', body);
  const token = await tokenFor(known.email);
  const wrong = await accept(token, { password: 'another password' });
  expect(wrong.status).toBe(422);
  expect(wrong.body.errors[0].path).toEqual(['password']);
  const visitor = new Visitor();
  expect((await accept(token, {}, visitor)).body).toMatchObject({
    id: known.actor.personId,
    role: 'designer',
    firm: { id: owner.actor.firmId },
  });
  const { firms } = (await visitor.get('/api/account/firms')).body;
  expect(firms).toHaveLength(2);
  const back = await visitor.post('/api/account/firm', { firmId: known.actor.firmId });
  expect(back.body).toMatchObject({ role: 'owner', firm: { id: known.actor.firmId } });
  expect((await visitor.get('/api/account')).body).toEqual(back.body);
  const stranger = await newFirm();
  const elsewhere = await visitor.post('/api/account/firm', { firmId: stranger.actor.firmId });
  expect(elsewhere.status).toBe(404);
});

test('whoever is signed in to the invited account accepts without the password; others do not', async () => {
  const { owner } = await start();
  const known = await newFirm();
  const other = await newFirm();
  await owner.visitor.post('/api/invitations', { email: known.email, role: 'installer' });
  const token = await tokenFor(known.email);
  const foreign = await other.visitor.post('/api/accept-invitation', { token });
  expect(foreign.status).toBe(422);
  const own = await known.visitor.post('/api/accept-invitation', { token });
  expect(own.body).toMatchObject({ id: known.actor.personId, firm: { id: owner.actor.firmId } });
});

test('a new person must give a name and a password that will do', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email, role: 'installer' });
  const token = await tokenFor(email);
  const answer = await accept(token, { name: undefined, password: 'short' });
  expect(answer.status).toBe(422);
  expect(answer.body.errors.map(({ path }: { path: string[] }) => path[0])).toEqual([
    'name',
    'password',
  ]);
  expect((await accept(token)).status).toBe(200);
});

test('passwords of an account are not tried without end through its invitation', async () => {
  const { owner } = await start();
  const known = await newFirm();
  await owner.visitor.post('/api/invitations', { email: known.email, role: 'installer' });
  const token = await tokenFor(known.email);
  const visitor = new Visitor();
  const tries = [];
  for (let n = 0; n < 10; n += 1) {
    tries.push((await accept(token, { password: `wrong ${n} password` }, visitor)).status);
  }
  expect(tries.at(-1)).toBe(429);
});

test('a firm does not send the world letters', async () => {
  const { owner } = await start();
  const { firmId, personId } = owner.actor;
  await (await db()).insert(invitations).values(
    Array.from({ length: INVITATIONS_AN_HOUR }, (_, n) => ({
      id: `many-${firmId}-${n}`,
      firmId,
      email: `many${n}@elsewhere.example`,
      role: 'installer' as const,
      tokenHash: `hash-${firmId}-${n}`,
      invitedBy: personId,
      expiresAt: new Date(Date.now() + 1000),
    })),
  );
  const email = newAddress();
  const answer = await owner.visitor.post('/api/invitations', { email, role: 'installer' });
  expect(answer.status).toBe(429);
  expect(await lettersTo(email)).toEqual([]);
});

test('the list tells of a letter that the receiving server refused', async () => {
  const { owner, email } = await start();
  const { id } = (await owner.visitor.post('/api/invitations', { email, role: 'installer' })).body;
  await (
    await db()
  )
    .update(outbox)
    .set({ refusedAt: sql`now()` })
    .where(eq(outbox.id, id));
  const [listed] = (await owner.visitor.get('/api/invitations')).body.invitations;
  expect(listed.letter).toBe('refused');
});

test('inviting and joining are on record', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email, role: 'designer' });
  const { id } = (await accept(await tokenFor(email))).body;
  const deeds = await (
    await db()
  )
    .select({ what: auditEvents.what, personId: auditEvents.personId })
    .from(auditEvents)
    .where(eq(auditEvents.firmId, owner.actor.firmId))
    .orderBy(auditEvents.at);
  expect(deeds).toEqual([
    { what: 'person.invited', personId: owner.actor.personId },
    { what: 'person.joined', personId: id },
  ]);
});

test('an address is one account, whatever its capitals in the invitation', async () => {
  const { owner, email } = await start();
  await owner.visitor.post('/api/invitations', { email: email.toUpperCase(), role: 'installer' });
  await accept(await tokenFor(email));
  const rows = await (
    await db()
  )
    .select()
    .from(people)
    .where(and(eq(people.email, email)));
  expect(rows).toHaveLength(1);
});
