import { describe, expect, test } from 'vitest';
import { airSummary, conditionsFromReading, type RawReading } from '@/lib/domain/air/conditions';
import { checkEntry } from '../../helpers/check-values';

const NOTHING: RawReading = {
  airTempC: null,
  relativeHumidity: null,
  dewPointC: null,
  wetBulbC: null,
  pressurePa: null,
  pressureKind: null,
  altitudeM: null,
  trackTempC: null,
};

const FULL: RawReading = {
  ...NOTHING,
  airTempC: 30,
  relativeHumidity: 0.6,
  pressurePa: 98_000,
  pressureKind: 'station',
  trackTempC: 45,
};

describe('conditionsFromReading', () => {
  test('a full reading passes through', () => {
    expect(conditionsFromReading(FULL)).toEqual({
      airTempC: 30,
      relativeHumidity: 0.6,
      stationPressurePa: 98_000,
      trackTempC: 45,
    });
  });

  test('an empty reading gives nulls', () => {
    expect(conditionsFromReading(NOTHING)).toEqual({
      airTempC: null,
      relativeHumidity: null,
      stationPressurePa: null,
      trackTempC: null,
    });
  });

  test('an altimeter setting becomes station pressure, as published', () => {
    const { inputs, expected, tolerance } = checkEntry('air_density', 'air.altimeter_to_station.1016_1770m');
    const reading = {
      ...FULL,
      pressurePa: inputs.altimeter?.value * 100,
      pressureKind: 'altimeter' as const,
      altitudeM: inputs.elevation?.value,
    };
    const station = conditionsFromReading(reading).stationPressurePa as number;
    expect(Math.abs(station / 100 - expected.p_station?.value)).toBeLessThanOrEqual(tolerance.abs as number);
  });

  test('an altimeter setting is never taken for station pressure', () => {
    expect(conditionsFromReading({ ...FULL, pressureKind: 'altimeter' }).stationPressurePa).toBeNull();
    expect(conditionsFromReading({ ...FULL, pressureKind: null }).stationPressurePa).toBeNull();
  });

  test('a dew point becomes relative humidity, as published', () => {
    const { inputs, expected } = checkEntry('psychrometrics', 'psy.rh_from_dewpoint.30_20');
    const reading = { ...FULL, relativeHumidity: null, airTempC: inputs.t?.value, dewPointC: inputs.td?.value };
    expect(conditionsFromReading(reading).relativeHumidity).toBeCloseTo(expected.RH?.value, 9);
  });

  test('a wet bulb becomes relative humidity with the DERIVED station pressure', () => {
    const wet = { ...FULL, relativeHumidity: null, wetBulbC: 20, pressurePa: 101_600, altitudeM: 1770 };
    const asAltimeter = conditionsFromReading({ ...wet, pressureKind: 'altimeter' });
    const asStation = conditionsFromReading({
      ...wet,
      pressurePa: asAltimeter.stationPressurePa,
      pressureKind: 'station',
    });
    expect(asAltimeter.relativeHumidity).toBeCloseTo(asStation.relativeHumidity as number, 12);
    expect(conditionsFromReading({ ...wet, pressurePa: null, pressureKind: null }).relativeHumidity).toBeNull();
  });

  test('of two humidities relative humidity is used', () => {
    expect(conditionsFromReading({ ...FULL, dewPointC: 10 }).relativeHumidity).toBe(0.6);
  });

  test('impossible or non-finite values become null', () => {
    const bad = {
      ...FULL,
      airTempC: Number.NaN,
      relativeHumidity: 45,
      trackTempC: Number.POSITIVE_INFINITY,
      pressurePa: -5,
    };
    expect(Object.values(conditionsFromReading(bad))).toEqual([null, null, null, null]);
    expect(conditionsFromReading({ ...FULL, relativeHumidity: null, dewPointC: 31 }).relativeHumidity).toBeNull();
  });
});

describe('airSummary', () => {
  test('every number is there for full conditions and consistent with the others', () => {
    const air = airSummary(conditionsFromReading(FULL));
    expect(Object.values(air).every((value) => Number.isFinite(value))).toBe(true);
    expect(air.grainsPerLb).toBeCloseTo((air.humidityRatio as number) * 7000, 9);
    expect(air.relativeDensity).toBeCloseTo((air.densityKgM3 as number) / 1.225, 6);
    expect(air.densityAltitudeM).toBeGreaterThan(air.pressureAltitudeM as number);
  });

  test('without humidity only pressure altitude stands', () => {
    const air = airSummary(conditionsFromReading({ ...FULL, relativeHumidity: null }));
    const { pressureAltitudeM, ...rest } = air;
    expect(pressureAltitudeM).not.toBeNull();
    expect(Object.values(rest).every((value) => value === null)).toBe(true);
  });

  test('without pressure only vapour pressure and dew point stand', () => {
    const { vapourPressurePa, dewPointC, ...rest } = airSummary(conditionsFromReading({ ...FULL, pressurePa: null }));
    expect(vapourPressurePa).not.toBeNull();
    expect(dewPointC).not.toBeNull();
    expect(Object.values(rest).every((value) => value === null)).toBe(true);
  });
});
