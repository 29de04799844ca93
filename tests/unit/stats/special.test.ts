import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  incompleteBeta,
  incompleteBetaInverse,
  incompleteGamma,
  logGamma,
  normalCdf,
  normalPdf,
  normalQuantile,
  studentTCdf,
  studentTPdf,
  studentTQuantile,
} from '@/lib/domain/stats/special';
import { allowedDifference, checkEntries } from '../../helpers/check-values';
import { integrate } from '../../helpers/integrate';

describe('Student t quantiles against published tables', () => {
  const entries = checkEntries('linear_regression').filter((e) => e.method === 't_quantiles');
  test('there are entries', () => expect(entries.length).toBeGreaterThan(4));
  test.each(entries.map((e) => [e.id, e] as const))('%s', (_id, entry) => {
    for (const p of entry.inputs.p!.value as number[]) {
      const expected = entry.expected[`t_${p}`]!.value as number;
      const got = studentTQuantile(p, entry.inputs.df!.value);
      expect(Math.abs(got - expected), `p = ${p}`).toBeLessThanOrEqual(
        allowedDifference(entry.tolerance, `t_${p}`, expected),
      );
    }
  });
});

describe('exact values', () => {
  test('gamma of whole and half numbers', () => {
    expect(logGamma(5)).toBeCloseTo(Math.log(24), 13);
    expect(logGamma(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI), 13);
  });
  test('I_x(1, 1) is x and I_x(2, 1) is x squared', () => {
    expect(incompleteBeta(1, 1, 0.3)).toBeCloseTo(0.3, 14);
    expect(incompleteBeta(2, 1, 0.3)).toBeCloseTo(0.09, 14);
  });
  test('P(1, x) is 1 - exp(-x)', () => {
    for (const x of [0.1, 1, 3, 10]) expect(incompleteGamma(1, x)).toBeCloseTo(1 - Math.exp(-x), 14);
  });
  test('the t with one degree of freedom is the Cauchy', () => {
    for (const t of [-5, -1, 0.3, 2]) expect(studentTCdf(t, 1)).toBeCloseTo(0.5 + Math.atan(t) / Math.PI, 14);
  });
});

describe('against numerical integration of the density', () => {
  test.each([3, 7.5, 40])('Student t, df %d', (df) => {
    for (const t of [-3, -0.5, 1, 4])
      expect(studentTCdf(t, df)).toBeCloseTo(0.5 + integrate((x) => studentTPdf(x, df), 0, t), 10);
  });
  test('normal', () => {
    for (const z of [-4, -1.5, 0.2, 3]) expect(normalCdf(z)).toBeCloseTo(0.5 + integrate(normalPdf, 0, z), 12);
  });
});

describe('properties', () => {
  test('quantiles undo distributions, and tails mirror', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 0.49, noNaN: true }),
        fc.double({ min: 1, max: 500, noNaN: true }),
        (p, df) => {
          expect(studentTCdf(studentTQuantile(p, df), df)).toBeCloseTo(p, 9);
          expect(normalCdf(normalQuantile(p))).toBeCloseTo(p, 12);
          expect(studentTQuantile(1 - p, df) / -studentTQuantile(p, df)).toBeCloseTo(1, 6);
        },
      ),
    );
  });
  test('the beta quantile undoes the beta distribution', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 200 }),
        fc.integer({ min: 1, max: 200 }),
        fc.double({ min: 0.001, max: 0.999, noNaN: true }),
        (a, b, p) => {
          expect(incompleteBeta(a, b, incompleteBetaInverse(a, b, p))).toBeCloseTo(p, 9);
        },
      ),
    );
  });
});
