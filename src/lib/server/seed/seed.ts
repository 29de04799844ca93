import { and, count, eq, inArray } from 'drizzle-orm';
import { runAsScript } from '@/db/cli';
import { type DatabaseHandle, type Db, openDatabase } from '@/db/client';
import { migrateDatabase } from '@/db/migrate';
import * as schema from '@/db/schema';
import { type DemoPerson, generateDemoSeason } from '@/demo';
import { bringForward } from '@/demo/bring-forward';
import type { Role } from '@/lib/domain/permissions';
import { auditInsert } from '../audit';
import { hashPassword } from '../auth/password';
import { type SeedRows, seedRows } from './seed-rows';

export interface DemoSignIn {
  name: string;
  email: string;
  role: Role;
  password: string;
}

export interface SeedResult {
  /** Whether this call put the demo in. */
  seeded: boolean;
  /** The demo's sign-ins, when the database holds the demo. */
  people: DemoSignIn[];
  /** Why nothing was put in; null when it was. */
  refused: string | null;
}

type Env = Readonly<Record<string, string | undefined>>;

/**
 * Fills an empty local database with the invented demo team and its season, in one write. A database with any team in it, one that
 * is not a local file, and production are left as they are. A second run changes nothing. The season is moved to end at `now`.
 */
export async function seedDemo(handle: DatabaseHandle, env: Env = process.env, now = new Date()): Promise<SeedResult> {
  const refused = await whyNot(handle, env);
  if (refused !== null) return { seeded: false, people: await demoSignIns(handle, env), refused };
  const season = bringForward(generateDemoSeason(), now.toISOString());
  const rows = seedRows(season, await hashes(season.people));
  await handle.write((db) => insertAll(db, rows));
  return { seeded: true, people: [...season.people], refused: null };
}

async function whyNot(handle: DatabaseHandle, env: Env): Promise<string | null> {
  if (isProduction(env)) return 'This is production: the demo has no place here.';
  if (handle.client.protocol !== 'file') return 'The database is not a local file: the demo is not put into it.';
  const [teams] = await handle.db.select({ n: count() }).from(schema.team);
  return teams?.n === 0 ? null : 'The database has a team already: nothing was changed.';
}

const isProduction = (env: Env): boolean => env.NODE_ENV === 'production' || env.SLIPBAND_MODE === 'production';

/** The sign-ins that the demo made and that are still there, for the start message. */
async function demoSignIns(handle: DatabaseHandle, env: Env): Promise<DemoSignIn[]> {
  if (isProduction(env)) return [];
  const { people } = generateDemoSeason();
  const emails = people.map(({ email }) => email);
  const found = await handle.db
    .select({ email: schema.user.email })
    .from(schema.user)
    .innerJoin(schema.membership, eq(schema.membership.userId, schema.user.id))
    .innerJoin(schema.team, eq(schema.team.id, schema.membership.teamId))
    .where(and(inArray(schema.user.email, emails), eq(schema.team.demo, true)));
  return people.filter(({ email }) => found.some((row) => row.email === email));
}

async function hashes(people: readonly DemoPerson[]): Promise<Map<DemoPerson, string>> {
  return new Map(
    await Promise.all(people.map(async (person) => [person, await hashPassword(person.password)] as const)),
  );
}

function insertAll(db: Db, rows: SeedRows) {
  const { team, user, membership, car, adjustable, discSet, track, event, round, reading, pass } = schema;
  const actor = { user: null, team: rows.team, requestId: 'seed', now: () => new Date() };
  return db.batch([
    db.insert(team).values(rows.team),
    db.insert(user).values(rows.users),
    db.insert(membership).values(rows.memberships),
    db.insert(car).values(rows.car),
    db.insert(adjustable).values(rows.adjustables),
    db.insert(discSet).values(rows.discSets),
    db.insert(track).values(rows.tracks),
    db.insert(event).values(rows.events),
    db.insert(round).values(rows.rounds),
    db.insert(reading).values(rows.readings),
    db.insert(pass).values(rows.passes),
    auditInsert(db, actor, 'demo.seed', { type: 'team', id: rows.team.id }, { passes: rows.passes.length }),
  ]);
}

async function main(): Promise<void> {
  const handle = await openDatabase();
  try {
    await migrateDatabase(handle);
    const { refused, people } = await seedDemo(handle);
    const signIns = people.map(({ role, email, password }) => `${role.padEnd(11)} ${email}  ${password}`);
    console.log([refused ?? 'The demo team and its season are in the database.', ...signIns].join('\n'));
  } finally {
    handle.close();
  }
}

runAsScript('seed', import.meta.url, main);
