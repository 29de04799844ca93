import { and, eq } from 'drizzle-orm';
import { discSet } from '@/db/schema';
import type { ServerContext } from '../context';
import { notFound, validationError } from '../errors';
import { type RoundPlace, teamReading, teamRound } from '../lookup';

const DAY_MS = 86_400_000;

export interface Links {
  carId: string;
  roundId: string;
  readingId: string | null;
  discSetId: string | null;
  runAt: string;
}

/** Checks that what a pass points at is the team's and fits together. Throws NOT_FOUND or VALIDATION; answers with the round. */
export async function checkLinks(ctx: ServerContext, links: Links): Promise<RoundPlace> {
  const place = await teamRound(ctx, links.roundId);
  if (links.readingId) await refuseOtherTrack(ctx, links.readingId, place);
  if (links.discSetId) await refuseOtherCarsDiscs(ctx, links.discSetId, links.carId);
  if (Date.parse(links.runAt) > ctx.now().getTime() + DAY_MS) throw inTheFuture();
  return place;
}

async function refuseOtherTrack(ctx: ServerContext, readingId: string, place: RoundPlace): Promise<void> {
  const reading = await teamReading(ctx, readingId);
  if (reading.trackId === place.track.id) return;
  const message = `That reading was not taken at ${place.track.name}. Choose a reading of the track of the round.`;
  throw validationError(message, { readingId: message });
}

async function refuseOtherCarsDiscs(ctx: ServerContext, discSetId: string, carId: string): Promise<void> {
  const [row] = await ctx.db
    .select({ carId: discSet.carId })
    .from(discSet)
    .where(and(eq(discSet.id, discSetId), eq(discSet.teamId, ctx.team.id)));
  if (!row) throw notFound('disc set');
  const message = 'That disc set belongs to another car.';
  if (row.carId !== carId) throw validationError(message, { discSetId: message });
}

const inTheFuture = () => {
  const message = 'The time of the pass is more than a day ahead. Check the date and the offset.';
  return validationError(message, { runAt: message });
};
