import type { Db } from '@/db/client';
import { event, pass, reading, round, track } from '@/db/schema';
import { auditInsert } from '../../audit';
import { bulkInsert } from '../../bulk-insert';
import type { ServerContext } from '../../context';
import type { PreparedImport } from './plan';

/** Stores everything of an import in one transaction: all of it or nothing. */
export async function storeImport(ctx: ServerContext, db: Db, carId: string, prepared: PreparedImport): Promise<void> {
  const { plan, places, runs } = prepared;
  const readings = runs.flatMap((run) => run.reading ?? []);
  const passes = runs.map((run) => run.pass);
  const { counts, newTracks, newEvents } = plan;
  const detail = { counts, newTracks: newTracks.length, newEvents: newEvents.length };
  await db.batch([
    auditInsert(db, ctx, 'pass.import', { type: 'car', id: carId }, detail),
    db.run(bulkInsert(track, places.newTracks)),
    db.run(bulkInsert(event, places.newEvents)),
    db.run(bulkInsert(round, places.newRounds)),
    db.run(bulkInsert(reading, readings)),
    db.run(bulkInsert(pass, passes)),
  ]);
}
