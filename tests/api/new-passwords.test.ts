import { eq, sql } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { passwordResets, people, sessions } from '@/db/schema';
import { RESET_PAIR } from '@/server/attempts';
import { newFirm, newMember, PASSWORD } from './firm';
import { lettersTo, tokenFor } from './letters-to';
import { db, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

const NEW_PASSWORD = 'quite another password';

const askFor = (email: string, visitor = new Visitor()) =>
  visitor.post('/api/forgotten-password', { email });

const reset = (token: string, password = NEW_PASSWORD, visitor = new Visitor()) =>
  visitor.post('/api/reset-password', { token, password });

const signsIn = async (email: string, password: string) =>
  (await new Visitor().post('/api/sign-in', { email, password })).status === 200;

test('a letter’s link sets a new password, signs in, and ends every session there was', async () => {
  const { visitor, email, actor } = await newFirm();
  await askFor(email.toUpperCase());
  const fresh = new Visitor();
  const answer = await reset(await tokenFor(email), NEW_PASSWORD, fresh);
  expect(answer).toMatchObject({ status: 200, body: { id: actor.personId } });
  expect((await fresh.get('/api/account')).status).toBe(200);
  expect((await visitor.get('/api/account')).status).toBe(401);
  expect(await signsIn(email, PASSWORD)).toBe(false);
  expect(await signsIn(email, NEW_PASSWORD)).toBe(true);
  expect((await lettersTo(email))[0].kind).toBe('password-changed');
});

test('the answer does not tell whether there is an account, and to nobody no letter is sent', async () => {
  const { email } = await newFirm();
  const unknown = 'nobody@elsewhere.example';
  const [known, not] = [await askFor(email), await askFor(unknown)];
  expect(not.status).toBe(200);
  expect(not.body).toEqual(known.body);
  expect(await lettersTo(unknown)).toEqual([]);
});

test('a link works once, even twice at the same moment', async () => {
  const { email } = await newFirm();
  await askFor(email);
  const token = await tokenFor(email);
  const answers = await Promise.all([reset(token), reset(token, 'a third password')]);
  expect(answers.map(({ status }) => status).sort()).toEqual([200, 404]);
  expect((await reset(token)).status).toBe(404);
});

test('a new password puts an end to the links of older letters', async () => {
  const { email } = await newFirm();
  await askFor(email);
  const older = await tokenFor(email);
  await askFor(email);
  await reset(await tokenFor(email));
  expect((await reset(older)).status).toBe(404);
});

test('a link too old sets nothing', async () => {
  const { email } = await newFirm();
  await askFor(email);
  const token = await tokenFor(email);
  await (await db()).update(passwordResets).set({ expiresAt: sql`now() - interval '1 second'` });
  const answer = await reset(token);
  expect(answer.status).toBe(404);
  expect(answer.body.detail).toMatch(/Ask for a new letter/);
  expect(await signsIn(email, PASSWORD)).toBe(true);
});

test('a link with a password that will not do is not used up', async () => {
  const { email } = await newFirm();
  await askFor(email);
  const token = await tokenFor(email);
  expect((await reset(token, 'short')).status).toBe(422);
  expect((await reset(token)).status).toBe(200);
});

test('the token is kept as its hash alone', async () => {
  const { email } = await newFirm();
  await askFor(email);
  const token = await tokenFor(email);
  const rows = await (await db()).select().from(passwordResets);
  expect(JSON.stringify(rows)).not.toContain(token);
});

test('letters are not asked for without end', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  for (let n = 0; n < RESET_PAIR.attempts; n += 1) {
    expect((await askFor(email, visitor)).status).toBe(200);
  }
  expect((await askFor(email, visitor)).status).toBe(429);
  expect(await lettersTo(email)).toHaveLength(RESET_PAIR.attempts);
});

test('somebody of no firm may set a password, and is told how to come back', async () => {
  const owner = await newFirm();
  const member = await newMember(owner.actor.firmId, 'designer');
  await owner.visitor.call('DELETE', `/api/people/${member.actor.personId}`);
  await askFor(member.email);
  const answer = await reset(await tokenFor(member.email));
  expect(answer.status).toBe(401);
  expect(answer.body.detail).toMatch(/Your password is changed.*invited again/);
});

