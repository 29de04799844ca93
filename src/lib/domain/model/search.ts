import { multiply } from '../stats/cholesky';
import type { Adjustable, Offer, SettingChange, Settings } from '../types';
import {
  COST_PER_STEP,
  MAX_CHANGED_ADJUSTABLES,
  MAX_OFFERS,
  MIN_GAIN,
  OUTLIER_WIDTH,
  STEPS_BEYOND_SEEN,
} from './constants';
import { designRow } from './design';
import type { RunFeatures } from './features';
import { rowWithinEvent } from './fit';
import { forecastLog } from './forecast';
import { tabulatedTCdf, toForecast } from './predictive';
import type { TrainedModel } from './train';

export interface Search {
  /** Best first, "no change" always among them. */
  offers: Offer[];
  /** Whether any change gains enough to be worth offering. */
  worthChanging: boolean;
}

export interface Lever {
  adjustable: Adjustable;
  /** Column of the adjustable. */
  column: number;
  low: number;
  high: number;
}

interface Candidate {
  levers: readonly Lever[];
  steps: readonly number[];
  pInBand: number;
  worth: number;
}

export type Odds = (levers: readonly Lever[], steps: readonly number[]) => number;

/** Tries every step of every allowed adjustable, alone and in pairs, and keeps the best. */
export function searchSettings(model: TrainedModel, run: RunFeatures, minutesLeft: number | null): Search {
  const levers = usableLevers(model, run, minutesLeft);
  const odds = fastOdds(model, run);
  const hold: Candidate = { levers: [], steps: [], pInBand: odds([], []), worth: odds([], []) };
  const best = bestPerSet(levers, odds, minutesLeft)
    .filter((c) => c.worth >= hold.worth + MIN_GAIN)
    .sort((a, b) => b.worth - a.worth);
  const chosen = [...distinct(best).slice(0, MAX_OFFERS - 1), hold].sort((a, b) => b.worth - a.worth);
  return { offers: chosen.map((c) => toOffer(c, model, run)), worthChanging: best.length > 0 };
}

/** Adjustables that may move: movable, in the model, recorded today, within limits, near what has been run, in the time left. */
export function usableLevers(model: TrainedModel, run: RunFeatures, minutesLeft: number | null): Lever[] {
  return model.adjustables.flatMap((adjustable) => {
    const column = model.columnSet.columns.findIndex((c) => c.key === adjustable.key);
    const current = run.settings[adjustable.key];
    const inTime = minutesLeft === null || adjustable.minutes <= minutesLeft;
    if (!adjustable.movable || column < 0 || current === undefined || !inTime) return [];
    const { low, high } = allowedRange(model, adjustable, current);
    const lever = {
      adjustable,
      column,
      low: wholeSteps(low - current, adjustable.step, Math.ceil),
      high: wholeSteps(high - current, adjustable.step, Math.floor),
    };
    return lever.low <= lever.high ? [lever] : [];
  });
}

const wholeSteps = (distance: number, step: number, round: (v: number) => number): number =>
  round(Number((distance / step).toFixed(9)));

/** The limits, and not far beyond the settings that have been run: the model is a straight line only where there are passes. */
function allowedRange(model: TrainedModel, a: Adjustable, current: number): { low: number; high: number } {
  const seen = model.rows.map((r) => r.pass.settings[a.key]).filter((v) => v !== undefined);
  const room = STEPS_BEYOND_SEEN * a.step;
  return {
    low: Math.max(a.low, Math.min(current, ...seen) - room),
    high: Math.min(a.high, Math.max(current, ...seen) + room),
  };
}

