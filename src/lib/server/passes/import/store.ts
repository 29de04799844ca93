import type { BatchItem } from 'drizzle-orm/batch';
import type { Db } from '@/db/client';
import { event, pass, reading, round, track } from '@/db/schema';
import { auditInsert } from '../../audit';
import type { ServerContext } from '../../context';
import type { PreparedImport } from './plan';

type Statement = BatchItem<'sqlite'>;

// SQLite takes 32 766 values in a statement; a pass row has under 40.
const ROWS_PER_STATEMENT = 500;

/** Stores everything of an import in one transaction: all of it or nothing. */
export async function storeImport(ctx: ServerContext, db: Db, carId: string, prepared: PreparedImport): Promise<void> {
  const { plan, places, runs } = prepared;
  const readings = runs.flatMap((run) => run.reading ?? []);
  const passes = runs.map((run) => run.pass);
  const { counts, newTracks, newEvents } = plan;
  const detail = { counts, newTracks: newTracks.length, newEvents: newEvents.length };
  await db.batch([
    auditInsert(db, ctx, 'pass.import', { type: 'car', id: carId }, detail),
    ...chunks(places.newTracks).map((rows): Statement => db.insert(track).values(rows)),
    ...chunks(places.newEvents).map((rows): Statement => db.insert(event).values(rows)),
    ...chunks(places.newRounds).map((rows): Statement => db.insert(round).values(rows)),
    ...chunks(readings).map((rows): Statement => db.insert(reading).values(rows)),
    ...chunks(passes).map((rows): Statement => db.insert(pass).values(rows)),
  ]);
}

function chunks<T>(rows: readonly T[]): T[][] {
  const count = Math.ceil(rows.length / ROWS_PER_STATEMENT);
  return Array.from({ length: count }, (_, i) => rows.slice(i * ROWS_PER_STATEMENT, (i + 1) * ROWS_PER_STATEMENT));
}
