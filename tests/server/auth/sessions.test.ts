import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { membership, session, user } from '@/db/schema';
import { sha256Hex } from '@/lib/server/auth/hashed-adapter';
import {
  endExpiredSessions,
  endUserSessions,
  readSession,
  SESSION_COOKIE,
  startSession,
} from '@/lib/server/auth/lucia';
import { loadSession } from '@/lib/server/auth/session-locals';
import { POST as switchRoute } from '@/pages/api/auth/switch-team';
import { GET as meRoute } from '@/pages/api/me';
import { addTeam, callRoute, contextFor, fakeCall, makeTestDb, TEST_NOW, type World } from '../helpers';
import { member } from './people';

const DAY_MS = 86_400_000;
let world: World;
beforeEach(async () => {
  vi.useFakeTimers({ toFake: ['Date'], now: Date.parse(TEST_NOW) });
  world = await makeTestDb();
});
afterEach(() => {
  vi.useRealTimers();
});

const passDays = (days: number) => vi.setSystemTime(Date.now() + days * DAY_MS);
const rowOf = async (token: string) =>
  (
    await world.handle.db
      .select()
      .from(session)
      .where(eq(session.id, sha256Hex(token)))
  )[0];

async function load(token: string, headers: Record<string, string> = {}) {
  const call = fakeCall({ cookies: { [SESSION_COOKIE]: token }, headers });
  await loadSession(call);
  return call;
}

describe('a session', () => {
  it('puts user, team, role and token into locals', async () => {
    const { user: made, team, token } = await member();
    const { locals, jar } = await load(token);
    expect(locals).toMatchObject({ user: made, team: { ...team, units: 'us' }, role: 'owner', sessionToken: token });
    expect(locals.user).toEqual(made);
    expect(jar.sent.size).toBe(0);
  });

  it('is not found by the hash that the database holds', async () => {
    const { token } = await member();
    expect(await readSession(world.handle, sha256Hex(token))).toBeNull();
  });

  it('ends after 14 days without use', async () => {
    const { token } = await member();
    passDays(14.01);
    const { locals, jar } = await load(token);
    expect(locals.user).toBeNull();
    expect(jar.sent.get(SESSION_COOKIE)?.value).toBe('');
    expect(await rowOf(token)).toBeUndefined();
  });

  it('moves its end with use and sends the cookie again', async () => {
    const { token } = await member();
    passDays(8);
    const { jar } = await load(token);
    expect(jar.sent.get(SESSION_COOKIE)?.value).toBe(token);
    passDays(13);
    expect((await load(token)).locals.user).not.toBeNull();
  });

  it('ends after 60 days under constant use', async () => {
    const { token } = await member();
    for (let day = 5; day <= 55; day += 5) {
      passDays(5);
      expect((await load(token)).locals.user, `day ${day}`).not.toBeNull();
    }
    passDays(4.9);
    expect((await load(token)).locals.user).not.toBeNull();
    passDays(0.2);
    expect((await load(token)).locals.user).toBeNull();
  });

  it('ends at once when its user is disabled', async () => {
    const { user: made, token } = await member();
    await world.handle.db.update(user).set({ disabledAt: TEST_NOW }).where(eq(user.id, made.id));
    expect((await load(token)).locals.user).toBeNull();
  });

  it('takes a lowered role on the very next request', async () => {
    const { user: made, token } = await member();
    await world.handle.db.update(membership).set({ role: 'driver' }).where(eq(membership.userId, made.id));
    expect((await load(token)).locals.role).toBe('driver');
  });

  it('leaves a user without a team with no role', async () => {
    const { user: made, token } = await member();
    await world.handle.db.delete(membership).where(eq(membership.userId, made.id));
    expect((await load(token)).locals).toMatchObject({ user: made, team: null, role: null });
  });

  it('takes a dead cookie back and ignores the cookie beside an Authorization header', async () => {
    expect((await load('no such token')).jar.sent.get(SESSION_COOKIE)?.value).toBe('');
    const { token } = await member();
    expect((await load(token, { authorization: 'Bearer something' })).locals.user).toBeNull();
  });
});

describe('ending sessions', () => {
  it('ends all of a user but the one kept', async () => {
    const { user: made, token } = await member();
    const other = await startSession(world.handle, made.id, null);
    const stranger = await member();
    await endUserSessions(world.handle, made.id, token);
    expect(await readSession(world.handle, other)).toBeNull();
    expect(await readSession(world.handle, token)).not.toBeNull();
    expect(await readSession(world.handle, stranger.token)).not.toBeNull();
  });

  it('clears what has expired', async () => {
    const { token } = await member();
    passDays(15);
    await endExpiredSessions(world.handle);
    expect(await rowOf(token)).toBeUndefined();
  });
});

describe('a user in several teams', () => {
  async function inTwoTeams() {
    const mine = await member();
    const second = await addTeam(world.handle, 'Second team');
    const seat = {
      id: 'seat',
      teamId: second.team.id,
      userId: mine.user.id,
      role: 'tuner' as const,
      createdAt: '2027-01-01T00:00:00.000Z',
    };
    await world.handle.db.insert(membership).values(seat);
    const as = { ...contextFor(world, 'owner'), user: mine.user };
    return { ...mine, second, as };
  }

  const switchTo = async (token: string, teamId: string) => {
    const call = await load(token);
    return callRoute((context) => switchRoute({ ...context, locals: call.locals } as never) as Promise<Response>, {
      body: { teamId },
    });
  };

  it('works for the team they switch to', async () => {
    const { token, second } = await inTwoTeams();
    expect((await switchTo(token, second.team.id)).status).toBe(200);
    expect((await load(token)).locals).toMatchObject({ team: { id: second.team.id }, role: 'tuner' });
  });

  it('cannot switch to a team they are not in', async () => {
    const { token, team } = await inTwoTeams();
    expect((await switchTo(token, world.a.team.id)).status).toBe(404);
    expect((await load(token)).locals.team?.id).toBe(team.id);
  });

  it('falls back to the first team when the chosen one was left', async () => {
    const { token, team, second } = await inTwoTeams();
    await switchTo(token, second.team.id);
    await world.handle.db.delete(membership).where(eq(membership.id, 'seat'));
    expect((await load(token)).locals.team?.id).toBe(team.id);
  });

  it('sees both in /api/me, and no secrets', async () => {
    const { token, team, second } = await inTwoTeams();
    const { locals } = await load(token);
    const { status, body } = await callRoute(
      (context) => meRoute({ ...context, locals } as never) as Promise<Response>,
    );
    expect(status).toBe(200);
    expect(body).toEqual({
      user: locals.user,
      team: { id: team.id, name: team.name, units: 'us' },
      role: 'owner',
      teams: [
        { id: team.id, name: team.name, role: 'owner' },
        { id: second.team.id, name: 'Second team', role: 'tuner' },
      ],
    });
  });
});
