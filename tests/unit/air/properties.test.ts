import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { airIndex } from '@/lib/domain/air/air-index';
import {
  dewPointC,
  humidityFromDewPoint,
  humidityFromWetBulb,
  humidityRatio,
  vapourPressureOfRatioPa,
  vapourPressurePa,
  wetBulbC,
} from '@/lib/domain/air/humidity';
import { altimeterSettingPa, stationPressureOf, stationPressurePa } from '@/lib/domain/air/pressure';
import { saturationOverWaterPa, saturationVapourPressurePa } from '@/lib/domain/air/saturation';
import {
  densityAltitudeM,
  isaDensityKgM3,
  isaPressurePa,
  isaTempK,
  pressureAltitudeM,
  relativeDensityIsa,
} from '@/lib/domain/air/standard-atmosphere';

const tempC = fc.double({ min: 1, max: 48, noNaN: true });
const pressurePa = fc.double({ min: 75_000, max: 106_000, noNaN: true });
const humidity = fc.double({ min: 0.02, max: 1, noNaN: true });
const altitudeM = fc.double({ min: -400, max: 3500, noNaN: true });

const close = (got: number | null, expected: number, allowed: number): boolean =>
  got !== null && Math.abs(got - expected) <= allowed;

describe('round trips', () => {
  test('relative humidity through the dew point', () => {
    fc.assert(fc.property(tempC, humidity, (t, rh) => close(humidityFromDewPoint(t, dewPointC(t, rh)), rh, 1e-9)));
  });

  test('relative humidity through the wet bulb', () => {
    fc.assert(
      fc.property(fc.double({ min: 15, max: 48, noNaN: true }), humidity, pressurePa, (t, rh, p) =>
        close(humidityFromWetBulb(t, wetBulbC(t, rh, p), p), rh, 1e-9),
      ),
    );
  });

  test('vapour pressure through the humidity ratio', () => {
    fc.assert(
      fc.property(tempC, humidity, pressurePa, (t, rh, p) => {
        const e = vapourPressurePa(t, rh) as number;
        return close(vapourPressureOfRatioPa(humidityRatio(e, p), p), e, 1e-6);
      }),
    );
  });

  test('altimeter setting through station pressure', () => {
    fc.assert(
      fc.property(fc.double({ min: 95_000, max: 106_000, noNaN: true }), altitudeM, (a, h) =>
        close(altimeterSettingPa(stationPressurePa(a, h), h), a, 1e-6),
      ),
    );
  });

  test('altitude through standard pressure and density', () => {
    fc.assert(
      fc.property(
        altitudeM,
        (h) =>
          close(pressureAltitudeM(isaPressurePa(h)), h, 1e-6) && close(densityAltitudeM(isaDensityKgM3(h)), h, 1e-6),
      ),
    );
  });
});

describe('order', () => {
  test('saturation pressure rises with temperature, over ice and water', () => {
    fc.assert(
      fc.property(fc.double({ min: -60, max: 60, noNaN: true }), (t) => {
        expect(saturationVapourPressurePa(t + 0.1)).toBeGreaterThan(saturationVapourPressurePa(t) as number);
        expect(saturationOverWaterPa(t + 0.1)).toBeGreaterThan(saturationOverWaterPa(t) as number);
      }),
    );
  });

  test('ice holds less vapour than supercooled water', () => {
    fc.assert(
      fc.property(fc.double({ min: -40, max: -0.1, noNaN: true }), (t) => {
        expect(saturationVapourPressurePa(t)).toBeLessThan(saturationOverWaterPa(t) as number);
      }),
    );
  });

  test('dew point <= wet bulb <= air temperature', () => {
    fc.assert(
      fc.property(fc.double({ min: 15, max: 48, noNaN: true }), humidity, pressurePa, (t, rh, p) => {
        const wet = wetBulbC(t, rh, p) as number;
        expect(wet).toBeLessThanOrEqual(t + 1e-9);
        expect(wet).toBeGreaterThanOrEqual((dewPointC(t, rh) as number) - 1e-6);
      }),
    );
  });

  test('density altitude falls as density rises; station pressure falls with altitude', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.8, max: 1.3, noNaN: true }), altitudeM, (rho, h) => {
        expect(densityAltitudeM(rho + 0.001)).toBeLessThan(densityAltitudeM(rho) as number);
        expect(stationPressurePa(101_325, h + 1)).toBeLessThan(stationPressurePa(101_325, h) as number);
      }),
    );
  });

  test('air index falls with dry pressure and rises with temperature', () => {
    fc.assert(
      fc.property(tempC, pressurePa, (t, p) => {
        const here = airIndex(t, p) as number;
        expect(airIndex(t, p + 10)).toBeLessThan(here);
        expect(airIndex(t + 0.1, p)).toBeGreaterThan(here);
      }),
    );
  });
});

describe('absence is null, never NaN', () => {
  const odd = fc.constantFrom(
    null,
    undefined,
    Number.NaN,
    Number.POSITIVE_INFINITY,
    Number.NEGATIVE_INFINITY,
    -1e308,
    0,
    1e308,
    25,
  );
  const functions = {
    airIndex,
    altimeterSettingPa,
    densityAltitudeM,
    dewPointC,
    humidityFromDewPoint,
    humidityFromWetBulb,
    humidityRatio,
    isaPressurePa,
    isaTempK,
    pressureAltitudeM,
    relativeDensityIsa,
    saturationOverWaterPa,
    saturationVapourPressurePa,
    stationPressurePa,
    vapourPressureOfRatioPa,
    vapourPressurePa,
    wetBulbC,
  } as Record<string, (...inputs: (number | null | undefined)[]) => number | null>;

  test.each(Object.entries(functions))('%s', (_name, formula) => {
    fc.assert(
      fc.property(odd, odd, odd, (a, b, c) => {
        const result = formula(a, b, c);
        expect(result === null || Number.isFinite(result), String(result)).toBe(true);
      }),
    );
    expect(formula(null, null, null)).toBeNull();
  });

  test('dry air has no dew point', () => expect(dewPointC(25, 0)).toBeNull());
  test('a dew point above the air temperature has no humidity', () => expect(humidityFromDewPoint(20, 21)).toBeNull());
  test('a wet bulb above the air temperature has no humidity', () =>
    expect(humidityFromWetBulb(20, 21, 100_000)).toBeNull());
  test('a wet bulb drier than dry air has no humidity', () => expect(humidityFromWetBulb(30, 2, 100_000)).toBeNull());
  test('a pressure of unknown kind is no station pressure', () =>
    expect(stationPressureOf(100_000, null, 100)).toBeNull());
});
