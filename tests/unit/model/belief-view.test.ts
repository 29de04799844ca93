import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { beliefViews, passesAlone } from '@/lib/domain/model/belief-view';
import { effectSummaries } from '@/lib/domain/model/explain';
import { preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import { decomposeSymmetric } from '@/lib/domain/stats/cholesky';
import { type Adjustable, DEFAULT_BAND } from '@/lib/domain/types';
import { season } from '../../helpers/seasons';

const s = season('nonlinear', 2);
const train = (passes: number, adjustables: readonly Adjustable[] = s.adjustables): TrainedModel =>
  trainModel(preparePasses(s.passes.slice(0, passes)), adjustables, DEFAULT_BAND)!;
const model = train(120);
const viewOf = (m: TrainedModel, key: string) => beliefViews(m).find((v) => v.key === key)!;
const middle = Math.sqrt(DEFAULT_BAND.lowPct * DEFAULT_BAND.highPct);
const keys = s.adjustables.map((a) => a.key);

/** Cholesky wants exact symmetry, which an inverse of an inverse lacks by rounding. */
function symmetric(matrix: Float64Array, size: number): Float64Array {
  return matrix.map((v, at) => 0.5 * (v + matrix[(at % size) * size + Math.floor(at / size)]!));
}

/** The posterior solved again with another prior for one column, weights and noise as they are. */
function withPriorPrecision(m: TrainedModel, j: number, factor: number): { mean: number; sd: number } {
  const { posterior, columnSet } = m;
  const p = columnSet.columns.length;
  const precision = decomposeSymmetric(symmetric(posterior.covariance, p), p)!.inverse;
  const rhs = Float64Array.from({ length: p }, (_, i) =>
    posterior.coefficients.reduce((sum, b, k) => sum + precision[i * p + k]! * b, 0),
  );
  const { priorMean, priorSd } = columnSet.columns[j]!;
  const prior = posterior.noiseVariance / priorSd ** 2;
  precision[j * p + j]! += (factor - 1) * prior;
  rhs[j]! += (factor - 1) * prior * priorMean;
  const solver = decomposeSymmetric(symmetric(precision, p), p)!;
  return { mean: solver.solve(rhs)[j]!, sd: Math.sqrt(solver.inverse[j * p + j]! * posterior.noiseVariance) };
}

describe('what the passes alone say', () => {
  test.each(keys)('%s: equals a solve without that belief', (key) => {
    const j = model.columnSet.columns.findIndex((c) => c.key === key);
    const wide = withPriorPrecision(model, j, 1e-9);
    const view = viewOf(model, key);
    expect(view.passes!.meanPct / middle).toBeCloseTo(wide.mean, 5);
    expect(view.passes!.sdPct / middle).toBeCloseTo(wide.sd, 5);
  });

  test('a full refit with a very wide belief agrees, reweighting and all', () => {
    const open = s.adjustables.map((a) =>
      a.key === 'counterweight_g' ? { ...a, belief: { meanPct: 0, sdPct: 1000 } } : a,
    );
    const refit = viewOf(train(120, open), 'counterweight_g');
    const view = viewOf(model, 'counterweight_g');
    expect(Math.abs(refit.now.meanPct - view.passes!.meanPct)).toBeLessThan(0.25 * view.passes!.sdPct);
    expect(refit.now.sdPct / view.passes!.sdPct).toBeCloseTo(1, 1);
    expect(refit.shareOnBelief).toBeLessThan(1e-5);
  });

  test('taking the belief out and putting it back gives what was there', () => {
    const positive = fc.double({ min: 0.01, max: 5, noNaN: true });
    const any = fc.double({ min: -5, max: 5, noNaN: true });
    fc.assert(
      fc.property(any, positive, any, positive, (m0, sd0, m1, sd1) => {
        const precision = 1 / sd0 ** 2 + 1 / sd1 ** 2;
        const both = { mean: (m0 / sd0 ** 2 + m1 / sd1 ** 2) / precision, sd: Math.sqrt(1 / precision) };
        const alone = passesAlone({ mean: m0, sd: sd0 }, both);
        const said = 1 / sd1 ** 2 / precision;
        fc.pre(Math.abs(said - 0.02) > 1e-6);
        expect(alone === null).toBe(said < 0.02);
        if (alone === null) return;
        expect(Math.abs(alone.mean - m1)).toBeLessThan((1e-6 * (1 + Math.abs(m0))) / said);
        expect(alone.sd / sd1).toBeCloseTo(1, 6);
      }),
    );
  });

  test('passes that never moved a setting say nothing of it', () => {
    const passes = s.passes.slice(0, 60).map((p) => ({ ...p, settings: { ...p.settings, launch_rpm: 7250 } }));
    const still = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
    const view = viewOf(still, 'launch_rpm');
    expect(view.passes).toBeNull();
    expect(view.disagreement).toBeNull();
    expect(view.shareOnBelief).toBeGreaterThan(0.98);
    expect(view.now.meanPct).toBeCloseTo(view.belief.meanPct, 6);
    expect(view.curve.every((c) => c.passes === null)).toBe(true);
    expect(viewOf(still, 'counterweight_g').passes).not.toBeNull();
  });
});

describe('belief, passes and both', () => {
  test('the belief is what the chief gave, and both together are what the fit uses', () => {
    for (const a of s.adjustables) {
      const view = viewOf(model, a.key);
      expect(view.given && view.inModel).toBe(true);
      expect(view.belief.meanPct).toBeCloseTo(a.belief!.meanPct, 9);
      expect(view.belief.sdPct).toBeCloseTo(a.belief!.sdPct, 9);
      const summary = effectSummaries(model).find((e) => e.key === a.key)!;
      expect(view.now.meanPct).toBeCloseTo(summary.meanPct, 9);
      expect(view.now.sdPct).toBeCloseTo(summary.sdPct, 9);
      expect(view.shareOnBelief).toBeCloseTo(summary.shareOnBelief, 9);
    }
  });

  test('both together lie between the two', () => {
    for (const { belief, passes, now } of beliefViews(model)) {
      const ends = [belief.meanPct, passes!.meanPct].sort((a, b) => a - b);
      expect(now.meanPct).toBeGreaterThanOrEqual(ends[0]! - 1e-9);
      expect(now.meanPct).toBeLessThanOrEqual(ends[1]! + 1e-9);
      expect(now.sdPct).toBeLessThan(Math.min(belief.sdPct, passes!.sdPct));
    }
  });

  test('the share on the belief falls with passes', () => {
    const shares = [10, 40, 150].map((n) => viewOf(train(n), 'counterweight_g').shareOnBelief);
    expect([...shares].sort((a, b) => b - a)).toEqual(shares);
    expect(shares[2]).toBeLessThan(0.5);
  });

  test('probability of raising slip: of the belief by the normal, afterwards surer', () => {
    const view = viewOf(model, 'counterweight_g');
    expect(view.belief.pRaises).toBeCloseTo(0.9007, 3); // normal: 0.9 / 0.7 sds
    expect(view.now.pRaises).toBeGreaterThan(0.99);
    expect(viewOf(model, 'release_delay_s').now.pRaises).toBeLessThan(0.2);
  });

  test('a belief with the wrong sign shows as disagreement', () => {
    const wrong = s.adjustables.map((a) =>
      a.key === 'counterweight_g' ? { ...a, belief: { meanPct: -0.9, sdPct: 0.3 } } : a,
    );
    const view = viewOf(train(150, wrong), 'counterweight_g');
    expect(view.disagreement).toBeGreaterThan(2);
    expect(Math.abs(viewOf(train(150), 'counterweight_g').disagreement!)).toBeLessThan(2);
  });

  test('an open belief is wide about nothing; a setting hardly recorded rests on its belief', () => {
    const open = s.adjustables.map((a) => (a.key === 'launch_rpm' ? { ...a, belief: null } : a));
    const view = viewOf(train(60, open), 'launch_rpm');
    expect(view.given).toBe(false);
    expect(view.belief.meanPct).toBe(0);
    expect(view.belief.pRaises).toBe(0.5);
    const extra: Adjustable = { ...s.adjustables[0]!, key: 'stand_height_in', label: 'Stand height' };
    const unseen = viewOf(train(60, [...s.adjustables, extra]), 'stand_height_in');
    expect([unseen.inModel, unseen.passes, unseen.shareOnBelief]).toEqual([false, null, 1]);
    expect(unseen.now).toEqual(unseen.belief);
  });
});

test('curves are densities over the drawn range', () => {
  for (const view of beliefViews(model)) {
    const { curve } = view;
    const step = curve[1]!.effectPct - curve[0]!.effectPct;
    const area = (of: 'belief' | 'now') => curve.reduce((sum, c) => sum + c[of], 0) * step;
    expect(area('belief')).toBeCloseTo(1, 2);
    expect(area('now')).toBeCloseTo(1, 1);
    const peak = curve.reduce((a, b) => (b.now > a.now ? b : a));
    expect(Math.abs(peak.effectPct - view.now.meanPct)).toBeLessThanOrEqual(step);
  }
});
