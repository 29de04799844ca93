import { randomUUID } from 'node:crypto';
import type { DatabaseHandle } from '@/db/client';
import { membership, team, user } from '@/db/schema';
import { ROLES, type Role } from '@/lib/domain/permissions';
import type { CurrentTeam, ServerContext, SignedInUser } from '@/lib/server/context';
import { setDatabase } from '@/lib/server/runtime';
import { emptyDatabase } from './database';

/** 2026-05-02 is when tests happen, unless they set another clock. */
export const TEST_NOW = '2026-05-02T15:00:00.000Z';

export interface TestTeam {
  team: CurrentTeam;
  users: Record<Role, SignedInUser>;
}

export interface World {
  handle: DatabaseHandle;
  a: TestTeam;
  b: TestTeam;
}

/**
 * A database of its own with two teams, a user in each role of each, and set as the database of the routes.
 * @example
 *   const world = await makeTestDb();
 *   await createCar(contextFor(world, 'crew_chief'), { name: 'Car 1' });
 *   await expect(getCar(contextFor(world, 'owner', 'b'), id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
 */
export async function makeTestDb(): Promise<World> {
  const handle = await emptyDatabase();
  setDatabase(handle);
  return { handle, a: await addTeam(handle, 'Team A'), b: await addTeam(handle, 'Team B') };
}

/** The context of a verb for one role of a team; `now` is an ISO instant. */
export function contextFor(world: World, role: Role, which: 'a' | 'b' = 'a', now: string = TEST_NOW): ServerContext {
  const { team: current, users } = world[which];
  const { db, write } = world.handle;
  return { db, write, team: current, user: users[role], role, requestId: randomUUID(), now: () => new Date(now) };
}

/** The roles that may not: every role but those named. */
export const otherRoles = (...allowed: Role[]): Role[] => ROLES.filter((role) => !allowed.includes(role));

export async function addTeam(handle: DatabaseHandle, name: string): Promise<TestTeam> {
  const current: CurrentTeam = { id: randomUUID(), name, units: 'us', demo: false };
  const users = Object.fromEntries(ROLES.map((role) => [role, person(name, role)])) as Record<Role, SignedInUser>;
  const seat = (role: Role) => ({ id: randomUUID(), teamId: current.id, userId: users[role].id, role });
  await handle.write((db) =>
    db.batch([
      db.insert(team).values({ ...current, createdAt: TEST_NOW }),
      ...ROLES.flatMap((role) => [
        db.insert(user).values({ ...users[role], passwordHash: 'no password', createdAt: TEST_NOW }),
        db.insert(membership).values({ ...seat(role), createdAt: TEST_NOW }),
      ]),
    ]),
  );
  return { team: current, users };
}

function person(teamName: string, role: Role): SignedInUser {
  const id = randomUUID();
  return { id, name: `${role} of ${teamName}`, email: `${role}-${id}@example.test` };
}
