import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { airDensityKgM3 } from '@/lib/domain/air/density';
import { saturationOverWaterPa } from '@/lib/domain/air/saturation';

const tempC = fc.double({ min: 0, max: 45, noNaN: true });
const pressurePa = fc.double({ min: 75_000, max: 106_000, noNaN: true });
const humidity = fc.double({ min: 0, max: 1, noNaN: true });

/** Independent of CIPM-2007: Dalton's law with two ideal gases (R 287.05 and 461.495 J/(kg K)) and Hyland-Wexler vapour. */
function idealMixture(t: number, p: number, rh: number): number {
  const e = rh * (saturationOverWaterPa(t) as number);
  return (p - e) / (287.05 * (t + 273.15)) + e / (461.495 * (t + 273.15));
}

const density = (t: number, p: number, rh: number): number => {
  const rho = airDensityKgM3(t, p, rh);
  expect(rho).not.toBeNull();
  return rho as number;
};

describe('airDensityKgM3', () => {
  // The measured spread between the two over this range is 0.056 % (air_density.json): physics agrees where CIPM-2007 extrapolates.
  test('stays within 0.06 % of an ideal-gas mixture over 5-42 degC', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 5, max: 42, noNaN: true }),
        fc.double({ min: 80_000, max: 104_000, noNaN: true }),
        humidity,
        (t, p, rh) => Math.abs(density(t, p, rh) / idealMixture(t, p, rh) - 1) <= 6e-4,
      ),
    );
  });

  test('falls with temperature and humidity, rises with pressure', () => {
    fc.assert(
      fc.property(tempC, pressurePa, fc.double({ min: 0, max: 0.9, noNaN: true }), (t, p, rh) => {
        const here = density(t, p, rh);
        expect(density(t + 0.5, p, rh)).toBeLessThan(here);
        expect(density(t, p, rh + 0.05)).toBeLessThan(here);
        expect(density(t, p + 100, rh)).toBeGreaterThan(here);
      }),
    );
  });

  test.each([
    ['no temperature', null, 100_000, 0.5],
    ['no pressure', 20, undefined, 0.5],
    ['no humidity', 20, 100_000, null],
    ['NaN', Number.NaN, 100_000, 0.5],
    ['infinite pressure', 20, Number.POSITIVE_INFINITY, 0.5],
    ['no air', 20, 0, 0.5],
    ['humidity typed as percent', 20, 100_000, 50],
    ['negative humidity', 20, 100_000, -0.1],
    ['boiling', 110, 101_325, 1],
    ['below absolute zero', -300, 100_000, 0],
  ])('%s gives null', (_name, t, p, rh) => {
    expect(airDensityKgM3(t, p, rh)).toBeNull();
  });
});
