/** Import of 10 000 passes through the server's own verb into a fresh database file. */
import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { openDatabase } from '@/db/client';
import { migrateDatabase } from '@/db/migrate';
import { membership, team, user } from '@/db/schema';
import { GENERATORS, simulateSeason } from '@/evaluate/generators';
import type { PassRecord } from '@/lib/domain/types';
import { cToF, paToInHg } from '@/lib/domain/units';
import { createCar } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { importPasses } from '@/lib/server/passes';
import { type Figure, onceMs } from './lib-bench';

const ROWS = 10_000;

export async function benchImport(): Promise<Figure[]> {
  const folder = await mkdtemp(join(tmpdir(), 'slipband-bench-'));
  const handle = await openDatabase({ url: `file:${join(folder, 'bench.db')}`, authToken: undefined });
  try {
    await migrateDatabase(handle);
    const ctx = await ownerContext(handle);
    const car = await createCar(ctx, { name: 'Bench car' });
    const file = passFile();
    const ms = await onceMs(() => importPasses(ctx, { carId: car.id, file, dryRun: false }));
    const again = await onceMs(() => importPasses(ctx, { carId: car.id, file, dryRun: false }));
    return [
      {
        name: `import of ${ROWS} rows`,
        value: ms / 1000,
        unit: 's',
        goal: 5,
        note: `the same file again, adding nothing: ${(again / 1000).toFixed(1)} s`,
      },
    ];
  } finally {
    handle.close();
    await rm(folder, { recursive: true, force: true });
  }
}

async function ownerContext(handle: Awaited<ReturnType<typeof openDatabase>>): Promise<ServerContext> {
  const now = new Date();
  const createdAt = now.toISOString();
  const current = { id: randomUUID(), name: 'Bench team', units: 'us' as const, demo: false };
  const person = { id: randomUUID(), name: 'Bench owner', email: 'bench@example.test' };
  await handle.write((db) =>
    db.batch([
      db.insert(team).values({ ...current, createdAt }),
      db.insert(user).values({ ...person, passwordHash: 'none', createdAt }),
      db
        .insert(membership)
        .values({ id: randomUUID(), teamId: current.id, userId: person.id, role: 'owner', createdAt }),
    ]),
  );
  return {
    db: handle.db,
    write: handle.write,
    team: current,
    user: person,
    role: 'owner',
    requestId: 'bench',
    now: () => now,
  };
}

function passFile(): string {
  const options = { ...GENERATORS[1]!, name: 'bench-import', events: ROWS / 10, passesPerEvent: 10 };
  const { passes, adjustables } = simulateSeason(options, 1);
  const keys = adjustables.map((a) => a.key);
  const header = [
    'pass_no,event,track,date_time,round,lane,air_temp_f,relative_humidity_pct,station_pressure_inhg,track_temp_f',
    ...keys,
    'runs_on_discs,slip_pct,outcome',
  ];
  return [header.join(','), ...passes.map((p) => passLine(p, keys))].join('\n');
}

function passLine(p: PassRecord, keys: readonly string[]): string {
  const { airTempC, relativeHumidity, stationPressurePa, trackTempC } = p.conditions;
  const readings = [cToF(airTempC!), relativeHumidity! * 100, paToInHg(stationPressurePa!), cToF(trackTempC!)].map(
    (v) => v.toFixed(3),
  );
  return [
    p.passNo,
    p.event,
    p.track,
    p.time,
    p.round,
    p.lane,
    ...readings,
    ...keys.map((k) => p.settings[k]),
    p.runsOnDiscs,
    p.slipPct,
    p.outcome,
  ].join(',');
}
