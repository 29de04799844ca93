/** Invented tracks and the calendar of the season. */
import { ftToM } from '@/lib/domain/units';
import { toNineDecimals } from '@/lib/pass-csv/numbers';
import type { DemoTrack } from './types';

export interface Climate {
  /** Mean air temperature of the year and how far July is above it, degC. */
  yearMeanC: number;
  julyAboveC: number;
  /** How far the dew point lies below the mean air temperature, degC. */
  dewBelowC: number;
  /** Chance of a clouded day, 0-1. */
  cloudiness: number;
}

export interface PlannedTrack extends DemoTrack {
  /** All events of a track lie on one side of the change to daylight-saving time. */
  utcOffset: string;
  climate: Climate;
}

const feet = (ft: number): number => toNineDecimals(ftToM(ft));

export const TRACKS: readonly PlannedTrack[] = [
  {
    ref: 'tamsin',
    name: 'Tamsin Flats Strip',
    latitudeDeg: 33.21,
    longitudeDeg: -112.63,
    altitudeM: feet(1120),
    timeZone: 'America/Phoenix',
    utcOffset: '-07:00',
    climate: { yearMeanC: 22, julyAboveC: 11, dewBelowC: 17, cloudiness: 0.15 },
  },
  {
    ref: 'ambergate',
    name: 'Ambergate Bayou Dragway',
    latitudeDeg: 30.62,
    longitudeDeg: -84.91,
    altitudeM: feet(120),
    timeZone: 'America/New_York',
    utcOffset: '-04:00',
    climate: { yearMeanC: 21, julyAboveC: 8, dewBelowC: 6, cloudiness: 0.4 },
  },
  {
    ref: 'quillhollow',
    name: 'Quillhollow Dragway',
    latitudeDeg: 35.88,
    longitudeDeg: -86.04,
    altitudeM: feet(605),
    timeZone: 'America/Chicago',
    utcOffset: '-05:00',
    climate: { yearMeanC: 16, julyAboveC: 11, dewBelowC: 8, cloudiness: 0.35 },
  },
  {
    ref: 'bexwater',
    name: 'Bexwater Raceway',
    latitudeDeg: 42.31,
    longitudeDeg: -77.42,
    altitudeM: feet(1250),
    timeZone: 'America/New_York',
    utcOffset: '-04:00',
    climate: { yearMeanC: 11, julyAboveC: 12, dewBelowC: 8, cloudiness: 0.45 },
  },
  {
    ref: 'highmark',
    name: 'Highmark Mesa Strip',
    latitudeDeg: 37.33,
    longitudeDeg: -104.18,
    altitudeM: feet(5650),
    timeZone: 'America/Denver',
    utcOffset: '-06:00',
    climate: { yearMeanC: 12, julyAboveC: 12, dewBelowC: 15, cloudiness: 0.25 },
  },
];

/** How humidity and pressure were read at an event. */
export type ReadingHabit = 'plain' | 'dew-point' | 'altimeter';

export interface PlannedEvent {
  trackRef: string;
  name: string;
  /** First day, yyyy-mm-dd. */
  startsOn: string;
  tests: number;
  qualifying: number;
  eliminations: number;
  habit: ReadingHabit;
}

const race = (
  startsOn: string,
  trackRef: string,
  name: string,
  tests: number,
  eliminations: number,
  habit: ReadingHabit = 'plain',
): PlannedEvent => ({ startsOn, trackRef, name, tests, qualifying: 4, eliminations, habit });

/** A winter test and twelve races; `eliminations` is how far the team got. */
export const CALENDAR: readonly PlannedEvent[] = [
  { ...race('2026-02-12', 'tamsin', 'Winter Test', 10, 0), qualifying: 0 },
  race('2026-02-26', 'tamsin', 'Saltbush Opener', 4, 3),
  race('2026-03-19', 'ambergate', 'Bayou Spring Meet', 4, 1, 'dew-point'),
  race('2026-04-09', 'quillhollow', 'Quillhollow Classic', 4, 4),
  race('2026-04-30', 'bexwater', 'Bexwater May Days', 3, 2),
  race('2026-05-21', 'quillhollow', 'Hollow Night Series', 4, 2),
  race('2026-06-11', 'bexwater', 'Lakeside Summer Cup', 4, 3),
  race('2026-07-02', 'highmark', 'Thin Air Challenge', 4, 1),
  race('2026-07-23', 'highmark', 'Mesa Midsummer', 4, 4, 'altimeter'),
  race('2026-08-13', 'bexwater', 'Bexwater Harvest Cup', 3, 2),
  race('2026-09-03', 'quillhollow', 'Quillhollow Fall Meet', 4, 3),
  race('2026-09-24', 'ambergate', 'Bayou Fall Meet', 4, 2, 'dew-point'),
  race('2026-10-15', 'tamsin', 'Saltbush Finale', 4, 4),
];

/** The event still open in the demo: two rounds are run, a reading is taken for the third. */
export const OPEN_EVENT: PlannedEvent = race('2026-11-30', 'tamsin', 'Desert Closer', 0, 4);
export const OPEN_EVENT_ROUNDS_RUN = 2;

export interface Slot {
  name: string;
  /** Days after the first. */
  day: number;
  /** Planned local time, hours. */
  hour: number;
}

const TEST_HOURS = [10.5, 12.5, 14.5, 16.75] as const;
const QUALIFYING: readonly Slot[] = [
  { name: 'Q1', day: 1, hour: 16.5 },
  { name: 'Q2', day: 1, hour: 19.5 },
  { name: 'Q3', day: 2, hour: 12.75 },
  { name: 'Q4', day: 2, hour: 15.5 },
];
const ELIMINATION_HOURS = [11, 13, 14.75, 16.5] as const;
const PER_TEST_DAY = TEST_HOURS.length;

/** The rounds of an event in running order. Without a test day the first qualifying day is the first day. */
export function slotsOf(plan: PlannedEvent): Slot[] {
  const tests = Array.from({ length: plan.tests }, (_, i) => ({
    name: `T${i + 1}`,
    day: Math.floor(i / PER_TEST_DAY),
    hour: TEST_HOURS[i % PER_TEST_DAY] ?? 12,
  }));
  const eliminations = ELIMINATION_HOURS.slice(0, plan.eliminations).map((hour, i) => ({
    name: `E${i + 1}`,
    day: 3,
    hour,
  }));
  const slots = [...tests, ...QUALIFYING.slice(0, plan.qualifying), ...eliminations];
  return plan.tests > 0 ? slots : slots.map((slot) => ({ ...slot, day: slot.day - 1 }));
}

/** The calendar date `days` after a date, yyyy-mm-dd. */
export function addDays(date: string, days: number): string {
  return new Date(Date.parse(`${date}T00:00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
}

/** UTC instant of a local date and hour at an offset. */
export function instantOf(date: string, hour: number, utcOffset: string): string {
  const midnight = Date.parse(`${date}T00:00:00${utcOffset}`);
  return new Date(midnight + Math.round(hour * 60) * 60_000).toISOString();
}
