import { sql } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import type { DatabaseHandle } from '@/db/client';
import { adjustable, car, event, membership, pass, reading, round, team, track, user } from '@/db/schema';
import { generateDemoSeason } from '@/demo';
import { ROLES } from '@/lib/domain/permissions';
import { setDatabase } from '@/lib/server/runtime';
import { seedDemo } from '@/lib/server/seed/seed';
import { signInAs } from '../auth/people';
import { addTeam, emptyDatabase, TEST_NOW } from '../helpers';

const TABLES = { team, user, membership, car, adjustable, track, event, round, reading, pass };

async function contents(handle: DatabaseHandle) {
  const entries = Object.entries(TABLES).map(async ([name, table]) => [name, await handle.db.select().from(table)]);
  return Object.fromEntries(await Promise.all(entries)) as Record<keyof typeof TABLES, Record<string, unknown>[]>;
}

describe('seedDemo', () => {
  it('fills an empty database with the whole season, marked as demo', async () => {
    const handle = await emptyDatabase();
    const season = generateDemoSeason();
    expect(await seedDemo(handle, {})).toMatchObject({ seeded: true, refused: null });
    const stored = await contents(handle);
    expect(stored.team).toMatchObject([{ name: season.team.name, demo: true }]);
    expect(stored.pass).toHaveLength(season.passes.length);
    expect(stored.pass.length).toBeGreaterThanOrEqual(120);
    expect(stored.reading).toHaveLength(season.readings.length);
    expect(stored.round).toHaveLength(season.rounds.length);
    expect(stored.membership.map(({ role }) => role).sort()).toEqual([...ROLES].sort());
  });

  it('stores each pass with the settings, result and reading it was made with', async () => {
    const handle = await emptyDatabase();
    await seedDemo(handle, {});
    const { passes, readings } = generateDemoSeason();
    const rows = await handle.db
      .select({
        passNo: pass.passNo,
        settings: pass.settings,
        slipPct: pass.slipPct,
        trackTempC: reading.trackTempC,
        roundId: pass.roundId,
        readingRound: reading.roundId,
      })
      .from(pass)
      .innerJoin(reading, sql`${reading.id} = ${pass.readingId}`)
      .orderBy(pass.passNo);
    expect(rows).toHaveLength(passes.length);
    for (const [index, row] of rows.entries()) {
      const told = passes[index];
      expect(row.settings).toEqual(told?.settings);
      expect(row.slipPct).toBe(told?.slipPct);
      expect(row.trackTempC).toBe(readings.find(({ ref }) => ref === told?.readingRef)?.trackTempC);
      expect(row.readingRound).toBe(row.roundId);
    }
  });

  it('changes nothing the second time, and still tells the sign-ins', async () => {
    const handle = await emptyDatabase();
    const first = await seedDemo(handle, {});
    const before = await contents(handle);
    const second = await seedDemo(handle, {});
    expect(second).toMatchObject({ seeded: false, people: first.people });
    expect(await contents(handle)).toEqual(before);
  });

  it('makes a sign-in for each role that works', async () => {
    const handle = await emptyDatabase();
    setDatabase(handle);
    const { people } = await seedDemo(handle, {});
    expect(people).toHaveLength(5);
    for (const { email, password } of people) expect((await signInAs({ email, password })).status, email).toBe(200);
  });

  it.each([{ NODE_ENV: 'production' }, { SLIPBAND_MODE: 'production' }])('leaves production alone: %j', async (env) => {
    const handle = await emptyDatabase();
    expect(await seedDemo(handle, env)).toEqual({
      seeded: false,
      people: [],
      refused: expect.stringContaining('production'),
    });
    expect((await contents(handle)).user).toEqual([]);
  });

  it('leaves a database with any team alone, and tells no sign-ins', async () => {
    const handle = await emptyDatabase();
    await addTeam(handle, 'A real team');
    const before = await contents(handle);
    expect(await seedDemo(handle, {})).toMatchObject({ seeded: false, people: [] });
    expect(await contents(handle)).toEqual(before);
  });

  it('leaves a database that is not a local file alone', async () => {
    const handle = await emptyDatabase();
    const remote = {
      ...handle,
      client: new Proxy(handle.client, {
        get: (target, key) => (key === 'protocol' ? 'http' : Reflect.get(target, key)),
      }),
    };
    expect(await seedDemo(remote, {})).toMatchObject({
      seeded: false,
      refused: expect.stringContaining('not a local file'),
    });
    expect((await contents(handle)).team).toEqual([]);
  });
});

it('stores times that sort as text', async () => {
  const handle = await emptyDatabase();
  await seedDemo(handle, {});
  const rows = await handle.db.select({ at: pass.runAt }).from(pass);
  expect(rows.every(({ at }) => at.length === TEST_NOW.length && at.endsWith('Z'))).toBe(true);
});
