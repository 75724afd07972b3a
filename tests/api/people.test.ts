import { eq } from 'drizzle-orm';
import { expect, test } from 'vitest';
import { people, sessions, signInAttempts } from '@/db/schema';
import { SIGN_IN_PAIR } from '@/server/attempts';
import { newFirm, newMember, PASSWORD } from './firm';
import { db, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

const wrong = (email: string) => ({ email, password: 'not the password' });

test('signing up makes a firm and its owner, signed in', async () => {
  const visitor = new Visitor();
  const answer = await visitor.post('/api/sign-up', {
    firmName: ' New Firm ',
    name: 'Ada',
    email: 'Ada@Firm.Example',
    password: PASSWORD,
    display: 'imperial',
  });
  expect(answer.status).toBe(201);
  expect(answer.body).toMatchObject({
    name: 'Ada',
    email: 'ada@firm.example',
    display: 'imperial',
    role: 'owner',
    firm: { name: 'New Firm' },
  });
  expect((await visitor.get('/api/account')).body).toEqual(answer.body);
});

test('the cookie is HttpOnly, SameSite=Lax and for the whole site', async () => {
  const { email } = await newFirm();
  const answer = await new Visitor().post('/api/sign-in', { email, password: PASSWORD });
  const cookie = answer.headers.get('set-cookie');
  expect(cookie).toMatch(/;\s*HttpOnly/i);
  expect(cookie).toMatch(/;\s*SameSite=Lax/i);
  expect(cookie).toMatch(/;\s*Path=\//i);
  expect(cookie).not.toMatch(/;\s*Secure/i);
});

test('over TLS the cookie is Secure', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  const plain = visitor.request('POST', '/api/sign-in', { email, password: PASSWORD });
  const tls = new Request(plain.url.replace('http:', 'https:'), plain);
  tls.headers.set('origin', 'https://floors.test');
  const answer = await visitor.send(tls);
  expect(answer.status).toBe(200);
  expect(answer.headers.get('set-cookie')).toMatch(/;\s*Secure/i);
  expect(answer.headers.get('strict-transport-security')).toBeTruthy();
});

test('an e-mail address is taken once, whatever its capitals', async () => {
  const { email } = await newFirm();
  const answer = await new Visitor().post('/api/sign-up', {
    firmName: 'Other',
    name: 'Other',
    email: email.toUpperCase(),
    password: PASSWORD,
  });
  expect(answer.status).toBe(422);
  expect(answer.body.errors[0].path).toEqual(['email']);
});

test('every field of a sign-up that is wrong is named', async () => {
  const answer = await new Visitor().post('/api/sign-up', { email: 'nobody', password: 'short' });
  expect(answer.status).toBe(422);
  expect(answer.body.errors.map((error: { path: string[] }) => error.path[0]).sort()).toEqual([
    'email',
    'firmName',
    'name',
    'password',
  ]);
});

test('a wrong password and an unknown address get the same answer', async () => {
  const { email } = await newFirm();
  const known = await new Visitor().post('/api/sign-in', wrong(email));
  const unknown = await new Visitor().post('/api/sign-in', wrong('nobody@firm.example'));
  expect(known.status).toBe(401);
  expect(unknown.status).toBe(401);
  expect(unknown.body).toEqual(known.body);
});

test('the password is kept as Argon2id with 19 MiB, 2 passes and 1 lane', async () => {
  const { actor } = await newFirm();
  const [row] = await (await db()).select().from(people).where(eq(people.id, actor.personId));
  expect(row.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
});

test('signing in gives a new session, and the one before it ends', async () => {
  const { visitor, email } = await newFirm();
  const before = visitor.cookie() ?? '';
  await visitor.post('/api/sign-in', { email, password: PASSWORD });
  expect(visitor.cookie()).not.toBe(before);
  const thief = new Visitor();
  thief.setCookie(before);
  expect((await thief.get('/api/account')).status).toBe(401);
});

test('a session’s id is not in the database, only its hash', async () => {
  const { visitor, actor } = await newFirm();
  const rows = await (
    await db()
  )
    .select()
    .from(sessions)
    .where(eq(sessions.userId, actor.personId));
  expect(rows).toHaveLength(1);
  expect(JSON.stringify(rows)).not.toContain(visitor.cookie());
});

test('signing out ends the session for whoever else has its cookie', async () => {
  const { visitor } = await newFirm();
  const id = visitor.cookie() ?? '';
  expect((await visitor.post('/api/sign-out')).status).toBe(204);
  expect(visitor.cookie()).toBeUndefined();
  const thief = new Visitor();
  thief.setCookie(id);
  expect((await thief.get('/api/account')).status).toBe(401);
});

test('a session that has run out signs nobody in', async () => {
  const { visitor, actor } = await newFirm();
  await (
    await db()
  )
    .update(sessions)
    .set({ expiresAt: new Date(Date.now() - 1000) })
    .where(eq(sessions.userId, actor.personId));
  expect((await visitor.get('/api/account')).status).toBe(401);
});

test('after too many wrong passwords even the right one has to wait, and is told how long', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  for (let n = 0; n < SIGN_IN_PAIR.attempts; n += 1) {
    expect((await visitor.post('/api/sign-in', wrong(email))).status).toBe(401);
  }
  const refused = await visitor.post('/api/sign-in', { email, password: PASSWORD });
  expect(refused.status).toBe(429);
  expect(refused.body.detail).toMatch(/Try again in 15 minutes/);
  expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
  expect((await new Visitor().post('/api/sign-in', { email, password: PASSWORD })).status).toBe(
    200,
  );
});

test('attempts at the same moment do not slip past the limit', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  const answers = await Promise.all(
    Array.from({ length: SIGN_IN_PAIR.attempts + 6 }, () =>
      visitor.post('/api/sign-in', wrong(email)),
    ),
  );
  const tried = answers.filter(({ status }) => status === 401).length;
  expect(tried).toBeLessThanOrEqual(SIGN_IN_PAIR.attempts);
});

test('the wait ends when the attempts are old enough', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  for (let n = 0; n <= SIGN_IN_PAIR.attempts; n += 1)
    await visitor.post('/api/sign-in', wrong(email));
  const old = new Date(Date.now() - (SIGN_IN_PAIR.windowMinutes + 1) * 60_000);
  await (await db()).update(signInAttempts).set({ at: old }).where(eq(signInAttempts.email, email));
  expect((await visitor.post('/api/sign-in', { email, password: PASSWORD })).status).toBe(200);
});

test('a success starts the count afresh', async () => {
  const { email } = await newFirm();
  const visitor = new Visitor();
  for (let round = 0; round < 2; round += 1) {
    for (let n = 0; n < SIGN_IN_PAIR.attempts - 1; n += 1) {
      await visitor.post('/api/sign-in', wrong(email));
    }
    const right = await visitor.post('/api/sign-in', { email, password: PASSWORD });
    expect(right.status).toBe(200);
  }
});

test('a person changes their own name and display, and nothing else', async () => {
  const { visitor, actor } = await newFirm();
  const other = await newMember(actor.firmId, 'client');
  const answer = await visitor.patch('/api/account', {
    name: 'Renamed',
    display: 'imperial',
    role: 'client',
    email: 'elsewhere@firm.example',
  });
  expect(answer.body).toMatchObject({ name: 'Renamed', display: 'imperial', role: 'owner' });
  const account = (await visitor.get('/api/account')).body;
  expect(account.email).not.toBe('elsewhere@firm.example');
  expect((await other.visitor.get('/api/account')).body.name).not.toBe('Renamed');
});
