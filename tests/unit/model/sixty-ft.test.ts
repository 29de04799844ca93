import { describe, expect, test } from 'vitest';
import { PRIOR } from '@/lib/domain/model/constants';
import {
  CONTRAST,
  forecastSixtyFt,
  type SixtyFtForecast,
  type SixtyFtModel,
  sixtyFtEffects,
  trainSixtyFt,
} from '@/lib/domain/model/sixty-ft';
import { preparePasses } from '@/lib/domain/model/train';
import { decomposeSymmetric } from '@/lib/domain/stats/cholesky';
import { SIXTY_FT_TRUTH, sixtyFtSeason } from '../../helpers/sixty-ft';

const s = sixtyFtSeason(1);
const prepared = preparePasses(s.passes);
const model = trainSixtyFt(prepared.slice(0, 120), s.adjustables)!;
const run = prepared[125]!.features;

/** Coefficients for ln time itself, solved with a column per event and priors a CONTRAST-th as wide. */
function solvedInLogTime({ model: fitted, middleS }: SixtyFtModel): Float64Array {
  const { design, event, events } = fitted.input;
  const p = design.p;
  const size = p + events;
  const noise = (fitted.posterior.eventSums.lambda * PRIOR.event ** 2) / CONTRAST ** 2;
  const normal = new Float64Array(size * size);
  const rhs = new Float64Array(size);
  fitted.rows.forEach(({ pass }, i) => {
    const original = s.passes.find((q) => q.id === pass.id)!;
    const row = new Float64Array(size);
    row.set(design.x.subarray(i * p, i * p + p));
    row[p + event[i]!] = 1;
    const weight = fitted.posterior.weights[i]!;
    for (let j = 0; j < size; j++) {
      rhs[j]! += weight * row[j]! * Math.log(original.sixtyFtS! / middleS);
      for (let k = 0; k < size; k++) normal[j * size + k]! += weight * (row[j]! * row[k]!);
    }
  });
  const sds = [...design.columns.map((c) => c.priorSd), ...Array.from({ length: events }, () => PRIOR.event)];
  sds.forEach((sd, j) => {
    normal[j * size + j]! += noise / (sd / CONTRAST) ** 2;
    const mean = j < p ? design.columns[j]!.priorMean / CONTRAST : 0;
    rhs[j]! += (noise / (sd / CONTRAST) ** 2) * mean;
  });
  return decomposeSymmetric(normal, size)!.solve(rhs);
}

describe('the same machinery on ln time', () => {
  test('effects equal solving ln time with priors of its own', () => {
    const solved = solvedInLogTime(model);
    const effects = sixtyFtEffects(model);
    expect(effects.map((e) => e.key)).toEqual(s.adjustables.map((a) => a.key));
    for (const { key, meanS } of effects) {
      const j = model.model.columnSet.columns.findIndex((c) => c.key === key);
      expect(meanS / model.middleS, key).toBeCloseTo(solved[j]!, 9);
    }
  });

  test('times twice as long: every number twice as long', () => {
    const slow = s.passes.map((p) => ({ ...p, sixtyFtS: p.sixtyFtS! * 2 }));
    const twice = trainSixtyFt(preparePasses(slow).slice(0, 120), s.adjustables, { middleS: 2 * model.middleS })!;
    const [one, two] = [forecastSixtyFt(model, run), forecastSixtyFt(twice, run)];
    expect(two.medianS / one.medianS).toBeCloseTo(2, 9);
    expect(two.sdS / one.sdS).toBeCloseTo(2, 7);
    for (const [p, q] of Object.entries(one.quantiles)) expect(two.quantiles[p]! / q).toBeCloseTo(2, 7);
    sixtyFtEffects(twice).forEach((e, i) => {
      expect(e.meanS).toBeCloseTo(2 * sixtyFtEffects(model)[i]!.meanS, 9);
    });
  });

  test('the centre of the prior is weak: a tenth of a second elsewhere hardly matters', () => {
    const off = trainSixtyFt(prepared.slice(0, 120), s.adjustables, { middleS: model.middleS + 0.1 })!;
    const [a, b] = [forecastSixtyFt(model, run), forecastSixtyFt(off, run)];
    expect(Math.abs(a.medianS - b.medianS)).toBeLessThan(0.15 * a.sdS);
  });
});

