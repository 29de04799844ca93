import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  type LogForecast,
  logCdf,
  logPdf,
  logQuantile,
  tabulatedTCdf,
  toForecast,
} from '@/lib/domain/model/predictive';
import { studentTCdf } from '@/lib/domain/stats/special';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { integrate } from '../../helpers/integrate';

const F: LogForecast = { location: Math.log(15), scale: 0.14, oddScale: 0.45, oddShare: 0.07, df: 30 };

const anyForecast = fc.record({
  location: fc.double({ min: Math.log(4), max: Math.log(40), noNaN: true }),
  scale: fc.double({ min: 0.03, max: 0.5, noNaN: true }),
  oddScale: fc.double({ min: 0.5, max: 2, noNaN: true }),
  oddShare: fc.double({ min: 0, max: 0.3, noNaN: true }),
  df: fc.double({ min: 6, max: 400, noNaN: true }),
});

describe('predictive distribution against numerical integration', () => {
  test('density integrates to one and to the distribution function', () => {
    expect(integrate((y) => logPdf(F, y), F.location - 30, F.location + 30, 40_000)).toBeCloseTo(1, 6);
    const y = Math.log(17);
    expect(logCdf(F, y)).toBeCloseTo(0.5 + integrate((v) => logPdf(F, v), F.location, y), 8);
  });
  test('odds around the band are integrals of the density', () => {
    const forecast = toForecast(F, DEFAULT_BAND);
    const inBand = integrate((v) => logPdf(F, v), Math.log(DEFAULT_BAND.lowPct), Math.log(DEFAULT_BAND.highPct));
    expect(forecast.pInBand).toBeCloseTo(inBand, 8);
  });
  test('mean and sd of slip within eight scales', () => {
    const reach = 8 * F.scale;
    const moment = (k: number) =>
      integrate((v) => Math.exp(v) ** k * logPdf(F, v), F.location - reach, F.location + reach);
    const mean = moment(1) / moment(0);
    const forecast = toForecast(F, DEFAULT_BAND);
    expect(forecast.meanPct).toBeCloseTo(mean, 3);
    expect(forecast.sdPct).toBeCloseTo(Math.sqrt(moment(2) / moment(0) - mean ** 2), 2);
  });
});

describe('properties', () => {
  test('quantiles undo the distribution and rise', () => {
    fc.assert(
      fc.property(anyForecast, fc.double({ min: 0.001, max: 0.999, noNaN: true }), (f, p) => {
        expect(logCdf(f, logQuantile(f, p))).toBeCloseTo(p, 7);
        expect(logQuantile(f, p)).toBeLessThan(logQuantile(f, p + 0.0005));
      }),
    );
  });
  test('mirrored about its middle in ln slip', () => {
    fc.assert(
      fc.property(anyForecast, fc.double({ min: 0.01, max: 0.49, noNaN: true }), (f, p) => {
        expect(logQuantile(f, p) + logQuantile(f, 1 - p)).toBeCloseTo(2 * f.location, 6);
      }),
    );
  });
  test('the three odds add up to one, dots rise, intervals nest', () => {
    fc.assert(
      fc.property(anyForecast, (f) => {
        const forecast = toForecast(f, DEFAULT_BAND);
        expect(forecast.pBelow + forecast.pInBand + forecast.pAbove).toBeCloseTo(1, 9);
        const q = Object.values(forecast.quantiles);
        expect([...q].sort((a, b) => a - b)).toEqual(q);
        expect(forecast.dots).toHaveLength(20);
        expect([...forecast.dots].sort((a, b) => a - b)).toEqual([...forecast.dots]);
      }),
      { numRuns: 40 },
    );
  });
  test('a higher forecast has lower odds of being below', () => {
    fc.assert(
      fc.property(anyForecast, fc.double({ min: 0.01, max: 0.5, noNaN: true }), (f, more) => {
        const higher = toForecast({ ...f, location: f.location + more }, DEFAULT_BAND);
        expect(higher.pBelow).toBeLessThanOrEqual(toForecast(f, DEFAULT_BAND).pBelow);
        expect(higher.pAbove).toBeGreaterThanOrEqual(toForecast(f, DEFAULT_BAND).pAbove);
        expect(higher.meanPct).toBeGreaterThan(toForecast(f, DEFAULT_BAND).meanPct);
      }),
      { numRuns: 40 },
    );
  });
});

test('the table used for ranking stays within 1e-5 of the distribution', () => {
  for (const df of [6, 30, 200]) {
    const table = tabulatedTCdf(df);
    for (let t = -11.9; t < 12; t += 0.137) expect(Math.abs(table(t) - studentTCdf(t, df))).toBeLessThan(1e-5);
  }
});
