/** Loads what the conditions pages show: tracks with their last readings, rounds to choose from, the readings that stand. */
import type { RawReading } from '@/lib/domain/air/conditions';
import type { ServerContext } from '@/lib/server/context';
import { type EventView, listEvents } from '@/lib/server/events';
import { listReadings, type ReadingView } from '@/lib/server/readings';
import { listRounds, type RoundView } from '@/lib/server/rounds';
import { listTracks, type TrackView } from '@/lib/server/tracks';
import { type PreviousHints, previousHints } from './previous';
import { calendarDay, chooseRound, chooseTrack } from './where';

const RECENT = 8;
const EVENTS_WITH_ROUNDS = 4;

/** A track as the entry page knows it; plain data, also for the browser. */
export interface EntryTrack {
  id: string;
  name: string;
  altitudeM: number | null;
  latitudeDeg: number | null;
  longitudeDeg: number | null;
  timeZone: string;
  previous: (RawReading & { takenAt: string }) | null;
  hints: PreviousHints;
}

export interface ConditionsData {
  now: Date;
  tracks: EntryTrack[];
  trackId: string | null;
  /** Nothing said which track it is: the device may know better. */
  trackIsGuess: boolean;
  rounds: RoundView[];
  /** The next planned round at each track. */
  nextRound: Readonly<Record<string, string>>;
  last: ReadingView | null;
  recent: ReadingView[];
}

export async function loadConditions(ctx: ServerContext, askedTrackId: string | null): Promise<ConditionsData> {
  const now = ctx.now();
  const [tracks, events, recent] = await Promise.all([
    listTracks(ctx),
    listEvents(ctx),
    listReadings(ctx, { limit: RECENT }),
  ]);
  const choice = chooseTrack({ tracks, events, recent, askedTrackId, now });
  const last = await lastByTrack(ctx, tracks);
  const rounds = await roundsToChoose(ctx, events, now);
  return {
    now,
    tracks: tracks.map((track) => entryTrack(ctx, track, last.get(track.id) ?? null, now)),
    ...choice,
    rounds,
    nextRound: Object.fromEntries(tracks.map(({ id }) => [id, chooseRound(rounds, id, now) ?? ''])),
    last: (choice.trackId && last.get(choice.trackId)) || recent[0] || null,
    recent,
  };
}

async function lastByTrack(ctx: ServerContext, tracks: readonly TrackView[]): Promise<Map<string, ReadingView | null>> {
  const pairs = tracks.map(async ({ id }) => [id, await lastBefore(ctx, id)] as const);
  return new Map(await Promise.all(pairs));
}

const CLOCKS_AGREE_MS = 5 * 60_000;
const LOOK_BACK = 20;

// A reading dated ahead by mistake is nothing to compare with.
async function lastBefore(ctx: ServerContext, trackId: string): Promise<ReadingView | null> {
  const latest = ctx.now().getTime() + CLOCKS_AGREE_MS;
  const readings = await listReadings(ctx, { trackId, limit: LOOK_BACK });
  return readings.find((reading) => Date.parse(reading.takenAt) <= latest) ?? null;
}

function entryTrack(ctx: ServerContext, track: TrackView, last: ReadingView | null, now: Date): EntryTrack {
  const { id, name, altitudeM, latitudeDeg, longitudeDeg, timeZone } = track;
  const hints = previousHints(last, ctx.team.units, now);
  return { id, name, altitudeM, latitudeDeg, longitudeDeg, timeZone, previous: last && rawOf(last), hints };
}

function rawOf(reading: ReadingView): RawReading & { takenAt: string } {
  const { airTempC, relativeHumidity, dewPointC, wetBulbC, pressurePa, pressureKind, altitudeM, trackTempC, takenAt } =
    reading;
  return { airTempC, relativeHumidity, dewPointC, wetBulbC, pressurePa, pressureKind, altitudeM, trackTempC, takenAt };
}

/** Rounds of the events that are on or to come, the nearest first; of the last event when there is none. */
async function roundsToChoose(ctx: ServerContext, events: readonly EventView[], now: Date): Promise<RoundView[]> {
  const open = events.filter((event) => event.endsOn >= calendarDay(now, event.timeZone)).reverse();
  const chosen = (open.length > 0 ? open : events).slice(0, open.length > 0 ? EVENTS_WITH_ROUNDS : 1);
  const lists = await Promise.all(chosen.map((event) => listRounds(ctx, { eventId: event.id })));
  return lists.flat();
}
