import type { SettingChange, Settings } from '../types';
import { MAX_CHANGED_ADJUSTABLES } from './constants';
import { designRow } from './design';
import type { RunFeatures } from './features';
import { fastOdds, type Lever, stepCombinations, toChange, usableLevers } from './search';
import type { TrainedModel } from './train';

export interface DesignOptions {
  /** Odds of slip in the band that a test run must keep. */
  minPInBand: number;
  /** And how much of today's odds it may cost. */
  maxLoss: number;
  /** Working minutes before each run; null: no limit. */
  minutesLeft: number | null;
  /** Adjustables changed at once: 1 or 2. */
  maxChanged: number;
  /** How many runs to rank. */
  offers: number;
}

export const DESIGN_DEFAULTS: DesignOptions = {
  minPInBand: 0.35,
  maxLoss: 0.25,
  minutesLeft: null,
  maxChanged: MAX_CHANGED_ADJUSTABLES,
  offers: 5,
};
/** One possible test run: whole steps of one or two adjustables away from the settings as they stand. */
export interface Candidate {
  levers: readonly Lever[];
  steps: readonly number[];
  pInBand: number;
}

/** A test session and what stays the same for all its runs. */
export interface Session {
  model: TrainedModel;
  run: RunFeatures;
  options: DesignOptions;
  /** Columns whose effects are to be learned. */
  columns: readonly number[];
  /** Design row of the settings as they stand, with a 1 for the session at its end. */
  base: Float64Array;
  hold: Candidate;
}

export function openSession(model: TrainedModel, run: RunFeatures, options: Partial<DesignOptions>): Session {
  const learned = model.adjustables.filter((a) => a.movable).map((a) => a.key);
  return {
    model,
    run,
    options: { ...DESIGN_DEFAULTS, ...options },
    columns: model.columnSet.columns.flatMap((c, j) => (c.key !== null && learned.includes(c.key) ? [j] : [])),
    base: Float64Array.of(...designRow(run, model.input.design).x, 1),
    hold: { levers: [], steps: [], pInBand: fastOdds(model, run)([], []) },
  };
}

/** Every change allowed, grouped by which adjustables it moves. */
export function candidateSets({ model, run, options, hold }: Session): Candidate[][] {
  const levers = usableLevers(model, run, options.minutesLeft);
  const odds = fastOdds(model, run);
  const floor = Math.max(options.minPInBand, hold.pInBand - options.maxLoss);
  return leverSets(levers, options.maxChanged).map((set) =>
    Array.from(stepCombinations(set), (steps) => ({
      levers: set,
      steps: [...steps],
      pInBand: odds(set, steps),
    })).filter((c) => c.pInBand >= floor),
  );
}

function leverSets(levers: readonly Lever[], maxChanged: number): Lever[][] {
  const singles = levers.map((lever) => [lever]);
  if (maxChanged < 2) return singles;
  return [...singles, ...levers.flatMap((a, i) => levers.slice(i + 1).map((b) => [a, b]))];
}

export function rowOf({ base }: Session, { levers, steps }: Candidate): Float64Array {
  const row = Float64Array.from(base);
  levers.forEach((lever, i) => {
    row[lever.column]! += steps[i]!;
  });
  return row;
}

export const changesOf = ({ run }: Session, { levers, steps }: Candidate): SettingChange[] =>
  levers.map((lever, i) => toChange(lever.adjustable, run.settings, steps[i]!));

export const settingsOf = (session: Session, candidate: Candidate): Settings => ({
  ...session.run.settings,
  ...Object.fromEntries(changesOf(session, candidate).map((c) => [c.key, c.to])),
});

/** Minutes of every adjustable that has to move to get from one run's settings to the next. */
export function minutesBetween(session: Session, from: Settings, candidate: Candidate): number {
  const to = settingsOf(session, candidate);
  return session.model.adjustables.reduce((sum, a) => sum + (to[a.key] === from[a.key] ? 0 : a.minutes), 0);
}
