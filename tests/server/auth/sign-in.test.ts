import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { auditEvent, session, user } from '@/db/schema';
import { SESSION_COOKIE } from '@/lib/server/auth/lucia';
import { DUMMY_HASH, hashPassword, verifyPassword } from '@/lib/server/auth/password';
import { POST as signOutRoute } from '@/pages/api/auth/sign-out';
import { callRoute, contextFor, makeTestDb, type World } from '../helpers';
import { member, newPerson, PASSWORD, signInAs, signUpAs } from './people';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});
afterEach(() => {
  vi.useRealTimers();
});

const sessionsOf = (userId: string) => world.handle.db.select().from(session).where(eq(session.userId, userId));

describe('sign-in', () => {
  it('makes a new session and answers who and which team', async () => {
    const { person, user: made, team, token } = await member();
    const { status, body, jar } = await signInAs({ email: ` ${person.email.toUpperCase()}`, password: PASSWORD });
    expect(status).toBe(200);
    expect(body).toEqual({ user: made, team });
    expect(jar.sent.get(SESSION_COOKIE)?.value).not.toBe(token);
    expect(await sessionsOf(made.id)).toHaveLength(2);
  });

  it('ends the session the browser had', async () => {
    const { person, user: made, token } = await member();
    await signInAs({ email: person.email, password: PASSWORD }, { cookies: { [SESSION_COOKIE]: token } });
    expect(await sessionsOf(made.id)).toHaveLength(1);
  });

  it('never takes over a token that was planted', async () => {
    const { person } = await member();
    const planted = 'a'.repeat(40);
    const { jar } = await signInAs(
      { email: person.email, password: PASSWORD },
      { cookies: { [SESSION_COOKIE]: planted } },
    );
    expect(jar.sent.get(SESSION_COOKIE)?.value).not.toBe(planted);
  });

  it('gives an unknown address, a wrong password and a disabled user the same answer', async () => {
    const { person, user: made } = await member();
    const unknown = await signInAs({ email: 'nobody@example.test', password: PASSWORD });
    const wrong = await signInAs({ email: person.email, password: `${PASSWORD} ` });
    const otherCase = await signInAs({ email: person.email, password: PASSWORD.toUpperCase() });
    await world.handle.db.update(user).set({ disabledAt: '2026-05-02T15:00:00.000Z' }).where(eq(user.id, made.id));
    const disabled = await signInAs({ email: person.email, password: PASSWORD });
    for (const answer of [unknown, wrong, otherCase, disabled]) {
      expect(answer.status).toBe(401);
      expect(answer.body).toEqual(unknown.body);
      expect(answer.jar.sent.size).toBe(0);
    }
  });

  it('spends the cost of a real hash where there is no user', async () => {
    const cost = (hash: string) => hash.split('$').slice(0, 4).join('$');
    expect(cost(DUMMY_HASH)).toBe(cost(await hashPassword(PASSWORD)));
    expect(await verifyPassword(null, PASSWORD)).toBe(false);
  });

  it('takes a damaged hash for a wrong password', async () => {
    expect(await verifyPassword('$argon2id$broken', PASSWORD)).toBe(false);
  });

  it('takes the same password composed or decomposed', async () => {
    const composed = 'b\u00fccher am fenster';
    expect(await verifyPassword(await hashPassword(composed), composed.normalize('NFD'))).toBe(true);
  });

  it.each([{ email: 'ada@example.test' }, { password: PASSWORD }, [], 'text', null])(
    'answers 400 to %j',
    async (body) => {
      expect((await signInAs(body as never)).status).toBe(400);
    },
  );

  it('refuses a huge password before hashing it', async () => {
    const { status, body } = await signInAs({ email: 'ada@example.test', password: 'x'.repeat(100_000) });
    expect(status).toBe(400);
    expect(body.error.fields.password).toContain('too long');
  });

  it('notes success and failure, each once, without password or address', async () => {
    const { person, user: made } = await member();
    await signInAs({ email: person.email, password: 'wrong words here' });
    await signInAs({ email: person.email, password: PASSWORD });
    const rows = await world.handle.db.select().from(auditEvent).where(eq(auditEvent.subjectId, made.id));
    expect(rows.map(({ action }) => action).sort()).toEqual(['auth.sign-in', 'auth.sign-in-failed', 'auth.sign-up']);
    expect(JSON.stringify(rows)).not.toMatch(/wrong words|example\.test/);
  });
});

