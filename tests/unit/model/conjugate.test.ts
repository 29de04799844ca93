import { describe, expect, test } from 'vitest';
import { type CrossSums, updateConjugate } from '@/lib/domain/model/conjugate';
import { quadraticForm } from '@/lib/domain/stats/cholesky';
import { studentTQuantile } from '@/lib/domain/stats/special';
import { allowedDifference, type CheckEntry, checkEntries, checkEntry } from '../../helpers/check-values';

function crossSums(rows: number[][], y: number[], p: number): CrossSums {
  const cross = new Float64Array(p * p);
  const rhs = new Float64Array(p);
  rows.forEach((x, i) => {
    for (let j = 0; j < p; j++) {
      rhs[j]! += x[j]! * y[i]!;
      for (let k = 0; k < p; k++) cross[j * p + k]! += x[j]! * x[k]!;
    }
  });
  return { cross, rhs, squares: y.reduce((s, v) => s + v * v, 0), rows: y.length };
}

function expectAll(entry: CheckEntry, output: string, got: ArrayLike<number>) {
  const expected = [entry.expected[output]!.value].flat() as number[];
  expect(got.length).toBe(expected.length);
  expected.forEach((e, i) => {
    expect(Math.abs(got[i]! - e), `${output}[${i}]: ${got[i]} for ${e}`).toBeLessThanOrEqual(
      allowedDifference(entry.tolerance, output, e),
    );
  });
}

describe('conjugate regression against worked values', () => {
  const entries = checkEntries('linear_regression').filter((e) => e.method === 'bayes_nig');
  test('there are entries', () => expect(entries.length).toBe(2));
  test.each(entries.map((e) => [e.id, e] as const))('%s', (_id, entry) => {
    const { inputs } = entry;
    const priorMean = inputs.m0!.value as number[];
    const p = priorMean.length;
    const precision = (inputs.L0!.value as number[][]).map((row, j) => row[j]!);
    const posterior = updateConjugate(crossSums(inputs.X!.value, inputs.y!.value, p), {
      mean: priorMean,
      precision,
      a: inputs.a0!.value,
      b: inputs.b0!.value,
    })!;
    const noise = posterior.b / posterior.a;
    const rows = inputs.x_new!.value as number[][];
    const location = rows.map((x) => x.reduce((s, v, j) => s + v * posterior.mean[j]!, 0));
    const scale = rows.map((x) => Math.sqrt(noise * (1 + quadraticForm(posterior.covariance, x, p))));
    const t = studentTQuantile(0.9, 2 * posterior.a);
    const outputs: Record<string, ArrayLike<number>> = {
      mn: posterior.mean,
      an: [posterior.a],
      bn: [posterior.b],
      coef_scale: priorMean.map((_, j) => Math.sqrt(noise * posterior.covariance[j * p + j]!)),
      sigma2_mean: [posterior.b / (posterior.a - 1)],
      log_marginal_likelihood: [posterior.logEvidence],
      pred_location: location,
      pred_scale: scale,
      pred_df: rows.map(() => 2 * posterior.a),
      pred_80_low: location.map((l, i) => l - t * scale[i]!),
      pred_80_high: location.map((l, i) => l + t * scale[i]!),
    };
    const named = Object.keys(entry.expected);
    expect(named.length).toBeGreaterThan(3);
    for (const name of named) {
      expect(outputs[name], `${name} is judged`).toBeDefined();
      expectAll(entry, name, outputs[name]!);
    }
  });
});

test('ridge regression is the posterior mean with zero prior means', () => {
  const entry = checkEntry('linear_regression', 'reg.ridge.A');
  const rows = (entry.inputs.x!.value as number[][]).map((x) => [1, ...x]);
  const sums = crossSums(rows, entry.inputs.y!.value, 3);
  const lambda = entry.inputs.lambda!.value as number;
  const ridge = (intercept: number) =>
    updateConjugate(sums, { mean: [0, 0, 0], precision: [intercept, lambda, lambda], a: 1, b: 1 })!.mean;
  expectAll(entry, 'intercept_penalised', ridge(lambda));
  expectAll(entry, 'intercept_unpenalised', ridge(0));
});

test('columns that cannot be told apart are refused when the prior says nothing either', () => {
  const sums = crossSums(
    [
      [1, 1],
      [2, 2],
      [3, 3],
    ],
    [1, 2, 3],
    2,
  );
  expect(updateConjugate(sums, { mean: [0, 0], precision: [0, 0], a: 1, b: 1 })).toBeNull();
});
