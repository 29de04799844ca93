import { describe, expect, test } from 'vitest';
import { leastSquares, predictLeastSquares } from '@/lib/domain/model/least-squares';
import { studentTQuantile } from '@/lib/domain/stats/special';
import { allowedDifference, type CheckEntry, checkEntries, checkEntry } from '../../helpers/check-values';

const entries = checkEntries('linear_regression');
const nist = entries.filter((e) => e.method === 'ols_dataset');

/** The design of a NIST set: several regressors as given, one as powers up to the degree the model names. */
function designOf(entry: CheckEntry): number[][] {
  const x = entry.inputs.x!.value as (number | number[])[];
  const degree = Number(/x\^(\d)/g.exec(String(entry.inputs.model!.value).split('+').pop() ?? '')?.[1] ?? 1);
  return x.map((row) => (Array.isArray(row) ? [1, ...row] : Array.from({ length: degree + 1 }, (_, k) => row ** k)));
}

function fitOf(entry: CheckEntry) {
  const fit = leastSquares(designOf(entry), entry.inputs.y!.value);
  if (fit.kind !== 'fit') throw new Error(`${entry.id}: ${fit.kind}`);
  return fit;
}

function expectClose(entry: CheckEntry, output: string, got: number, expected: number) {
  expect(Math.abs(got - expected), `${entry.id} ${output}: ${got} for ${expected}`).toBeLessThanOrEqual(
    allowedDifference(entry.tolerance, output, expected),
  );
}

describe('least squares against NIST certified values', () => {
  test('seven data sets', () => expect(nist.length).toBe(7));
  test.each(nist.map((e) => [e.id, e] as const))('%s', (_id, entry) => {
    const fit = fitOf(entry);
    const certified = entry.expected;
    (certified.coefficients!.value as number[]).forEach((b, j) => {
      expectClose(entry, 'coefficients', fit.coefficients[j]!, b);
    });
    (certified.standard_errors!.value as number[]).forEach((b, j) => {
      expectClose(entry, 'standard_errors', fit.standardErrors[j]!, b);
    });
    expectClose(entry, 'residual_sd', fit.residualSd, certified.residual_sd!.value);
    expectClose(entry, 'r_squared', fit.rSquared, certified.r_squared!.value);
    expectClose(entry, 'ss_residual', fit.residualSumOfSquares, certified.ss_residual!.value);
    expectClose(entry, 'ss_regression', fit.regressionSumOfSquares, certified.ss_regression!.value);
    expect(fit.df).toBe(certified.df_residual!.value);
  });
});

describe('prediction intervals', () => {
  const predictions = entries.filter((e) => e.method === 'ols_predict');
  test('there are entries', () => expect(predictions.length).toBeGreaterThan(1));
  test.each(predictions.map((e) => [e.id, e] as const))('%s', (_id, entry) => {
    const fit = fitOf(checkEntry('linear_regression', entry.inputs.dataset!.value));
    const { location, leverage, scale } = predictLeastSquares(fit, [1, entry.inputs.x0!.value]);
    const t = studentTQuantile(0.5 + entry.inputs.level!.value / 2, fit.df);
    const expected = entry.expected;
    expectClose(entry, 'fit', location, expected.fit!.value);
    expectClose(entry, 'leverage', leverage, expected.leverage!.value);
    expectClose(entry, 'se_prediction', scale, expected.se_prediction!.value);
    expectClose(entry, 't_quantile', t, expected.t_quantile!.value);
    expectClose(entry, 'pi', location - t * scale, expected.pi!.value[0]);
    expectClose(entry, 'pi', location + t * scale, expected.pi!.value[1]);
    const se = fit.residualSd * Math.sqrt(leverage);
    expectClose(entry, 'se_mean', se, expected.se_mean!.value);
    expectClose(entry, 'ci', location + t * se, expected.ci!.value[1]);
  });
});

describe('refusals instead of meaningless numbers', () => {
  test('as many rows as columns', () => {
    expect(
      leastSquares(
        [
          [1, 2],
          [1, 3],
        ],
        [1, 2],
      ),
    ).toEqual({ kind: 'too-few-rows', have: 2, need: 3 });
  });
  test('two columns that say the same', () => {
    const rows = [1, 2, 3, 4, 5].map((x) => [1, x, 2 * x]);
    expect(leastSquares(rows, [1, 2, 3, 4, 6])).toEqual({ kind: 'collinear' });
  });
  test('a column of zeros', () => {
    expect(
      leastSquares(
        [1, 2, 3, 4].map((x) => [1, x, 0]),
        [1, 2, 3, 4],
      ),
    ).toEqual({ kind: 'collinear' });
  });
});