/** P(in band) of a change, quick enough to ask tens of thousands of times. */
export function fastOdds(model: TrainedModel, run: RunFeatures): Odds {
  const { posterior, input, band, recalibration } = model;
  const { forecast } = forecastLog(model, run);
  const p = input.design.p;
  const event = model.eventIndex.get(run.event) ?? -1;
  const row = rowWithinEvent(posterior, designRow(run, input.design).x, event);
  const pull = multiply(posterior.covariance, row, p);
  const noise = posterior.noiseVariance * recalibration ** 2;
  const spread = forecast.scale ** 2 / noise - 1;
  const cdf = tabulatedTCdf(posterior.df);
  const logLow = Math.log(band.lowPct);
  const logHigh = Math.log(band.highPct);
  return (levers, steps) => {
    let location = forecast.location;
    let variance = spread;
    levers.forEach((lever, i) => {
      location += posterior.coefficients[lever.column]! * steps[i]!;
      variance += 2 * steps[i]! * pull[lever.column]!;
      levers.forEach((other, j) => {
        variance += steps[i]! * steps[j]! * posterior.covariance[lever.column * p + other.column]!;
      });
    });
    const scale = Math.sqrt(noise * (1 + variance));
    const oddScale = Math.sqrt(noise * (OUTLIER_WIDTH ** 2 + variance));
    const regular = cdf((logHigh - location) / scale) - cdf((logLow - location) / scale);
    const odd = cdf((logHigh - location) / oddScale) - cdf((logLow - location) / oddScale);
    return (1 - forecast.oddShare) * regular + forecast.oddShare * odd;
  };
}

/** The best candidate for each single adjustable and each pair. */
function bestPerSet(levers: readonly Lever[], odds: Odds, minutesLeft: number | null): Candidate[] {
  const found: Candidate[] = [];
  for (let i = 0; i < levers.length; i++) {
    found.push(...bestOf([levers[i]!], odds));
    for (let j = i + 1; j < levers.length && MAX_CHANGED_ADJUSTABLES >= 2; j++) {
      const pair = [levers[i]!, levers[j]!];
      const minutes = pair.reduce((s, l) => s + l.adjustable.minutes, 0);
      if (minutesLeft === null || minutes <= minutesLeft) found.push(...bestOf(pair, odds));
    }
  }
  return found;
}

function bestOf(levers: readonly Lever[], odds: Odds): Candidate[] {
  let best: Candidate | null = null;
  for (const steps of stepCombinations(levers)) {
    const pInBand = odds(levers, steps);
    const worth = pInBand - COST_PER_STEP * steps.reduce((s, k) => s + Math.abs(k), 0);
    if (!best || worth > best.worth) best = { levers, steps: [...steps], pInBand, worth };
  }
  return best ? [best] : [];
}

export function* stepCombinations(levers: readonly Lever[]): Generator<readonly number[]> {
  const [first, second] = levers;
  const steps = [0, 0];
  for (let a = first!.low; a <= first!.high; a++) {
    if (a === 0) continue;
    steps[0] = a;
    if (!second) {
      yield [a];
      continue;
    }
    for (let b = second.low; b <= second.high; b++) {
      if (b === 0) continue;
      steps[1] = b;
      yield steps;
    }
  }
}

/** Keeps offers that differ in kind: the next one must move another first lever than those before it. */
function distinct(sorted: readonly Candidate[]): Candidate[] {
  const kept: Candidate[] = [];
  for (const c of sorted) {
    const keys = new Set(c.levers.map((l) => l.adjustable.key));
    if (
      !kept.some(
        (k) => k.levers.every((l) => keys.has(l.adjustable.key)) || c.levers.every((l) => k.levers.includes(l)),
      )
    )
      kept.push(c);
  }
  return kept;
}

function toOffer(candidate: Candidate, model: TrainedModel, run: RunFeatures): Offer {
  const changes = candidate.levers.map((lever, i) => toChange(lever.adjustable, run.settings, candidate.steps[i]!));
  const settings = { ...run.settings, ...Object.fromEntries(changes.map((c) => [c.key, c.to])) };
  const { forecast } = forecastLog(model, { ...run, settings });
  return {
    settings,
    changes,
    minutes: changes.reduce((s, c) => s + c.minutes, 0),
    forecast: toForecast(forecast, model.band),
    sixtyFt: null,
  };
}

export function toChange(a: Adjustable, settings: Settings, steps: number): SettingChange {
  const from = settings[a.key]!;
  return { key: a.key, from, to: Number((from + steps * a.step).toFixed(6)), steps, minutes: a.minutes };
}