describe('in seconds', () => {
  test('quantiles rise about the median, dots too, mean close to it', () => {
    const f: SixtyFtForecast = forecastSixtyFt(model, run);
    const values = Object.entries(f.quantiles).sort((a, b) => Number(a[0]) - Number(b[0]));
    expect(values).toHaveLength(7);
    for (let i = 1; i < values.length; i++) expect(values[i]![1]).toBeGreaterThan(values[i - 1]![1]);
    expect(f.quantiles['0.5']).toBeCloseTo(f.medianS, 9);
    expect(Math.abs(f.meanS - f.medianS)).toBeLessThan(0.1 * f.sdS);
    expect([...f.dots].sort((a, b) => a - b)).toEqual(f.dots);
    expect(f.dots).toHaveLength(20);
    expect(f.missing).toEqual([]);
    expect(forecastSixtyFt(model, { ...run, trackTempC: null }).missing).toEqual(['track temperature']);
  });

  test('the effect of launch rpm is found, though nothing was believed of it', () => {
    const effect = sixtyFtEffects(trainSixtyFt(prepared, s.adjustables)!).find((e) => e.key === 'launch_rpm')!;
    const truth = SIXTY_FT_TRUTH.perLaunchStep * model.middleS;
    expect(effect.meanS).toBeLessThan(0);
    expect(Math.abs(effect.meanS - truth)).toBeLessThan(3 * effect.sdS);
    expect(effect.sdS).toBeLessThan(Math.abs(truth) / 2);
  });

  test('a belief given in seconds counts where the passes are few', () => {
    const few = prepared.slice(0, 9);
    const believed = trainSixtyFt(few, s.adjustables, { beliefs: { tire_pressure_psi: { meanS: 0.01, sdS: 1e-5 } } })!;
    const effect = sixtyFtEffects(believed).find((e) => e.key === 'tire_pressure_psi')!;
    expect(effect.meanS).toBeCloseTo(0.01, 5);
    expect(effect.sdS).toBeLessThan(1.2e-5);
  });
});

describe('which passes count', () => {
  test('those with a 60-ft time, also without slip; not aborted or excluded ones', () => {
    const passes = s.passes.slice(0, 40).map((p, i) => {
      if (i < 5) return { ...p, sixtyFtS: null };
      if (i < 9) return { ...p, outcome: 'aborted' as const };
      return i < 12 ? { ...p, excluded: true } : { ...p, slipPct: null };
    });
    expect(trainSixtyFt(preparePasses(passes), s.adjustables)!.passesUsed).toBe(28);
  });
  test('too few, or none, is null', () => {
    expect(trainSixtyFt(prepared.slice(0, 7), s.adjustables)).toBeNull();
    const none = s.passes.map((p) => ({ ...p, sixtyFtS: null }));
    expect(trainSixtyFt(preparePasses(none), s.adjustables)).toBeNull();
  });
  test('the middle is that of the passes that count, in steps', () => {
    expect(model.middleS / 0.05).toBeCloseTo(Math.round(model.middleS / 0.05), 9);
    const sorted = s.passes
      .slice(0, 120)
      .filter((p) => p.outcome !== 'aborted')
      .map((p) => p.sixtyFtS)
      .sort((a, b) => a - b);
    expect(Math.abs(model.middleS - sorted[60]!)).toBeLessThanOrEqual(0.025 + 1e-9);
  });
});

test('one step ahead over simulated seasons: ranges hold, and errors are below those of the mean so far', () => {
  const results = [2, 3].flatMap((seed) => {
    const { passes, adjustables } = sixtyFtSeason(seed);
    const all = preparePasses(passes);
    return all.slice(20).flatMap((p, k) => {
      const before = all.slice(0, k + 20);
      const { quantiles, medianS } = forecastSixtyFt(trainSixtyFt(before, adjustables)!, p.features);
      const time = p.pass.sixtyFtS!;
      const mean = before.reduce((sum, b) => sum + b.pass.sixtyFtS!, 0) / before.length;
      const within = (low: string, high: string) => Number(time > quantiles[low]! && time < quantiles[high]!);
      return [
        {
          w80: within('0.1', '0.9'),
          w95: within('0.025', '0.975'),
          own: Math.abs(time - medianS),
          mean: Math.abs(time - mean),
        },
      ];
    });
  });
  const share = (of: 'w80' | 'w95' | 'own' | 'mean') => results.reduce((sum, r) => sum + r[of], 0) / results.length;
  expect(results.length).toBeGreaterThan(250);
  expect(share('w80')).toBeGreaterThan(0.72);
  expect(share('w80')).toBeLessThan(0.88);
  expect(share('w95')).toBeGreaterThan(0.9);
  expect(share('own')).toBeLessThan(0.85 * share('mean'));
});
