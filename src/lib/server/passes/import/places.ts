import { randomUUID } from 'node:crypto';
import type { event, round } from '@/db/schema';
import type { PassCsvRow } from '@/lib/pass-csv';
import type { TrackRow } from '../../lookup';
import { guessTimeZone, localDate } from './zone';

export type EventRow = typeof event.$inferSelect;
export type RoundRow = typeof round.$inferSelect;

/** What a team has already. */
export interface KnownPlaces {
  tracks: readonly TrackRow[];
  events: readonly EventRow[];
  rounds: readonly RoundRow[];
}

/** Where a row of the file was run: existing or to be created. */
export interface RowPlace {
  track: TrackRow;
  event: EventRow;
  round: RoundRow;
}

/** A pass without a round still needs one to stand in. */
export const UNNAMED_ROUND = 'Run';

/** Finds or makes the track, event and round of every row; what was made is kept apart, in the order it has to be stored. */
export class Places {
  readonly newTracks: TrackRow[] = [];
  readonly newEvents: EventRow[] = [];
  readonly newRounds: RoundRow[] = [];
  private readonly tracks = new Map<string, TrackRow>();
  private readonly events = new Map<string, EventRow>();
  private readonly rounds = new Map<string, RoundRow>();
  private readonly lastPosition = new Map<string, number>();
  private readonly takenNames: Set<string>;
  /** Of tracks and events, by id. */
  private readonly names = new Map<string, string>();

  constructor(
    private readonly teamId: string,
    private readonly createdAt: string,
    known: KnownPlaces,
  ) {
    for (const track of known.tracks) this.tracks.set(folded(track.name), track);
    for (const event of known.events) this.events.set(eventKey(event.trackId, event.name, event.startsOn), event);
    for (const round of known.rounds) this.keepRound(round);
    for (const { id, name } of [...known.tracks, ...known.events]) this.names.set(id, name);
    this.takenNames = new Set(known.events.map(({ name, startsOn }) => uniqueName(name, startsOn)));
  }

  /** Places of rows in the order they were run, so that rounds are numbered in that order. */
  resolve(rows: readonly PassCsvRow[]): RowPlace[] {
    const byTrack = grouped(rows, (row) => folded(row.track));
    const tracks = rows.map((row) => this.trackOf(byTrack.get(folded(row.track)) ?? [row]));
    const byEvent = grouped(rows, (row, i) => rowEventKey(row, tracks[i] as TrackRow));
    return rows.map((row, i) => {
      const track = tracks[i] as TrackRow;
      const event = this.eventOf(byEvent.get(rowEventKey(row, track)) ?? [row], track);
      return { track, event, round: this.roundOf(row, event) };
    });
  }

  describeEvent({ name, trackId, startsOn, endsOn }: EventRow) {
    return { name, track: this.names.get(trackId) ?? '', startsOn, endsOn };
  }

  describeRound({ name, eventId }: RoundRow) {
    return { name, event: this.names.get(eventId) ?? '' };
  }

  private trackOf(rows: readonly PassCsvRow[]): TrackRow {
    const name = rows[0]?.track ?? '';
    const known = this.tracks.get(folded(name));
    if (known) return known;
    const track: TrackRow = {
      ...this.stamp(),
      name,
      latitudeDeg: null,
      longitudeDeg: null,
      altitudeM: rows.find((row) => row.altitudeM !== null)?.altitudeM ?? null,
      timeZone: guessTimeZone(rows),
      archivedAt: null,
    };
    this.newTracks.push(track);
    this.tracks.set(folded(name), track);
    this.names.set(track.id, name);
    return track;
  }

  private eventOf(rows: readonly PassCsvRow[], track: TrackRow): EventRow {
    const first = rows[0] as PassCsvRow;
    const dates = rows.map(localDate).sort();
    const startsOn = dates[0] ?? '';
    const known =
      this.events.get(eventKey(track.id, first.event, startsOn)) ??
      this.events.get(eventKey(track.id, withTrack(first.event, track.name), startsOn));
    if (known) return known;
    const name = this.takenNames.has(uniqueName(first.event, startsOn))
      ? withTrack(first.event, track.name)
      : first.event;
    const event: EventRow = { ...this.stamp(), trackId: track.id, name, startsOn, endsOn: dates.at(-1) ?? startsOn };
    this.newEvents.push(event);
    this.events.set(eventKey(track.id, name, startsOn), event);
    this.takenNames.add(uniqueName(name, startsOn));
    this.names.set(event.id, name);
    return event;
  }

  private roundOf(row: PassCsvRow, event: EventRow): RoundRow {
    const name = row.round || UNNAMED_ROUND;
    const known = this.rounds.get(roundKey(event.id, name));
    if (known) return known;
    const position = (this.lastPosition.get(event.id) ?? 0) + 1;
    const round: RoundRow = { ...this.stamp(), eventId: event.id, name, position, lane: null, plannedAt: null };
    this.newRounds.push(round);
    this.keepRound(round);
    return round;
  }

  private keepRound(round: RoundRow): void {
    this.rounds.set(roundKey(round.eventId, round.name), round);
    this.lastPosition.set(round.eventId, Math.max(round.position, this.lastPosition.get(round.eventId) ?? 0));
  }

  private stamp() {
    return { id: randomUUID(), teamId: this.teamId, createdAt: this.createdAt };
  }
}

const folded = (name: string): string => name.trim().toLowerCase();
const eventKey = (trackId: string, name: string, startsOn: string): string =>
  JSON.stringify([trackId, folded(name), startsOn.slice(0, 4)]);
const rowEventKey = (row: PassCsvRow, track: TrackRow): string => eventKey(track.id, row.event, localDate(row));
const roundKey = (eventId: string, name: string): string => JSON.stringify([eventId, folded(name)]);
const withTrack = (event: string, track: string): string => `${event} (${track})`;
const uniqueName = (name: string, startsOn: string): string => JSON.stringify([name, startsOn]);

function grouped<T>(items: readonly T[], key: (item: T, index: number) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  items.forEach((item, index) => {
    const of = key(item, index);
    const group = groups.get(of);
    if (group) group.push(item);
    else groups.set(of, [item]);
  });
  return groups;
}
