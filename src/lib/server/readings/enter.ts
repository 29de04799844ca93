import { reading } from '@/db/schema';
import { readingInput } from '@/lib/forms/reading';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { type TrackRow, teamTrack } from '../lookup';
import { checkReading, type ReadingWarning } from './check';
import { getReading } from './list';
import { assertSameReading, checkSurroundings, type NewReading, readingRow, sentBefore } from './rows';
import type { ReadingView } from './view';

export interface EnteredReading extends ReadingView {
  /** What looks wrong although it was stored. */
  warnings: ReadingWarning[];
}

/** Enters a reading (SI). Sent again with the same clientId and values it adds nothing. Throws VALIDATION or CONFLICT. */
export async function enterReading(ctx: ServerContext, raw: unknown): Promise<EnteredReading> {
  requireCan(ctx, 'reading:enter');
  const input = readingInput.parse(raw);
  const track = await teamTrack(ctx, input.trackId);
  const row = readingRow(ctx, input, track);
  return storeReading(ctx, row, track, { action: 'reading.enter', timeSent: input.takenAt !== null });
}

export interface Storing {
  action: string;
  timeSent: boolean;
  detail?: Record<string, unknown>;
  /** Asked inside the write, before anything is stored. */
  guard?: () => Promise<void>;
}

/** Checks a row against its surroundings and stores it once; answers with the row that stands for it. */
export async function storeReading(
  ctx: ServerContext,
  row: NewReading,
  track: TrackRow,
  storing: Storing,
): Promise<EnteredReading> {
  await checkSurroundings(ctx, row, track);
  const warnings = await checkReading(ctx, row, track);
  const id = await ctx.write(async (db) => {
    const first = await sentBefore(ctx, db, row.clientId ?? null);
    if (first) return assertSameReading(first, row, storing.timeSent).id;
    await storing.guard?.();
    const subject = { type: 'reading', id: row.id };
    await db.batch([db.insert(reading).values(row), auditInsert(db, ctx, storing.action, subject, storing.detail)]);
    return row.id;
  });
  return { ...(await getReading(ctx, id)), warnings };
}
