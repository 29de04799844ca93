import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, membership, session, team, user } from '@/db/schema';
import { sha256Hex } from '@/lib/server/auth/hashed-adapter';
import { SESSION_COOKIE } from '@/lib/server/auth/lucia';
import { makeTestDb, type World } from '../helpers';
import { member, newPerson, PASSWORD, signUpAs } from './people';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const one = async <T>(rows: Promise<T[]>): Promise<T> => {
  const found = await rows;
  expect(found).toHaveLength(1);
  return found[0] as T;
};

describe('sign-up', () => {
  it('makes a user, a team, its owner and one audit row, and answers without secrets', async () => {
    const person = newPerson({ email: '  ADA.New@Example.Test ' });
    const { status, body } = await signUpAs(person);
    expect(status).toBe(201);
    expect(body).toEqual({
      user: { id: expect.any(String), name: 'Ada Field', email: 'ada.new@example.test' },
      team: { id: expect.any(String), name: person.teamName },
    });
    const { db } = world.handle;
    expect(await one(db.select().from(team).where(eq(team.id, body.team.id)))).toMatchObject({
      units: 'us',
      demo: false,
    });
    const seat = await one(db.select().from(membership).where(eq(membership.userId, body.user.id)));
    expect(seat).toMatchObject({ teamId: body.team.id, role: 'owner' });
    const act = await one(db.select().from(auditEvent).where(eq(auditEvent.userId, body.user.id)));
    expect(act).toMatchObject({ action: 'auth.sign-up', teamId: body.team.id });
  });

  it('stores argon2id with its cost written out, and only the hash of the session token', async () => {
    const { user: made, token } = await member();
    const { db } = world.handle;
    const row = await one(db.select().from(user).where(eq(user.id, made.id)));
    expect(row.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    const stored = await one(db.select().from(session).where(eq(session.userId, made.id)));
    expect(token.length).toBeGreaterThanOrEqual(40);
    expect(stored.id).toBe(sha256Hex(token));
    const everything = JSON.stringify([
      await db.select().from(session),
      await db.select().from(user),
      await db.select().from(auditEvent),
    ]);
    expect(everything).not.toContain(token);
    expect(everything).not.toContain(PASSWORD);
  });

  it('sends a cookie that only this host and no script gets', async () => {
    const { jar } = await signUpAs(newPerson());
    expect(SESSION_COOKIE).toMatch(/^__Host-/);
    expect(jar.sent.get(SESSION_COOKIE)?.options).toEqual({
      httpOnly: true,
      secure: true,
      sameSite: 'lax',
      path: '/',
      maxAge: 14 * 24 * 3600,
    });
  });

  it('ends session in whole seconds: 14 days idle, 60 days at most', async () => {
    const { user: made } = await member();
    const row = await one(world.handle.db.select().from(session).where(eq(session.userId, made.id)));
    const nowS = Date.now() / 1000;
    expect(Number.isInteger(row.expiresAt)).toBe(true);
    expect(Math.abs(row.expiresAt - nowS - 14 * 86_400)).toBeLessThan(60);
    expect(Math.abs(row.absoluteExpiresAt - nowS - 60 * 86_400)).toBeLessThan(60);
  });

  it('refuses an address that is in use, whatever its case', async () => {
    const { person } = await member();
    const { status, body } = await signUpAs(newPerson({ email: person.email.toUpperCase() }));
    expect(status).toBe(409);
    expect(body.error).toMatchObject({
      code: 'CONFLICT',
      fields: { email: expect.stringContaining('sign in instead') },
    });
  });

  it('lets only one of two win that use the same address at once', async () => {
    const email = newPerson().email;
    const answers = await Promise.all([signUpAs(newPerson({ email })), signUpAs(newPerson({ email }))]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 409]);
    expect(await world.handle.db.select().from(user).where(eq(user.email, email))).toHaveLength(1);
  });

  it.each([
    ['too short', 'eleven char'],
    ['common', 'Password1234!'],
    ['common', 'qwertyqwerty'],
    ['common', '123456789012'],
    ['one sign', 'aaaaaaaaaaaaaaaa'],
    ['too long', 'long words '.repeat(12)],
  ])('refuses a password that is %s: %s', async (_why, password) => {
    const before = await world.handle.db.select().from(user);
    const { status, body } = await signUpAs(newPerson({ password }));
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toEqual(['password']);
    expect(await world.handle.db.select().from(user)).toEqual(before);
  });

  it.each([
    ['email', { email: 'lampwick.meadow@example.test', password: 'lampwick.meadow@example.test' }],
    ['team name', { teamName: 'Gravel Lantern Crew', password: 'gravellanterncrew' }],
  ])('refuses the %s as password', async (_what, fields) => {
    expect((await signUpAs(newPerson(fields))).body.error.fields).toHaveProperty('password');
  });

  it.each([
    ['64 characters', 'correct horse battery staple and sixty-four signs in one long row'],
    ['spaces and other scripts', '  путь 狐狸 über alles  '],
    ['128 characters', 'lamp gravel moon '.repeat(8).slice(0, 128)],
  ])('takes %s', async (_what, password) => {
    expect((await signUpAs(newPerson({ password }))).status).toBe(201);
  });

  it.each([
    ['teamName', { teamName: ' ' }],
    ['name', { name: undefined }],
    ['email', { email: 'ada at example' }],
  ])('names a bad %s', async (field, change) => {
    const { status, body } = await signUpAs(newPerson(change));
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toEqual([field]);
  });
});
