import type { UnitSystem } from '@/lib/domain/display';
import type { Role } from '@/lib/domain/permissions';
import type { Adjustable, Lane, Outcome, Settings } from '@/lib/domain/types';
import type { PassReading } from '@/lib/pass-csv';

/** A whole invented season as plain data, SI, under the names of the schema. `ref` values stand for the ids a seed will make. */
export interface DemoSeason {
  team: DemoTeam;
  people: readonly DemoPerson[];
  car: DemoCar;
  adjustables: readonly Adjustable[];
  tracks: readonly DemoTrack[];
  discSets: readonly DemoDiscSet[];
  events: readonly DemoEvent[];
  rounds: readonly DemoRound[];
  readings: readonly DemoReading[];
  /** In the order they were run. */
  passes: readonly DemoPass[];
  next: DemoNextRun;
}

export interface DemoTeam {
  name: string;
  units: UnitSystem;
}

export interface DemoPerson {
  name: string;
  email: string;
  role: Role;
  password: string;
}

export interface DemoCar {
  name: string;
  carClass: string;
  distanceFt: number;
  finalDriveRatio: number;
  rolloutM: number;
  rolloutGrowthPerMps: number;
  frontRolloutM: number;
  pulsesPerTurn: number;
  bandLowPct: number;
  bandHighPct: number;
  slipWindowStartS: number;
  slipWindowEndS: number;
  sensorNote: string;
}

export interface DemoTrack {
  ref: string;
  name: string;
  latitudeDeg: number;
  longitudeDeg: number;
  altitudeM: number;
  timeZone: string;
}

export interface DemoDiscSet {
  ref: string;
  name: string;
  discCount: number;
}

export interface DemoEvent {
  ref: string;
  trackRef: string;
  name: string;
  /** Calendar dates at the track, yyyy-mm-dd. */
  startsOn: string;
  endsOn: string;
}

export interface DemoRound {
  ref: string;
  eventRef: string;
  name: string;
  /** Order within the event, from 1. */
  position: number;
  lane: Lane | null;
  plannedAt: string;
}

export interface DemoReading extends PassReading {
  ref: string;
  trackRef: string;
  roundRef: string;
  takenAt: string;
  trackTempPlace: string;
  cloudPct: number | null;
  source: 'hand';
}

export interface DemoPass {
  ref: string;
  roundRef: string;
  readingRef: string;
  passNo: number;
  runAt: string;
  /** Offset of the track at that time, for the pass file. */
  utcOffset: string;
  lane: Lane;
  settings: Settings;
  runsOnDiscs: number;
  discSetRef: string;
  slipPct: number | null;
  slipSource: 'measured' | null;
  sixtyFtS: number | null;
  threeThirtyFtS: number | null;
  eighthS: number | null;
  eighthMps: number | null;
  thousandFtS: number | null;
  outcome: Outcome;
  excluded: boolean;
  excludedReason: string | null;
  notes: string;
  source: 'hand';
}

/** The round the demo waits for: its reading is taken, its pass not yet run. */
export interface DemoNextRun {
  roundRef: string;
  readingRef: string;
  /** Settings as they stand on the car. */
  current: Settings;
  runsOnDiscs: number;
  minutesLeft: number;
  /** When it is "now" in the demo, and the track's offset then. */
  at: string;
  utcOffset: string;
}
