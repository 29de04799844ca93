import { type Random, seededRandom } from '@/evaluate/random';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { CALENDAR, OPEN_EVENT, OPEN_EVENT_ROUNDS_RUN, type PlannedTrack, TRACKS } from './calendar';
import { runEvent } from './event';
import { DEMO_CAR, DEMO_PEOPLE, DEMO_TEAM } from './team';
import { drawTrack, type Place } from './truth';
import type { DemoDiscSet, DemoEvent, DemoPass, DemoReading, DemoRound, DemoSeason } from './types';

/** The seed of the committed fixtures and of the demo database: one whose open round leaves something to decide. */
export const DEMO_SEED = 25;

/** What grows while the season is told. */
export interface Ledger {
  random: Random;
  places: ReadonlyMap<string, Omit<Place, 'event'>>;
  events: DemoEvent[];
  rounds: DemoRound[];
  readings: DemoReading[];
  passes: DemoPass[];
  discSets: DemoDiscSet[];
  runsOnDiscs: number;
}

/** An invented season: the same seed gives the same season. The last event is still open, waiting for a suggestion. */
export function generateDemoSeason(seed: number = DEMO_SEED): DemoSeason {
  const ledger = newLedger(seededRandom(seed));
  for (const plan of CALENDAR) runEvent(ledger, plan, trackOf(plan.trackRef), Number.POSITIVE_INFINITY);
  const next = runEvent(ledger, OPEN_EVENT, trackOf(OPEN_EVENT.trackRef), OPEN_EVENT_ROUNDS_RUN);
  if (!next) throw new Error('The open event has no round left to run.');
  const { events, rounds, readings, passes, discSets } = ledger;
  return {
    team: DEMO_TEAM,
    people: DEMO_PEOPLE,
    car: DEMO_CAR,
    adjustables: DEFAULT_ADJUSTABLES,
    tracks: TRACKS.map(({ utcOffset: _, climate: __, ...track }) => track),
    discSets,
    events,
    rounds,
    readings,
    passes,
    next,
  };
}

function newLedger(random: Random): Ledger {
  const places = new Map(TRACKS.map(({ ref }) => [ref, drawTrack(random)]));
  return { random, places, events: [], rounds: [], readings: [], passes: [], discSets: [], runsOnDiscs: 0 };
}

function trackOf(ref: string): PlannedTrack {
  const track = TRACKS.find((entry) => entry.ref === ref);
  if (!track) throw new Error(`The calendar names a track that is not there: ${ref}`);
  return track;
}