test('changing one’s own password asks for the old one, and ends the other sessions only', async () => {
  const { visitor, email, actor } = await newFirm();
  const elsewhere = new Visitor();
  await elsewhere.post('/api/sign-in', { email, password: PASSWORD });
  const wrong = await visitor.post('/api/account/password', {
    current: 'not it',
    password: NEW_PASSWORD,
  });
  expect(wrong.status).toBe(422);
  expect(wrong.body.errors[0].path).toEqual(['current']);
  const changed = await visitor.post('/api/account/password', {
    current: PASSWORD,
    password: NEW_PASSWORD,
  });
  expect(changed.status).toBe(200);
  expect((await visitor.get('/api/account')).status).toBe(200);
  expect((await elsewhere.get('/api/account')).status).toBe(401);
  expect(await signsIn(email, NEW_PASSWORD)).toBe(true);
  expect((await lettersTo(email))[0].kind).toBe('password-changed');
  const [row] = await (await db()).select().from(people).where(eq(people.id, actor.personId));
  expect(row.passwordHash).toMatch(/^\$argon2id\$/);
});

test('a person sees their sessions and signs any of them out', async () => {
  const { visitor, email } = await newFirm();
  const phone = new Visitor();
  const agent = 'Mozilla/5.0 (Linux; Android 14; Mobile; rv:131.0) Gecko/131.0 Firefox/131.0';
  const request = phone.request('POST', '/api/sign-in', { email, password: PASSWORD });
  request.headers.set('user-agent', agent);
  await phone.send(request);
  const listed = (await visitor.get('/api/account/sessions')).body.sessions;
  expect(listed).toHaveLength(2);
  const other = listed.find(({ current }: { current: boolean }) => !current);
  expect(other.device).toBe('Firefox on Android');
  expect(JSON.stringify(listed)).not.toContain(phone.cookie());
  const ended = await visitor.call('DELETE', `/api/account/sessions/${other.id}`);
  expect(ended.status).toBe(200);
  expect((await phone.get('/api/account')).status).toBe(401);
  expect((await visitor.get('/api/account')).status).toBe(200);
});

test('nobody signs out somebody else', async () => {
  const { visitor } = await newFirm();
  const other = await newFirm();
  const [theirs] = (await other.visitor.get('/api/account/sessions')).body.sessions;
  const answer = await visitor.call('DELETE', `/api/account/sessions/${theirs.id}`);
  expect(answer.status).toBe(404);
  expect((await other.visitor.get('/api/account')).status).toBe(200);
});

test('all other devices are signed out at once', async () => {
  const { visitor, email, actor } = await newFirm();
  for (let n = 0; n < 3; n += 1) {
    await new Visitor().post('/api/sign-in', { email, password: PASSWORD });
  }
  const answer = await visitor.post('/api/account/sessions/end-others');
  expect(answer.body).toEqual({ ended: 3 });
  const left = await (
    await db()
  )
    .select()
    .from(sessions)
    .where(eq(sessions.userId, actor.personId));
  expect(left).toHaveLength(1);
  expect((await visitor.get('/api/account')).status).toBe(200);
});

test('the last use of a session is noted, to within minutes', async () => {
  const { visitor, actor } = await newFirm();
  const hourAgo = new Date(Date.now() - 3_600_000);
  await (
    await db()
  )
    .update(sessions)
    .set({ lastSeenAt: hourAgo })
    .where(eq(sessions.userId, actor.personId));
  await visitor.get('/api/account');
  const [session] = (await visitor.get('/api/account/sessions')).body.sessions;
  expect(Date.parse(session.lastSeenAt)).toBeGreaterThan(hourAgo.getTime());
});

test('a person chooses which letters they want', async () => {
  const { visitor } = await newFirm();
  expect((await visitor.get('/api/account/mail')).body).toEqual({
    mentions: true,
    steps: true,
    digest: 'daily',
  });
  const changed = await visitor.patch('/api/account/mail', { steps: false, digest: 'never' });
  expect(changed.body).toEqual({ mentions: true, steps: false, digest: 'never' });
  expect((await visitor.get('/api/account/mail')).body).toEqual(changed.body);
  expect((await visitor.patch('/api/account/mail', { digest: 'weekly' })).status).toBe(422);
});
