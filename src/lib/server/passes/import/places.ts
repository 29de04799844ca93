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
    const dated = rows.map((row) => ({ ...row, date: localDate(row) }));
    for (const group of grouped(dated, (row) => folded(row.track))) this.ensureTrack(group);
    const events = new Map<DatedRow, EventRow>();
    for (const group of grouped(dated, (row) => eventKey(this.trackOf(row).id, row.event, row.date))) {
      const event = this.ensureEvent(group);
      for (const row of group) events.set(row, event);
    }
    return dated.map((row) => {
      const event = events.get(row) as EventRow;
      return { track: this.trackOf(row), event, round: this.roundOf(row, event) };
    });
  }

  private trackOf(row: PassCsvRow): TrackRow {
    return this.tracks.get(folded(row.track)) as TrackRow;
  }

  describeEvent({ name, trackId, startsOn, endsOn }: EventRow) {
    return { name, track: this.names.get(trackId) ?? '', startsOn, endsOn };
  }

  describeRound({ name, eventId }: RoundRow) {
    return { name, event: this.names.get(eventId) ?? '' };
  }

  private ensureTrack(rows: Group<DatedRow>): void {
    const name = rows[0].track;
    if (this.tracks.has(folded(name))) return;
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
  }

  private ensureEvent(rows: Group<DatedRow>): EventRow {
    const track = this.trackOf(rows[0]);
    const dates = rows.map(({ date }) => date).sort();
    const [startsOn, endsOn] = [dates[0] as string, dates.at(-1) as string];
    const wanted = rows[0].event;
    const known = [wanted, withTrack(wanted, track.name)].map((name) =>
      this.events.get(eventKey(track.id, name, startsOn)),
    );
    return known.find((event) => event !== undefined) ?? this.addEvent(wanted, track, startsOn, endsOn);
  }

  private addEvent(wanted: string, track: TrackRow, startsOn: string, endsOn: string): EventRow {
    // A team has one event of a name on a day: a second one, at another track, is told apart by the track.
    const name = this.takenNames.has(uniqueName(wanted, startsOn)) ? withTrack(wanted, track.name) : wanted;
    const event: EventRow = { ...this.stamp(), trackId: track.id, name, startsOn, endsOn };
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
const roundKey = (eventId: string, name: string): string => JSON.stringify([eventId, folded(name)]);
const withTrack = (event: string, track: string): string => `${event} (${track})`;
const uniqueName = (name: string, startsOn: string): string => JSON.stringify([name, startsOn]);

type DatedRow = PassCsvRow & { date: string };
type Group<T> = [T, ...T[]];

function grouped<T>(items: readonly T[], key: (item: T) => string): Group<T>[] {
  const groups = new Map<string, Group<T>>();
  for (const item of items) {
    const group = groups.get(key(item));
    if (group) group.push(item);
    else groups.set(key(item), [item]);
  }
  return [...groups.values()];
}
