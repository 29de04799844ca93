import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { vapourPressurePa } from '@/lib/domain/air/humidity';
import { roundOfContext, runFeatures } from '@/lib/domain/model/features';
import { forecastLog } from '@/lib/domain/model/forecast';
import { forecastLater, laterConditions, normalPoints } from '@/lib/domain/model/later-run';
import { mixtureForecast, mixtureQuantile } from '@/lib/domain/model/mixture';
import { type LogForecast, logCdf, logPdf, toForecast } from '@/lib/domain/model/predictive';
import type { TrackTempForecast } from '@/lib/domain/model/track-temperature';
import { preparePasses, trainModel } from '@/lib/domain/model/train';
import { normalPdf } from '@/lib/domain/stats/special';
import { DEFAULT_BAND, FORECAST_QUANTILES } from '@/lib/domain/types';
import { integrate } from '../../helpers/integrate';
import { contextOf, season } from '../../helpers/seasons';

const s = season('nonlinear', 2);
const AT = 120;
const passes = s.passes.slice(0, AT);
const model = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
const context = contextOf(s, AT);
const run = { context, settings: s.passes[AT - 1]!.settings, roundInEvent: roundOfContext(passes, context) };
const now = context.conditions;
const later = (meanC: number, sdC: number, airMeanC = now.airTempC!): TrackTempForecast => ({
  meanC,
  sdC,
  airMeanC,
  airSdC: 1,
  sunElevationDeg: 40,
  leadHours: 2,
  latest: null,
  readingsUsed: 20,
});
const logAt = (trackTempC: number) => {
  const conditions = laterConditions(now, later(trackTempC, 0));
  return forecastLog(model, runFeatures({ ...context, conditions, settings: run.settings }, run.roundInEvent)).forecast;
};

describe('a later run time', () => {
  test('known exactly, it is the forecast at that track temperature', () => {
    expect(forecastLater(model, run, later(48, 0))).toEqual(toForecast(logAt(48), DEFAULT_BAND));
    expect(forecastLater(model, run, later(now.trackTempC!, 0)).quantiles['0.5']).toBeCloseTo(
      Math.exp(logAt(now.trackTempC!).location),
      9,
    );
  });

  test('odds and quantiles are those of the exact average over the normal', () => {
    const { meanC, sdC } = later(46, 5);
    const got = forecastLater(model, run, later(meanC, sdC));
    const share = (log: number) => integrate((z) => normalPdf(z) * logCdf(logAt(meanC + z * sdC), log), -6, 6, 400);
    expect(got.pBelow).toBeCloseTo(share(Math.log(DEFAULT_BAND.lowPct)), 2);
    expect(1 - got.pAbove).toBeCloseTo(share(Math.log(DEFAULT_BAND.highPct)), 2);
    for (const p of FORECAST_QUANTILES) {
      const off = share(Math.log(got.quantiles[String(p)]!)) - p;
      expect(Math.abs(off), `quantile ${p}`).toBeLessThan(0.004);
    }
    expect(got.pBelow + got.pInBand + got.pAbove).toBeCloseTo(1, 9);
  });

  test('the less the track temperature is known, the wider', () => {
    const width = (sdC: number) => {
      const { quantiles } = forecastLater(model, run, later(46, sdC));
      return Math.log(quantiles['0.9']! / quantiles['0.1']!);
    };
    const widths = [0, 2, 4, 6, 8].map(width);
    expect([...widths].sort((a, b) => a - b)).toEqual(widths);
    expect(widths[4]! / widths[0]!).toBeGreaterThan(1.02);
  });

  test('9 points say the same as 21', () => {
    const [few, many] = [9, 21].map((n) => forecastLater(model, run, later(46, 5), n));
    expect(few!.pInBand).toBeCloseTo(many!.pInBand, 2);
    expect(few!.sdPct).toBeCloseTo(many!.sdPct, 1);
  });
});

