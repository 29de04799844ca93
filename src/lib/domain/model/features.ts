import { airDensityKgM3 } from '../air/density';
import { dewPointC } from '../air/humidity';
import type { Adjustable, Conditions, Lane, PassRecord, RunContext, Settings } from '../types';

/** What the model can look at in one run, before columns are made of it. Null is "not known". */
export interface RunFeatures {
  settings: Settings;
  densityKgM3: number | null;
  trackTempC: number | null;
  /** Track temperature minus dew point, degC. */
  dewMarginC: number | null;
  runsOnDiscs: number | null;
  lane: Lane | null;
  /** Rounds of this event that were run before this one. */
  roundInEvent: number;
  track: string;
  event: string;
}

/** Density hardly depends on humidity (under 1 % from dry to damp), so it is taken at half when nobody read it. */
const UNREAD_HUMIDITY = 0.5;

interface RunLike {
  conditions: Conditions;
  settings: Settings;
  runsOnDiscs: number | null;
  lane: Lane | null;
  track: string;
  event: string;
}

export function runFeatures(run: RunLike, roundInEvent: number): RunFeatures {
  const { airTempC, relativeHumidity, stationPressurePa, trackTempC } = run.conditions;
  const dewPoint = dewPointC(airTempC, relativeHumidity);
  return {
    settings: run.settings,
    densityKgM3: airDensityKgM3(airTempC, stationPressurePa, relativeHumidity ?? UNREAD_HUMIDITY),
    trackTempC,
    dewMarginC: trackTempC !== null && dewPoint !== null ? trackTempC - dewPoint : null,
    runsOnDiscs: run.runsOnDiscs,
    lane: run.lane,
    roundInEvent,
    track: run.track,
    event: eventKey(run),
  };
}

/** Events are told apart by name and track: two tracks may hold an event of one name. */
export const eventKey = (run: { event: string; track: string }): string => `${run.event}\u0000${run.track}`;

/** Passes in the order they were run. */
export function inOrder(passes: readonly PassRecord[]): PassRecord[] {
  return [...passes].sort((a, b) => compare(a.time, b.time) || a.passNo - b.passNo);
}

const compare = (a: string, b: string): number => (a < b ? -1 : Number(a > b));

/** For each pass (in order), how many other rounds of its event came before it. */
export function roundsBefore(ordered: readonly PassRecord[]): number[] {
  const seen = new Map<string, Map<string, number>>();
  return ordered.map((pass) => roundNumber(seen, eventKey(pass), pass.round));
}

function roundNumber(seen: Map<string, Map<string, number>>, event: string, round: string): number {
  const rounds = seen.get(event) ?? new Map<string, number>();
  seen.set(event, rounds);
  const known = rounds.get(round);
  if (known !== undefined) return known;
  rounds.set(round, rounds.size);
  return rounds.size - 1;
}

/** How many rounds of the context's event were run before it. */
export function roundOfContext(ordered: readonly PassRecord[], context: RunContext): number {
  const event = eventKey(context);
  const earlier = new Set(
    ordered.filter((p) => eventKey(p) === event && p.round !== context.round).map((p) => p.round),
  );
  return earlier.size;
}

/** Passes that train the model: measured slip, not aborted, not excluded. */
export function trains(pass: PassRecord): boolean {
  return pass.slipPct !== null && pass.slipPct > 0 && !pass.excluded && pass.outcome !== 'aborted';
}

export const settingOf = (features: RunFeatures, adjustable: Adjustable): number | null =>
  features.settings[adjustable.key] ?? null;
