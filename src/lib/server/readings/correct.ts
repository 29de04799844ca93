import { readingCorrection } from '@/lib/forms/reading';
import { requireCan, type ServerContext } from '../context';
import { conflict } from '../errors';
import { teamReading, teamTrack } from '../lookup';
import { type EnteredReading, storeReading } from './enter';
import { correctionOf } from './list';
import { readingRow } from './rows';

/**
 * Enters the reading as it should have been, as a new row that points at the old. Every measurement is sent again; track, round
 * and time stay when they are left out. Throws CONFLICT when the reading has been corrected already.
 */
export async function correctReading(ctx: ServerContext, readingId: string, raw: unknown): Promise<EnteredReading> {
  requireCan(ctx, 'reading:enter');
  const { reason, ...input } = readingCorrection.parse(raw);
  const old = await teamReading(ctx, readingId);
  const track = await teamTrack(ctx, input.trackId ?? old.trackId);
  const place = { roundId: input.roundId ?? old.roundId, takenAt: input.takenAt ?? old.takenAt };
  const row = { ...readingRow(ctx, { ...input, ...place }, track), correctsId: readingId };
  return storeReading(ctx, row, track, {
    action: 'reading.correct',
    timeSent: true,
    detail: { correctsId: readingId, reason },
    guard: () => refuseCorrected(ctx, readingId),
  });
}

async function refuseCorrected(ctx: ServerContext, readingId: string): Promise<void> {
  const other = await correctionOf(ctx, readingId, ctx.db);
  if (other) throw conflict('This reading was corrected by someone else. Open the corrected one and check it first.');
}
