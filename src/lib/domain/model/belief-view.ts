import { normalCdf, normalPdf, studentTCdf, studentTPdf } from '../stats/special';
import type { Adjustable } from '../types';
import { beliefInLog } from './columns';
import type { TrainedModel } from './train';

/** An effect of one step up, slip points at the middle of the band. */
export interface Effect {
  meanPct: number;
  sdPct: number;
  /** Probability that one step up raises slip. */
  pRaises: number;
}

/** Densities at one size of effect, per slip point: for drawing the belief against what the passes say. */
export interface CurvePoint {
  effectPct: number;
  belief: number;
  now: number;
  /** Null when the passes say nothing. */
  passes: number | null;
}

export interface BeliefView {
  key: string;
  label: string;
  /** False: the chief left the belief open and a wide one about no effect stands in. */
  given: boolean;
  /** False: too few passes record the setting, so the belief is all there is. */
  inModel: boolean;
  /** What was believed before any pass. */
  belief: Effect;
  /** What belief and passes say together: what the forecast uses. */
  now: Effect;
  /** What the passes alone say, all other effects still under their own beliefs. Null when they hardly say anything. */
  passes: Effect | null;
  /** Share of what is known that rests on the belief: 1 before any pass, towards 0 as passes come in. */
  shareOnBelief: number;
  /** How far the passes are from the belief, in sds of the difference; beyond about 2 the belief is worth another look. */
  disagreement: number | null;
  curve: CurvePoint[];
}

/** Under this share of the whole, what the passes add is lost in rounding and called nothing. */
const LEAST_SAYING = 0.02;

/** Belief, passes and both together, for every adjustable. */
export function beliefViews(model: TrainedModel): BeliefView[] {
  return model.adjustables.map((adjustable) => beliefView(model, adjustable));
}

interface LogEffect {
  mean: number;
  sd: number;
}

function beliefView(model: TrainedModel, adjustable: Adjustable): BeliefView {
  const belief = beliefInLog(adjustable, model.band);
  const fitted = fittedEffect(model, adjustable.key);
  const passes = fitted && passesAlone(belief, fitted);
  const now = fitted ?? belief;
  const df = fitted ? model.posterior.df : Number.POSITIVE_INFINITY;
  const scale = Math.sqrt(model.band.lowPct * model.band.highPct);
  const effects = {
    belief: inPoints(belief, scale, Number.POSITIVE_INFINITY),
    now: inPoints(now, scale, df),
    passes: passes && inPoints(passes, scale, df),
  };
  return {
    key: adjustable.key,
    label: adjustable.label,
    given: adjustable.belief !== null,
    inModel: fitted !== null,
    ...effects,
    shareOnBelief: Math.min(1, (now.sd / belief.sd) ** 2),
    disagreement: passes && (passes.mean - belief.mean) / Math.hypot(passes.sd, belief.sd),
    curve: curveOf(effects, df),
  };
}

function fittedEffect({ columnSet, posterior }: TrainedModel, key: string): LogEffect | null {
  const j = columnSet.columns.findIndex((c) => c.key === key);
  if (j < 0) return null;
  const variance = posterior.covariance[j * columnSet.columns.length + j]! * posterior.noiseVariance;
  return { mean: posterior.coefficients[j]!, sd: Math.sqrt(variance) };
}

/**
 * The belief taken out again: precisions (1 / sd^2) of independent sources add, and means weigh by them, so what the passes say is the
 * difference. Exact for this model, where the belief of each effect is independent of the others.
 */
export function passesAlone(belief: LogEffect, both: LogEffect): LogEffect | null {
  const [before, after] = [1 / belief.sd ** 2, 1 / both.sd ** 2];
  const added = after - before;
  if (!(added > LEAST_SAYING * after)) return null;
  return { mean: (after * both.mean - before * belief.mean) / added, sd: Math.sqrt(1 / added) };
}

const inPoints = ({ mean, sd }: LogEffect, scale: number, df: number): Effect => ({
  meanPct: mean * scale,
  sdPct: sd * scale,
  pRaises: Number.isFinite(df) ? studentTCdf(mean / sd, df) : normalCdf(mean / sd),
});

const CURVE_POINTS = 81;
/** Each curve is drawn this many sds to both sides; that of the passes does not widen the picture, it may be very flat. */
const CURVE_REACH = 3.2;

function curveOf(effects: Pick<BeliefView, 'belief' | 'now' | 'passes'>, df: number): CurvePoint[] {
  const { belief, now, passes } = effects;
  const low = Math.min(...[belief, now].map((e) => e.meanPct - CURVE_REACH * e.sdPct));
  const high = Math.max(...[belief, now].map((e) => e.meanPct + CURVE_REACH * e.sdPct));
  return Array.from({ length: CURVE_POINTS }, (_, i) => {
    const effectPct = low + ((high - low) * i) / (CURVE_POINTS - 1);
    return {
      effectPct,
      belief: density(belief, effectPct, Number.POSITIVE_INFINITY),
      now: density(now, effectPct, df),
      passes: passes && density(passes, effectPct, df),
    };
  });
}

function density({ meanPct, sdPct }: Effect, at: number, df: number): number {
  const z = (at - meanPct) / sdPct;
  return (Number.isFinite(df) ? studentTPdf(z, df) : normalPdf(z)) / sdPct;
}
