import { and, eq } from 'drizzle-orm';
import { reading } from '@/db/schema';
import type { ReadingInput } from '@/lib/forms/reading';
import type { ServerContext } from '../context';
import { conflict, validationError } from '../errors';
import { type Reader, type ReadingRow, type TrackRow, teamRound } from '../lookup';

export type NewReading = typeof reading.$inferInsert;

const DAY_MS = 86_400_000;

/** What was entered, as a row: the altitude of an altimeter setting is the track's at the time of entry. */
export function readingRow(ctx: ServerContext, input: Omit<ReadingInput, 'trackId'>, track: TrackRow): NewReading {
  const createdAt = ctx.now().toISOString();
  return {
    ...input,
    id: crypto.randomUUID(),
    teamId: ctx.team.id,
    trackId: track.id,
    takenAt: input.takenAt ?? createdAt,
    altitudeM: track.altitudeM,
    source: input.source ?? 'hand',
    enteredBy: ctx.user.id,
    createdAt,
  };
}

/** Refuses what only the surroundings of a reading can tell: the track's altitude, the round's track, the clock. */
export async function checkSurroundings(ctx: ServerContext, row: NewReading, track: TrackRow): Promise<void> {
  if (row.pressureKind === 'altimeter' && row.pressurePa != null && track.altitudeM === null)
    throw noAltitude(track.name);
  if (Date.parse(row.takenAt) > ctx.now().getTime() + DAY_MS) throw inTheFuture();
  if (!row.roundId) return;
  const place = await teamRound(ctx, row.roundId);
  if (place.track.id !== track.id) throw otherTrack(place.round.name, place.track.name);
}

const noAltitude = (trackName: string) =>
  validationError(
    `The altitude of ${trackName} is not known, so an altimeter setting cannot be turned into station pressure. Enter the altitude of the track, or read the station pressure.`,
    { pressureKind: 'Enter the altitude of the track first, or send the station pressure.' },
  );

const inTheFuture = () => {
  const message = 'The time of the reading is more than a day ahead. Check the date and the offset.';
  return validationError(message, { takenAt: message });
};

const otherTrack = (roundName: string, trackName: string) => {
  const message = `Round ${roundName} is at ${trackName}. Choose the round and the track of the same event.`;
  return validationError(message, { roundId: message });
};

/** The row a device has sent before under this client id, or null. */
export async function sentBefore(ctx: ServerContext, db: Reader, clientId: string | null): Promise<ReadingRow | null> {
  if (!clientId) return null;
  const [row] = await db
    .select()
    .from(reading)
    .where(and(eq(reading.teamId, ctx.team.id), eq(reading.clientId, clientId)));
  return row ?? null;
}

const SERVER_MADE = new Set(['id', 'createdAt', 'enteredBy', 'altitudeM', 'clientId', 'teamId']);

/**
 * Same client id and same values: the first row is the answer. Other values: a refusal, nothing is lost or overwritten.
 * A time that was not sent is not compared: it was set when the first copy arrived.
 */
export function assertSameReading(first: ReadingRow, again: NewReading, timeSent: boolean): ReadingRow {
  const names = Object.keys(again).filter((name) => !SERVER_MADE.has(name) && (timeSent || name !== 'takenAt'));
  const other = names.find(
    (name) => (first[name as keyof ReadingRow] ?? null) !== (again[name as keyof NewReading] ?? null),
  );
  if (other === undefined) return first;
  throw conflict(
    `This clientId was used before for a reading with another ${other}. Use a new clientId for a new reading.`,
  );
}
