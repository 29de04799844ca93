import { describe, expect, test } from 'vitest';
import { updateConjugate } from '@/lib/domain/model/conjugate';
import { NOISE_PRIOR_PASSES, NOISE_SD_GUESS, PRIOR } from '@/lib/domain/model/constants';
import { expectedLog } from '@/lib/domain/model/fit';
import { preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import { quadraticForm } from '@/lib/domain/stats/cholesky';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { season } from '../../helpers/seasons';

function trained(name = 'nonlinear', passes = 60): TrainedModel {
  const s = season(name);
  const model = trainModel(preparePasses(s.passes.slice(0, passes)), s.adjustables, DEFAULT_BAND);
  if (!model) throw new Error('no model');
  return model;
}

/** The same posterior with one explicit ridge column per event: what absorbing events must equal. */
function withEventColumns(model: TrainedModel, weights: Float64Array) {
  const { design, y, event, events } = model.input;
  const noise = model.posterior.eventSums.lambda * PRIOR.event ** 2;
  const p = design.p + events;
  const rows = Array.from({ length: design.n }, (_, i) => {
    const row = new Float64Array(p);
    row.set(design.x.subarray(i * design.p, (i + 1) * design.p));
    row[design.p + event[i]!] = 1;
    return row;
  });
  const cross = new Float64Array(p * p);
  const rhs = new Float64Array(p);
  let squares = 0;
  rows.forEach((x, i) => {
    for (let j = 0; j < p; j++) {
      rhs[j]! += weights[i]! * x[j]! * y[i]!;
      for (let k = 0; k < p; k++) cross[j * p + k]! += weights[i]! * (x[j]! * x[k]!);
    }
    squares += weights[i]! * y[i]! ** 2;
  });
  const sds = [...design.columns.map((c) => c.priorSd), ...Array.from({ length: events }, () => PRIOR.event)];
  const means = [...design.columns.map((c) => c.priorMean), ...Array.from({ length: events }, () => 0)];
  const prior = {
    mean: means,
    precision: sds.map((s) => noise / s ** 2),
    a: NOISE_PRIOR_PASSES / 2,
    b: (NOISE_PRIOR_PASSES / 2) * NOISE_SD_GUESS ** 2,
  };
  return { posterior: updateConjugate({ cross, rhs, squares, rows: design.n }, prior)!, rows, p };
}

describe('events absorbed in closed form', () => {
  const model = trained();
  const full = withEventColumns(model, model.posterior.weights);
  const { design, event } = model.input;

  test('coefficients, noise and covariance equal the fit with a column per event', () => {
    for (let j = 0; j < design.p; j++) {
      expect(model.posterior.coefficients[j]).toBeCloseTo(full.posterior.mean[j]!, 9);
      expect(model.posterior.covariance[j * design.p + j]).toBeCloseTo(full.posterior.covariance[j * full.p + j]!, 8);
    }
    expect(model.posterior.noiseVariance).toBeCloseTo(full.posterior.b / full.posterior.a, 10);
  });

  test('forecasts of known events equal too, location and variance', () => {
    for (const i of [0, 17, 44, 59]) {
      const x = design.x.subarray(i * design.p, (i + 1) * design.p);
      const got = expectedLog(model.posterior, x, event[i]!);
      const row = full.rows[i]!;
      expect(got.location).toBeCloseTo(
        row.reduce((s, v, j) => s + v * full.posterior.mean[j]!, 0),
        9,
      );
      expect(got.variance).toBeCloseTo(quadraticForm(full.posterior.covariance, row, full.p), 8);
    }
  });

  test('leave-one-out residuals equal leaving the pass out', () => {
    const weights = model.posterior.weights;
    for (const i of [5, 31, 58]) {
      const without = Float64Array.from(weights, (w, k) => (k === i ? 0 : w));
      const left = withEventColumns(model, without).posterior.mean;
      const expected = full.rows[i]!.reduce((s, v, j) => s + v * left[j]!, 0);
      expect(model.posterior.looResidual[i]).toBeCloseTo(model.input.y[i]! - expected, 8);
    }
  });
});

describe('odd passes', () => {
  test('a pass far off its neighbours is discounted, the others are not', () => {
    const s = season('quiet');
    const passes = s.passes.slice(0, 60).map((p, i) => (i === 40 ? { ...p, slipPct: p.slipPct! * 2.5 } : p));
    const model = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
    expect(model.posterior.weights[40]).toBeLessThan(0.15);
    const clean = trainModel(preparePasses(s.passes.slice(0, 60)), s.adjustables, DEFAULT_BAND)!;
    expect(clean.posterior.weights[40]).toBeGreaterThan(0.5);
  });
  test('a known measurement error takes weight from its pass only', () => {
    const s = season('quiet');
    const passes = s.passes.slice(0, 60).map((p, i) => (i === 10 ? { ...p, slipSdPct: 6 } : p));
    const model = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
    expect(model.posterior.weights[10]).toBeLessThan(0.1);
    expect(model.posterior.weights[11]).toBeGreaterThan(0.8);
  });
});

test('the same passes give the same fit, whatever order they come in', () => {
  const s = season('nonlinear');
  const forward = trainModel(preparePasses(s.passes), s.adjustables, DEFAULT_BAND)!;
  const backward = trainModel(preparePasses([...s.passes].reverse()), s.adjustables, DEFAULT_BAND)!;
  expect([...backward.posterior.coefficients]).toEqual([...forward.posterior.coefficients]);
});

test('constant, repeated and mostly blank columns do not break the fit', () => {
  const s = season('nonlinear');
  const passes = s.passes.map((p, i) => ({
    ...p,
    settings: { ...p.settings, launch_rpm: 7000, base_pressure_lb: p.settings.counterweight_g! * 20 },
    conditions: { ...p.conditions, relativeHumidity: i % 5 === 0 ? 0.5 : null },
  }));
  const model = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
  expect([...model.posterior.coefficients].every(Number.isFinite)).toBe(true);
  expect(model.columnSet.leftOut).toContain('dew margin');
});

test('a fit of nothing but priors is refused below the fewest passes', () => {
  const s = season('nonlinear');
  expect(trainModel(preparePasses(s.passes.slice(0, 7)), s.adjustables, DEFAULT_BAND)).toBeNull();
  expect(trainModel(preparePasses(s.passes.slice(0, 8)), s.adjustables, DEFAULT_BAND)).not.toBeNull();
});