describe('the wait after wrong passwords', () => {
  it('answers 429 with Retry-After, and the right password works after the wait', async () => {
    vi.useFakeTimers({ toFake: ['Date'] });
    const { person } = await member();
    const wrong = { email: person.email, password: 'not the password' };
    const tries = [];
    for (let n = 0; n < 7; n += 1) tries.push(await signInAs(wrong));
    expect(tries.map(({ status }) => status)).toEqual([401, 401, 401, 401, 401, 401, 429]);
    const waitS = Number(tries.at(-1)?.headers.get('retry-after'));
    expect(waitS).toBeGreaterThan(0);
    expect((await signInAs({ ...wrong, password: PASSWORD })).status).toBe(429);
    vi.setSystemTime(Date.now() + waitS * 1000);
    expect((await signInAs({ ...wrong, password: PASSWORD })).status).toBe(200);
  });

  it('holds for one account from many addresses, and not for another account', async () => {
    const { person } = await member();
    const from = (n: number) => ({ address: `198.51.100.${n}` });
    const statuses = [];
    for (let n = 0; n < 21; n += 1)
      statuses.push((await signInAs({ email: person.email, password: 'wrong words' }, from(n))).status);
    expect(statuses.at(-1)).toBe(429);
    const other = await member();
    expect((await signInAs({ email: other.person.email, password: PASSWORD }, from(1))).status).toBe(200);
  });

  it('does not let many at once slip through', async () => {
    const { person } = await member();
    const answers = await Promise.all(
      Array.from({ length: 12 }, () => signInAs({ email: person.email, password: 'wrong words' })),
    );
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(6);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(6);
  });

  it('is not escaped by a forged X-Forwarded-For', async () => {
    const { person } = await member();
    const statuses = [];
    for (let n = 0; n < 7; n += 1) {
      const forged = { headers: { 'x-forwarded-for': `192.0.2.${n}` }, address: `192.0.2.${n}` };
      statuses.push((await signInAs({ email: person.email, password: 'wrong words' }, forged)).status);
    }
    expect(statuses.at(-1)).toBe(429);
  });
});

describe('sign-out', () => {
  it('ends the session and takes the cookie back', async () => {
    const { user: made, token } = await member();
    const { status, jar } = await callRoute(signOutRoute, { method: 'POST', cookies: { [SESSION_COOKIE]: token } });
    expect(status).toBe(200);
    expect(jar.sent.get(SESSION_COOKIE)).toMatchObject({ value: '', options: { maxAge: 0, path: '/', secure: true } });
    expect(await sessionsOf(made.id)).toEqual([]);
  });

  it('leaves other sessions alone and is noted', async () => {
    const { person, user: made, token } = await member();
    await signInAs({ email: person.email, password: PASSWORD });
    const as = { ...contextFor(world, 'owner'), user: made };
    await callRoute(signOutRoute, { as, method: 'POST', cookies: { [SESSION_COOKIE]: token } });
    expect(await sessionsOf(made.id)).toHaveLength(1);
    const rows = await world.handle.db.select().from(auditEvent).where(eq(auditEvent.userId, made.id));
    expect(rows.filter(({ action }) => action === 'auth.sign-out')).toHaveLength(1);
  });

  it('does nothing without a session', async () => {
    expect((await callRoute(signOutRoute, { method: 'POST' })).status).toBe(200);
  });
});

it('never repeats a token', async () => {
  const tokens = await Promise.all(
    Array.from({ length: 20 }, async () => (await signUpAs(newPerson())).jar.sent.get(SESSION_COOKIE)?.value),
  );
  expect(new Set(tokens).size).toBe(20);
});
