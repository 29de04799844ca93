import { and, count, eq, gt } from 'drizzle-orm';
import { pass, type suggestion } from '@/db/schema';
import type { ServerContext } from '../context';
import { latestReading, standingReading } from '../readings';

/** What has changed since a suggestion was made; the suggestion itself never does. */
export interface Staleness {
  /** The reading it used has been corrected. */
  readingCorrected: boolean;
  /** Id of a newer reading at that track; null when there is none. */
  newerReadingId: string | null;
  /** Passes logged, corrected, excluded or restored since. */
  passChanges: number;
}

type SuggestionRow = typeof suggestion.$inferSelect;

export async function staleness(ctx: ServerContext, made: SuggestionRow): Promise<Staleness> {
  const used = await standingReading(ctx, made.readingId);
  const newest = await latestReading(ctx, used.trackId);
  const newer = newest && newest.takenAt > used.takenAt ? newest.id : null;
  return {
    readingCorrected: used.id !== made.readingId,
    newerReadingId: newer,
    passChanges: await passChangesSince(ctx, made),
  };
}

async function passChangesSince(ctx: ServerContext, { carId, createdAt }: SuggestionRow): Promise<number> {
  const [row] = await ctx.db
    .select({ changes: count() })
    .from(pass)
    .where(and(eq(pass.teamId, ctx.team.id), eq(pass.carId, carId), gt(pass.createdAt, createdAt)));
  return row?.changes ?? 0;
}
