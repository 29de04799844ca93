import type { Band, Conditions, RunContext, Settings } from '../types';
import { fDeltaToC, inHgToPa } from '../units';
import { runFeatures } from './features';
import { forecastLog } from './forecast';
import { logCdf } from './predictive';
import type { TrainedModel } from './train';

export type Reading = keyof Conditions;

/** One standard deviation of what an instrument shows against the truth, in the reading's stored unit. */
export type ReadingErrors = Readonly<Record<Reading, number>>;

/**
 * Common practice, no published source: what a hand-held weather meter and an infrared thermometer are usually trusted to; track
 * temperature also differs from spot to spot. Track +-5 degF, air +-1 degF, humidity +-3 points, pressure +-0.05 inHg.
 */
export const READING_ERRORS: ReadingErrors = {
  trackTempC: fDeltaToC(5),
  airTempC: fDeltaToC(1),
  relativeHumidity: 0.03,
  stationPressurePa: inHgToPa(0.05),
};

export const READING_LABELS: Readonly<Record<Reading, string>> = {
  trackTempC: 'track temperature',
  airTempC: 'air temperature',
  relativeHumidity: 'humidity',
  stationPressurePa: 'pressure',
};

export interface Shift {
  /** Change of the median, slip points. */
  medianPct: number;
  /** Change of P(in band). */
  pInBand: number;
}

export interface ReadingSensitivity {
  reading: Reading;
  label: string;
  /** The reading as it stands and its error, stored unit. */
  value: number;
  error: number;
  /** What the forecast would be had the truth been one error lower or higher. */
  lower: Shift;
  higher: Shift;
  /** Half the distance between the two medians: one sd of the median from this reading alone, slip points. */
  spreadPct: number;
}

export interface Sensitivity {
  medianPct: number;
  pInBand: number;
  /** Most telling first. A reading that was not taken has no entry. */
  readings: ReadingSensitivity[];
  /** One sd of the median and of P(in band) when the errors are independent of each other. */
  totalPct: number;
  totalPInBand: number;
  /** The same spread as a share of the forecast's own variance in ln slip. */
  shareOfVariance: number;
}

export interface PlannedRun {
  context: RunContext;
  settings: Settings;
  /** Rounds of the event run before this one (`roundOfContext`). */
  roundInEvent: number;
}

/**
 * How far the forecast would move if each reading were off by its own error, the others as they are. Humidity and air
 * temperature move density and dew point together, as in the model. The passes that trained the model had the same errors, so
 * the forecast's interval pays for them already: this is for knowing which reading to take again, not for adding on top.
 */
export function readingSensitivity(
  model: TrainedModel,
  run: PlannedRun,
  errors: ReadingErrors = READING_ERRORS,
): Sensitivity {
  const base = outlook(model, run);
  const readings = (Object.keys(READING_LABELS) as Reading[]).flatMap((reading) =>
    sensitivityTo(model, run, base, reading, errors[reading]),
  );
  const logSpread = rootSumSquares(readings.map((r) => r.logSpread));
  return {
    medianPct: base.medianPct,
    pInBand: base.pInBand,
    readings: readings.map(({ logSpread: _, ...r }) => r).sort((a, b) => b.spreadPct - a.spreadPct),
    totalPct: rootSumSquares(readings.map((r) => r.spreadPct)),
    totalPInBand: rootSumSquares(readings.map((r) => (r.higher.pInBand - r.lower.pInBand) / 2)),
    shareOfVariance: (logSpread / base.scale) ** 2,
  };
}

const rootSumSquares = (values: readonly number[]): number => Math.sqrt(values.reduce((s, v) => s + v * v, 0));

interface Outlook {
  medianPct: number;
  pInBand: number;
  scale: number;
}

function outlook(model: TrainedModel, { context, settings, roundInEvent }: PlannedRun): Outlook {
  const { forecast } = forecastLog(model, runFeatures({ ...context, settings }, roundInEvent));
  const inBand = (band: Band): number =>
    logCdf(forecast, Math.log(band.highPct)) - logCdf(forecast, Math.log(band.lowPct));
  return { medianPct: Math.exp(forecast.location), pInBand: inBand(model.band), scale: forecast.scale };
}

function sensitivityTo(
  model: TrainedModel,
  run: PlannedRun,
  base: Outlook,
  reading: Reading,
  error: number,
): (ReadingSensitivity & { logSpread: number })[] {
  const value = run.context.conditions[reading];
  if (value === null) return [];
  const at = (v: number): Outlook => outlook(model, withReading(run, reading, v));
  const [low, high] = [at(value - error), at(value + error)];
  return [
    {
      reading,
      label: READING_LABELS[reading],
      value,
      error,
      lower: shift(base, low),
      higher: shift(base, high),
      spreadPct: Math.abs(high.medianPct - low.medianPct) / 2,
      logSpread: Math.log(high.medianPct / low.medianPct) / 2,
    },
  ];
}

const shift = (from: Outlook, to: Outlook): Shift => ({
  medianPct: to.medianPct - from.medianPct,
  pInBand: to.pInBand - from.pInBand,
});

/** The run with one reading replaced; humidity stays a fraction that air can hold. */
function withReading(run: PlannedRun, reading: Reading, value: number): PlannedRun {
  const possible = reading === 'relativeHumidity' ? Math.min(1, Math.max(DRIEST, value)) : value;
  return { ...run, context: { ...run.context, conditions: { ...run.context.conditions, [reading]: possible } } };
}

// Bone-dry air has no dew point.
const DRIEST = 0.005;