describe('conditions carried forward', () => {
  test('moisture and pressure stay, air and track move', () => {
    const warmer = laterConditions(now, later(50, 3, now.airTempC! + 6));
    expect(warmer.trackTempC).toBe(50);
    expect(warmer.stationPressurePa).toBe(now.stationPressurePa);
    expect(warmer.relativeHumidity).toBeLessThan(now.relativeHumidity!);
    expect(
      vapourPressurePa(warmer.airTempC, warmer.relativeHumidity)! /
        vapourPressurePa(now.airTempC, now.relativeHumidity)!,
    ).toBeCloseTo(1, 6);
  });
  test('air cooled below its dew point is saturated, unread humidity stays unread', () => {
    expect(laterConditions({ ...now, relativeHumidity: 0.95 }, later(20, 3, now.airTempC! - 8)).relativeHumidity).toBe(
      1,
    );
    expect(laterConditions({ ...now, relativeHumidity: null }, later(20, 3)).relativeHumidity).toBeNull();
  });
});

describe('mixtures of forecasts', () => {
  const part = fc.record({
    location: fc.double({ min: Math.log(8), max: Math.log(30), noNaN: true }),
    scale: fc.double({ min: 0.05, max: 0.4, noNaN: true }),
    oddScale: fc.double({ min: 0.4, max: 1.5, noNaN: true }),
    oddShare: fc.double({ min: 0, max: 0.3, noNaN: true }),
    df: fc.double({ min: 10, max: 300, noNaN: true }),
  });
  const parts = fc.array(part, { minLength: 2, maxLength: 12 });

  test('quantiles undo the average distribution function', () => {
    fc.assert(
      fc.property(parts, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (all, p) => {
        const x = mixtureQuantile(all, p);
        expect(all.reduce((sum, f) => sum + logCdf(f, x), 0) / all.length).toBeCloseTo(p, 7);
      }),
      { numRuns: 60 },
    );
  });

  test('copies of one forecast are that forecast', () => {
    const one: LogForecast = { location: 2.7, scale: 0.14, oddScale: 0.45, oddShare: 0.07, df: 30 };
    const [single, copies] = [toForecast(one, DEFAULT_BAND), mixtureForecast([one, one, one], DEFAULT_BAND)];
    expect(copies.meanPct).toBeCloseTo(single.meanPct, 9);
    expect(copies.sdPct).toBeCloseTo(single.sdPct, 9);
    expect(copies.pInBand).toBeCloseTo(single.pInBand, 9);
    copies.dots.forEach((dot, i) => {
      expect(dot).toBeCloseTo(single.dots[i]!, 7);
    });
  });

  test('mean and sd against integration', () => {
    const two: LogForecast[] = [
      { location: Math.log(13), scale: 0.1, oddScale: 0.2, oddShare: 0.05, df: 60 },
      { location: Math.log(19), scale: 0.12, oddScale: 0.2, oddShare: 0.05, df: 60 },
    ];
    const moment = (k: number) =>
      two.reduce((sum, f) => {
        const [from, to] = [f.location - 8 * f.scale, f.location + 8 * f.scale];
        const part = (j: number) => integrate((v) => Math.exp(v) ** j * logPdf(f, v), from, to);
        return sum + part(k) / part(0) / 2;
      }, 0);
    const got = mixtureForecast(two, DEFAULT_BAND);
    expect(got.meanPct).toBeCloseTo(moment(1), 3);
    expect(got.sdPct).toBeCloseTo(Math.sqrt(moment(2) - moment(1) ** 2), 2);
  });
});

test('normal points have mean 0 and sd 1', () => {
  for (const n of [2, 9, 15, 21]) {
    const z = normalPoints(n);
    expect(z.reduce((a, b) => a + b, 0)).toBeCloseTo(0, 9);
    expect(z.reduce((a, b) => a + b * b, 0) / n).toBeCloseTo(1, 9);
  }
});
