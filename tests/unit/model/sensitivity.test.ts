import { describe, expect, test } from 'vitest';
import { airDensityKgM3 } from '@/lib/domain/air/density';
import { dewPointC } from '@/lib/domain/air/humidity';
import { forecastSettings } from '@/lib/domain/model';
import { contributionsOf } from '@/lib/domain/model/contributions';
import { roundOfContext, runFeatures } from '@/lib/domain/model/features';
import { type PlannedRun, READING_ERRORS, type Reading, readingSensitivity } from '@/lib/domain/model/sensitivity';
import { preparePasses, trainModel } from '@/lib/domain/model/train';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { contextOf, season } from '../../helpers/seasons';

const s = season('nonlinear', 2);
const AT = 120;
const passes = s.passes.slice(0, AT);
const model = trainModel(preparePasses(passes), s.adjustables, DEFAULT_BAND)!;
const context = contextOf(s, AT);
const settings = s.passes[AT - 1]!.settings;
const run: PlannedRun = { context, settings, roundInEvent: roundOfContext(passes, context) };
const sensitivity = readingSensitivity(model, run);
const of = (reading: Reading) => sensitivity.readings.find((r) => r.reading === reading)!;

/** The forecast asked for from scratch, with one reading changed. */
function asked(reading: Reading, by: number) {
  const conditions = { ...context.conditions, [reading]: context.conditions[reading]! + by };
  return forecastSettings({
    passes,
    adjustables: s.adjustables,
    band: DEFAULT_BAND,
    context: { ...context, conditions },
    settings,
  })!;
}

test('the table of errors is what the docs say: 5 degF, 1 degF, 3 points, 0.05 inHg', () => {
  expect(READING_ERRORS.trackTempC).toBeCloseTo(2.7778, 3);
  expect(READING_ERRORS.airTempC).toBeCloseTo(0.5556, 3);
  expect(READING_ERRORS.relativeHumidity).toBe(0.03);
  expect(READING_ERRORS.stationPressurePa).toBeCloseTo(169.3, 1);
});

describe('each shift is the difference of two forecasts', () => {
  test.each(Object.keys(READING_ERRORS) as Reading[])('%s', (reading) => {
    const base = asked(reading, 0);
    for (const [by, got] of [
      [-READING_ERRORS[reading], of(reading).lower],
      [READING_ERRORS[reading], of(reading).higher],
    ] as const) {
      const forecast = asked(reading, by);
      expect(got.medianPct).toBeCloseTo(forecast.quantiles['0.5']! - base.quantiles['0.5']!, 9);
      expect(got.pInBand).toBeCloseTo(forecast.pInBand - base.pInBand, 9);
      expect(Math.abs(got.medianPct)).toBeGreaterThan(0);
    }
    expect(sensitivity.medianPct).toBeCloseTo(base.quantiles['0.5']!, 9);
    expect(sensitivity.pInBand).toBeCloseTo(base.pInBand, 9);
  });
});

test('humidity moves density and dew margin together', () => {
  const { airTempC, stationPressurePa, trackTempC, relativeHumidity } = context.conditions;
  const damp = relativeHumidity! + READING_ERRORS.relativeHumidity;
  const features = {
    ...runFeatures({ ...context, settings }, run.roundInEvent),
    densityKgM3: airDensityKgM3(airTempC, stationPressurePa, damp),
    dewMarginC: trackTempC! - dewPointC(airTempC, damp)!,
  };
  const expected = contributionsOf(model, features).medianPct - sensitivity.medianPct;
  expect(of('relativeHumidity').higher.medianPct).toBeCloseTo(expected, 9);
});

describe('total', () => {
  test('is the root of the summed squares, so no less than the worst and no more than the sum', () => {
    const spreads = sensitivity.readings.map((r) => r.spreadPct);
    expect(sensitivity.totalPct).toBeCloseTo(Math.hypot(...spreads), 12);
    expect(sensitivity.totalPct).toBeGreaterThanOrEqual(Math.max(...spreads));
    expect(sensitivity.totalPct).toBeLessThanOrEqual(spreads.reduce((a, b) => a + b, 0));
    expect([...spreads].sort((a, b) => b - a)).toEqual(spreads);
    expect(sensitivity.shareOfVariance).toBeGreaterThan(0);
    expect(sensitivity.shareOfVariance).toBeLessThan(1);
  });

  test('agrees with drawing all four errors at once', () => {
    const errors = Object.keys(READING_ERRORS) as Reading[];
    const corners = Array.from({ length: 16 }, (_, k) => errors.map((_e, j) => ((k >> j) & 1 ? 1 : -1)));
    const medians = corners.map((signs) => {
      const conditions = { ...context.conditions };
      errors.forEach((e, j) => {
        conditions[e] = conditions[e]! + signs[j]! * READING_ERRORS[e];
      });
      return readingSensitivity(model, { ...run, context: { ...context, conditions } }).medianPct;
    });
    const mean = medians.reduce((a, b) => a + b, 0) / 16;
    const sd = Math.sqrt(medians.reduce((a, b) => a + (b - mean) ** 2, 0) / 16);
    expect(sensitivity.totalPct / sd).toBeCloseTo(1, 1);
  });

  test('no errors, no spread', () => {
    const none = { trackTempC: 0, airTempC: 0, relativeHumidity: 0, stationPressurePa: 0 };
    const { totalPct, totalPInBand, shareOfVariance } = readingSensitivity(model, run, none);
    expect([totalPct, totalPInBand, shareOfVariance]).toEqual([0, 0, 0]);
  });
});

test('a reading that was not taken has no entry; saturated air stays possible', () => {
  const conditions = { ...context.conditions, trackTempC: null, relativeHumidity: 1 };
  const got = readingSensitivity(model, { ...run, context: { ...context, conditions } });
  expect(got.readings.map((r) => r.reading)).not.toContain('trackTempC');
  const humidity = got.readings.find((r) => r.reading === 'relativeHumidity')!;
  expect(humidity.higher.medianPct).toBe(0);
  expect(got.readings.every((r) => Number.isFinite(r.spreadPct))).toBe(true);
});
