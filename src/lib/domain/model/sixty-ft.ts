import { type Adjustable, type Band, FORECAST_QUANTILES } from '../types';
import type { RunFeatures } from './features';
import { forecastLog } from './forecast';
import { type LogForecast, logQuantile, toForecast } from './predictive';
import { type PreparedPass, type TrainedModel, trainModel } from './train';

/**
 * 60-ft time as a second response: the same columns, pooling, odd passes and recalibration, fitted to
 *   y = CONTRAST x ln(60-ft time / middle)
 * with every belief of an adjustable's effect left open unless one is given in seconds.
 *
 * Times scatter far less than slip: about 2 % from pass to pass against 12 %. Multiplying by CONTRAST puts y on the scale the priors
 * of the traction model are made for, which is the same as giving ln time priors of their own, 1 / CONTRAST as wide: noise guess 2 %,
 * track sd 2 %, event sd 1.3 %, density 3.3 % per 0.05 kg/m3. An assumption of ours, no published source.
 */
export const CONTRAST = 6;

/** A belief in seconds per step up: one sd beside the mean. */
export interface TimeBelief {
  meanS: number;
  sdS: number;
}

export interface SixtyFtOptions {
  /** By adjustable key; those not named are open. */
  beliefs?: Readonly<Record<string, TimeBelief>>;
  /** Centre of the prior, seconds; normally the team's own middle. */
  middleS?: number;
}

export interface SixtyFtModel {
  /** The traction model's machinery, its response being y above. Its band and its percent mean nothing here. */
  model: TrainedModel;
  middleS: number;
  passesUsed: number;
}

export interface SixtyFtForecast {
  medianS: number;
  meanS: number;
  sdS: number;
  /** Seconds; keys are String(p) for p in FORECAST_QUANTILES. */
  quantiles: Readonly<Record<string, number>>;
  /** 20 equally likely times. */
  dots: readonly number[];
  /** Facts not known for this run, taken as average. */
  missing: readonly string[];
}

// ln of the band's middle is the prior mean of y: none.
const NO_BAND: Band = { lowPct: 1, highPct: 1 };
/** The middle is rounded, so that it does not wander with every pass. */
const MIDDLE_STEP_S = 0.05;

/** Null with fewer than MIN_PASSES passes that recorded a 60-ft time. Excluded and aborted passes do not train. */
export function trainSixtyFt(
  prepared: readonly PreparedPass[],
  adjustables: readonly Adjustable[],
  options: SixtyFtOptions = {},
): SixtyFtModel | null {
  const middleS = options.middleS ?? middleOf(prepared);
  if (middleS === null) return null;
  const mapped = prepared.map(({ pass, features }) => ({
    features,
    pass: { ...pass, ...asResponse(pass.sixtyFtS, middleS) },
  }));
  const model = trainModel(
    mapped,
    adjustables.map((a) => withBelief(a, middleS, options.beliefs?.[a.key])),
    NO_BAND,
  );
  return model && { model, middleS, passesUsed: model.rows.length };
}

const usable = (timeS: number | null): timeS is number => timeS !== null && timeS > 0;

// The fit takes the logarithm of what stands in the place of slip.
const asResponse = (timeS: number | null, middleS: number): { slipPct: number | null; slipSdPct: null } => ({
  slipPct: usable(timeS) ? (timeS / middleS) ** CONTRAST : null,
  slipSdPct: null,
});

function middleOf(prepared: readonly PreparedPass[]): number | null {
  const times = prepared
    .filter((p) => !p.pass.excluded && p.pass.outcome !== 'aborted')
    .map((p) => p.pass.sixtyFtS)
    .filter(usable);
  if (times.length === 0) return null;
  const sorted = times.sort((a, b) => a - b);
  const median = sorted[Math.floor(sorted.length / 2)]!;
  return Math.max(MIDDLE_STEP_S, Math.round(median / MIDDLE_STEP_S) * MIDDLE_STEP_S);
}

/** A step of m seconds is m / middle in ln time, so CONTRAST times that in y. */
function withBelief(a: Adjustable, middleS: number, belief: TimeBelief | undefined): Adjustable {
  const scale = CONTRAST / middleS;
  return { ...a, belief: belief ? { meanPct: belief.meanS * scale, sdPct: belief.sdS * scale } : null };
}

/** The 60-ft time of a run, in seconds. */
export function forecastSixtyFt(sixtyFt: SixtyFtModel, run: RunFeatures): SixtyFtForecast {
  const { forecast, missing } = forecastLog(sixtyFt.model, run);
  const seconds = inSeconds(forecast, sixtyFt.middleS);
  const { meanPct, sdPct, dots } = toForecast(seconds, NO_BAND);
  return {
    medianS: Math.exp(seconds.location),
    meanS: meanPct,
    sdS: sdPct,
    quantiles: Object.fromEntries(FORECAST_QUANTILES.map((p) => [String(p), Math.exp(logQuantile(seconds, p))])),
    dots,
    missing: [...new Set(missing.map((c) => c.name.split(',')[0]!))],
  };
}

/** From y back to ln seconds: location and scales shrink, the shape stays. */
const inSeconds = (f: LogForecast, middleS: number): LogForecast => ({
  ...f,
  location: Math.log(middleS) + f.location / CONTRAST,
  scale: f.scale / CONTRAST,
  oddScale: f.oddScale / CONTRAST,
});

export interface TimeEffect {
  key: string;
  /** Seconds per step up at the middle time; negative is quicker. */
  meanS: number;
  sdS: number;
}

/** What one step up of each adjustable does to the 60-ft time. */
export function sixtyFtEffects({ model, middleS }: SixtyFtModel): TimeEffect[] {
  const { posterior, columnSet } = model;
  const p = columnSet.columns.length;
  return columnSet.columns.flatMap((c, j) => {
    if (c.key === null) return [];
    const sd = Math.sqrt(posterior.covariance[j * p + j]! * posterior.noiseVariance);
    return [{ key: c.key, meanS: (posterior.coefficients[j]! * middleS) / CONTRAST, sdS: (sd * middleS) / CONTRAST }];
  });
}
