import { type Column, unseenTrackVariance } from './columns';
import { OUTLIER_WIDTH } from './constants';
import { designRow } from './design';
import { extrapolationVariance } from './experience';
import type { RunFeatures } from './features';
import { expectedLog } from './fit';
import type { LogForecast } from './predictive';
import type { TrainedModel } from './train';

/** Predictive distribution of ln slip for one run, with the columns whose fact is not known. */
export function forecastLog(model: TrainedModel, run: RunFeatures): { forecast: LogForecast; missing: Column[] } {
  const { posterior, input, columnSet } = model;
  const { x, missing } = designRow(run, input.design);
  const { location, variance } = expectedLog(posterior, x, model.eventIndex.get(run.event) ?? -1);
  const unknown =
    unseenTrackVariance(run, columnSet.columns) +
    missingVariance(model, missing) +
    extrapolationVariance(run, model.ranges);
  const spread = variance + unknown / posterior.noiseVariance;
  return { forecast: predictive(model, location, spread), missing: missing.map((j) => columnSet.columns[j]!) };
}

/** `spread`: variance of the expected ln slip relative to the noise variance. */
export function predictive(model: TrainedModel, location: number, spread: number): LogForecast {
  const { posterior, recalibration } = model;
  const noiseSd = Math.sqrt(posterior.noiseVariance) * recalibration;
  return {
    location,
    scale: noiseSd * Math.sqrt(1 + spread),
    oddScale: noiseSd * Math.sqrt(OUTLIER_WIDTH ** 2 + spread),
    oddShare: posterior.outlierShare,
    df: posterior.df,
  };
}

// A fact that is not known could be anything it has been before: its spread times what it does to slip.
function missingVariance({ posterior, input }: TrainedModel, missing: readonly number[]): number {
  return missing.reduce((sum, j) => sum + posterior.coefficients[j]! ** 2 * input.design.variances[j]!, 0);
}
