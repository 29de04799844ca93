import { randomUUID } from 'node:crypto';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, membership, reading } from '@/db/schema';
import { contextFor, makeTestDb, sampleSeason, TEST_NOW, type World } from '../helpers';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const IMMUTABLE = [
  'reading',
  'pass',
  'suggestion',
  'own_estimate',
  'decision',
  'launch_sheet',
  'launch_sheet_seen',
  'service_record',
  'checklist_signoff',
  'audit_event',
];

/** One row in every table that must not change, each pointing at the ones before it. */
async function fillImmutableTables(): Promise<void> {
  const { car, track, round } = await sampleSeason(world);
  const [team, user] = [world.a.team.id, world.a.users.owner.id];
  const at = TEST_NOW;
  const { client } = world.handle;
  const insert = (sql: string, args: (string | number | null)[]) => client.execute({ sql, args });
  await world.handle.db
    .insert(reading)
    .values({ id: 'r', teamId: team, trackId: track.id, takenAt: at, source: 'hand', createdAt: at });
  await insert(
    "INSERT INTO pass (id, root_id, team_id, car_id, round_id, pass_no, run_at, settings, source, created_at) VALUES ('p', 'p', ?, ?, ?, 1, ?, '{}', 'hand', ?)",
    [team, car.id, round.id, at, at],
  );
  await insert(
    "INSERT INTO suggestion (id, team_id, car_id, round_id, reading_id, inputs, result, status, model_version, training_hash, passes_used, created_by, created_at) VALUES ('s', ?, ?, ?, 'r', '{}', '{}', 'hold', 'v', 'h', 8, ?, ?)",
    [team, car.id, round.id, user, at],
  );
  await insert(
    "INSERT INTO own_estimate (id, team_id, car_id, round_id, made_by, created_at) VALUES ('e', ?, ?, ?, ?, ?)",
    [team, car.id, round.id, user, at],
  );
  await insert(
    "INSERT INTO decision (id, team_id, suggestion_id, choice, final_settings, decided_by, created_at) VALUES ('d', ?, 's', 'decline', '{}', ?, ?)",
    [team, user, at],
  );
  await insert(
    "INSERT INTO launch_sheet (id, team_id, car_id, round_id, decision_id, version, settings, changes, published_by, created_at) VALUES ('l', ?, ?, ?, 'd', 1, '{}', '[]', ?, ?)",
    [team, car.id, round.id, user, at],
  );
  await insert(
    "INSERT INTO launch_sheet_seen (id, team_id, launch_sheet_id, user_id, seen_at) VALUES ('ls', ?, 'l', ?, ?)",
    [team, user, at],
  );
  await insert(
    "INSERT INTO service_record (id, team_id, car_id, measurements, recorded_by, created_at) VALUES ('sr', ?, ?, '{}', ?, ?)",
    [team, car.id, user, at],
  );
  await insert("INSERT INTO checklist_item (id, team_id, car_id, label, created_at) VALUES ('ci', ?, ?, 'x', ?)", [
    team,
    car.id,
    at,
  ]);
  await insert(
    "INSERT INTO checklist_signoff (id, team_id, item_id, round_id, signed_by, signed_at) VALUES ('cs', ?, 'ci', ?, ?, ?)",
    [team, round.id, user, at],
  );
}

describe('rows a decision rested on', () => {
  it('are never updated and never deleted', async () => {
    await fillImmutableTables();
    const { client } = world.handle;
    for (const table of IMMUTABLE) {
      const before = await client.execute(`SELECT * FROM ${table}`);
      expect(before.rows.length, table).toBeGreaterThan(0);
      await expect(client.execute(`UPDATE ${table} SET id = id || 'x'`), table).rejects.toThrow(
        /never edited|append only/,
      );
      await expect(client.execute(`DELETE FROM ${table}`), table).rejects.toThrow(/never edited|append only/);
      expect((await client.execute(`SELECT * FROM ${table}`)).rows, table).toEqual(before.rows);
    }
  });
});

describe('foreign keys', () => {
  it('are enforced on the connections of writes and of reads', async () => {
    const orphan = {
      id: randomUUID(),
      teamId: 'no team',
      userId: 'no user',
      role: 'owner' as const,
      createdAt: TEST_NOW,
    };
    await expect(world.handle.write((db) => db.insert(membership).values(orphan))).rejects.toThrow();
    const batch = world.handle.write((db) => db.batch([db.insert(membership).values(orphan)]));
    await expect(batch).rejects.toThrow();
    const rows = await world.handle.db.select().from(membership);
    expect(rows.some(({ id }) => id === orphan.id)).toBe(false);
  });
});

describe('the write queue', () => {
  const auditRow = (n: number) => ({
    id: `row-${n}`,
    action: 'test',
    subjectType: 'test',
    detail: { n },
    at: TEST_NOW,
  });

  it('lets 50 writers in at once and loses none', async () => {
    const { write, db } = world.handle;
    const all = Array.from({ length: 50 }, (_, n) =>
      write((inner) =>
        inner.transaction(async (tx) => {
          const seen = await tx.select().from(auditEvent);
          await tx.insert(auditEvent).values({ ...auditRow(n), detail: { n, seen: seen.length } });
        }),
      ),
    );
    await Promise.all(all);
    const rows = await db.select().from(auditEvent);
    expect(rows.map(({ detail }) => detail.seen).sort((a, b) => Number(a) - Number(b))).toEqual(all.map((_, n) => n));
  });

  it('goes on after a write that failed', async () => {
    const { write, db } = world.handle;
    const failing = write(async () => {
      throw new Error('on purpose');
    });
    const after = write((inner) => inner.insert(auditEvent).values(auditRow(1)));
    await expect(failing).rejects.toThrow('on purpose');
    await after;
    expect(await db.select().from(auditEvent)).toHaveLength(1);
  });

  it('stores nothing of a batch when one part fails', async () => {
    const { write, db } = world.handle;
    const twice = write((inner) =>
      inner.batch([inner.insert(auditEvent).values(auditRow(1)), inner.insert(auditEvent).values(auditRow(1))]),
    );
    await expect(twice).rejects.toThrow();
    expect(await db.select().from(auditEvent)).toEqual([]);
  });
});

it('gives each test a database of its own', async () => {
  const other = await makeTestDb();
  await sampleSeason(other);
  const ctx = contextFor(world, 'owner');
  expect(await ctx.db.select().from(auditEvent)).toEqual([]);
});
