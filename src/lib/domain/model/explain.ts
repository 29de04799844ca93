import type { DiscountedPass, EffectSummary, NearPass } from '../types';
import { DISCOUNT_WEIGHT } from './constants';
import { designRow } from './design';
import type { RunFeatures } from './features';
import type { TrainedModel } from './train';

/** Passes the fit gave less than half their weight, most discounted first. */
export function discountedPasses(model: TrainedModel): DiscountedPass[] {
  const { posterior, rows, input } = model;
  return rows
    .map(({ pass }, i) => ({
      id: pass.id,
      passNo: pass.passNo,
      weight: posterior.weights[i]!,
      slipPct: pass.slipPct!,
      expectedPct: Math.exp(input.y[i]! - posterior.looResidual[i]!),
    }))
    .filter((p) => p.weight < DISCOUNT_WEIGHT)
    .sort((a, b) => a.weight - b.weight);
}

/** One step up of each adjustable at the middle of the band, and how much of it rests on the belief. */
export function effectSummaries(model: TrainedModel): EffectSummary[] {
  const { posterior, columnSet, band } = model;
  const p = columnSet.columns.length;
  const middle = Math.sqrt(band.lowPct * band.highPct);
  return columnSet.columns.flatMap((c, j) => {
    if (c.key === null) return [];
    const sd = Math.sqrt(posterior.covariance[j * p + j]! * posterior.noiseVariance);
    return [
      {
        key: c.key,
        meanPct: posterior.coefficients[j]! * middle,
        sdPct: sd * middle,
        priorMeanPct: c.priorMean * middle,
        priorSdPct: c.priorSd * middle,
        shareOnBelief: Math.min(1, (sd / c.priorSd) ** 2),
      },
    ];
  });
}

const NEAREST = 5;

/** Past passes most like this run in conditions and settings, each difference in units of its own scatter. */
export function nearestPasses(model: TrainedModel, run: RunFeatures): NearPass[] {
  const { design } = model.input;
  const { x } = designRow(run, design);
  const compared = design.columns.flatMap((c, j) => (['setting', 'condition', 'car'].includes(c.kind) ? [j] : []));
  const scale = compared.map((j) => Math.max(design.variances[j]!, 1e-6));
  return model.rows
    .map(({ pass }, i) => {
      const squares = compared.reduce((s, j, k) => s + (design.x[i * design.p + j]! - x[j]!) ** 2 / scale[k]!, 0);
      const distance = Math.sqrt(squares / Math.max(1, compared.length));
      return { id: pass.id, passNo: pass.passNo, distance, slipPct: pass.slipPct!, outcome: pass.outcome };
    })
    .sort((a, b) => a.distance - b.distance)
    .slice(0, NEAREST);
}
