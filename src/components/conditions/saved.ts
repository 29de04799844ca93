/** The reading that was just stored, judged as it was when it came in. */
import type { ServerContext } from '@/lib/server/context';
import { AppError } from '@/lib/server/errors';
import { getReading, listReadings, type ReadingView } from '@/lib/server/readings';
import { getTrack } from '@/lib/server/tracks';
import { checksOf } from './live';

export interface SavedReadingData {
  reading: ReadingView;
  warnings: { message: string }[];
  timeZone: string;
}

/** Null without an id, and for one that is none of the team's. */
export async function savedReading(ctx: ServerContext, readingId: string | null): Promise<SavedReadingData | null> {
  if (!readingId) return null;
  try {
    const reading = await getReading(ctx, readingId);
    const track = await getTrack(ctx, reading.trackId);
    const place = { ...track, altitudeM: reading.altitudeM, previous: await readingBefore(ctx, reading) };
    const warnings = checksOf(reading, place, reading.takenAt, ctx.team.units);
    return { reading, warnings, timeZone: track.timeZone };
  } catch (error) {
    if (error instanceof AppError && error.code === 'NOT_FOUND') return null;
    throw error;
  }
}

async function readingBefore(ctx: ServerContext, reading: ReadingView): Promise<ReadingView | null> {
  const atTrack = await listReadings(ctx, { trackId: reading.trackId });
  return atTrack.find((one) => one.id !== reading.id && one.takenAt <= reading.takenAt) ?? null;
}
