import { and, eq, lte, type SQL, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { event, pass, reading, round, track, user } from '@/db/schema';
import type { Reader } from '../lookup';

/** The row that corrected a pass row; none while the row stands. */
export const successor = alias(pass, 'successor');

/** Columns of a pass with where it was run, the reading that stands for it, and the row that replaced it. */
const columns = {
  pass,
  event: { id: event.id, name: event.name, startsOn: event.startsOn },
  track: { id: track.id, name: track.name, timeZone: track.timeZone, altitudeM: track.altitudeM },
  round: { id: round.id, name: round.name },
  reading,
  enteredByName: user.name,
  successorId: successor.id,
};

/**
 * Pass rows of a team with everything they point at. `asOf` (UTC instant) shows them as they stood then: later corrections of
 * passes and readings are not seen.
 */
export function joinedPasses(db: Reader, teamId: string, where: SQL | undefined, asOf: string | null = null) {
  const known = asOf === null ? undefined : lte(pass.createdAt, asOf);
  const knownSuccessor = asOf === null ? undefined : lte(successor.createdAt, asOf);
  return db
    .select(columns)
    .from(pass)
    .innerJoin(round, eq(round.id, pass.roundId))
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .leftJoin(reading, eq(reading.id, standingReadingId(asOf)))
    .leftJoin(user, eq(user.id, pass.enteredBy))
    .leftJoin(successor, and(eq(successor.correctsId, pass.id), knownSuccessor))
    .where(and(eq(pass.teamId, teamId), known, where))
    .$dynamic();
}

/** Follows the corrections of the pass's reading to the last one (known at `asOf`). */
function standingReadingId(asOf: string | null): SQL<string | null> {
  const known = asOf === null ? sql`` : sql` where r.created_at <= ${asOf}`;
  return sql`(with recursive chain(id, depth) as (
    select ${pass.readingId}, 0
    union all select r.id, depth + 1 from chain join reading r on r.corrects_id = chain.id${known}
  ) select id from chain order by depth desc limit 1)`;
}

export type JoinedPass = Awaited<ReturnType<typeof joinedPasses>>[number];
