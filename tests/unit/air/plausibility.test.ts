import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { conditionsFromReading, type RawReading } from '@/lib/domain/air/conditions';
import { type CheckContext, mustRefuse, type ReadingCheck, readingChecks } from '@/lib/domain/air/plausibility';
import { altimeterSettingPa, stationPressurePa } from '@/lib/domain/air/pressure';
import { isaPressurePa } from '@/lib/domain/air/standard-atmosphere';
import { fromDisplay } from '@/lib/domain/display';
import { inHgToPa } from '@/lib/domain/units';
import { checkEntry } from '../../helpers/check-values';

const HIGH_NOON: CheckContext = {
  altitudeM: 1770,
  latitudeDeg: 39.65,
  longitudeDeg: -105.2,
  takenAt: '2026-06-13T18:30:00Z',
  units: 'us',
};
const NIGHT = '2026-06-14T05:30:00Z';

const GOOD: RawReading = {
  airTempC: 30,
  relativeHumidity: 0.4,
  dewPointC: null,
  wetBulbC: null,
  pressurePa: 82_000,
  pressureKind: 'station',
  altitudeM: 1770,
  trackTempC: 48,
};

const checks = (change: Partial<RawReading>, context: Partial<CheckContext> = {}): ReadingCheck[] =>
  readingChecks({ ...GOOD, ...change }, { ...HIGH_NOON, ...context });

function only(change: Partial<RawReading>, context: Partial<CheckContext> = {}): ReadingCheck {
  const found = checks(change, context);
  expect(found.map(({ message }) => message)).toHaveLength(1);
  return found[0] as ReadingCheck;
}

test('a good reading raises nothing', () => {
  expect(checks({})).toEqual([]);
  expect(mustRefuse(checks({}))).toBe(false);
});

test('an empty reading raises nothing', () => {
  const empty = Object.fromEntries(Object.keys(GOOD).map((key) => [key, null])) as unknown as RawReading;
  expect(readingChecks(empty, { ...HIGH_NOON, altitudeM: null, latitudeDeg: null, longitudeDeg: null })).toEqual([]);
});

describe('pressure of the wrong kind', () => {
  test('sea-level corrected value as station pressure, in the units of the team', () => {
    const us = only({ pressurePa: 101_600 });
    expect(us).toMatchObject({ field: 'pressurePa', level: 'unlikely' });
    expect(us.message).toBe(
      "That looks sea-level corrected: at 5,807 ft a station barometer reads about 24.2 inHg. Choose 'altimeter setting' or read the station value.",
    );
    const metric = only({ pressurePa: 101_600 }, { units: 'metric' });
    expect(metric.message).toContain('at 1,770 m a station barometer reads about 818 hPa');
  });

  test('the published cases of the wrong pressure are all caught', () => {
    for (const id of ['air.wrong_pressure.335m', 'air.wrong_pressure.1770m']) {
      const { inputs } = checkEntry('air_density', id);
      const altitudeM = inputs.elevation?.value;
      const found = only({ pressurePa: inputs.altimeter?.value * 100, altitudeM }, { altitudeM });
      expect(found.message, id).toContain('sea-level corrected');
    }
  });

  test.each([150, 200, 500, 1000, 1770])('a value within 3 hPa of 1013 hPa at %i m is caught', (altitudeM) => {
    for (const pressurePa of [101_030, 101_325, 101_620]) {
      expect(only({ pressurePa, altitudeM }, { altitudeM }).message).toContain('sea-level corrected');
    }
  });

  test('between the two kinds the likelier one decides, and a tie is left alone', () => {
    const at335 = { altitudeM: 335 };
    expect(only({ ...at335, pressurePa: 100_500 }, at335).message).toContain('sea-level corrected');
    expect(checks({ ...at335, pressurePa: 99_600 }, at335)).toEqual([]);
  });

  test.each([0, 10, 100])('at %i m the two kinds are too alike to tell: nothing is said', (altitudeM) => {
    expect(checks({ pressurePa: 101_325, altitudeM }, { altitudeM })).toEqual([]);
  });

  test('a real station pressure on an ordinary day is never questioned', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 2500, noNaN: true }),
        fc.double({ min: 99_800, max: 102_900, noNaN: true }),
        (altitudeM, altimeter) => {
          const pressurePa = stationPressurePa(altimeter, altitudeM);
          // Within 3 hPa of 1013.25 the rule above speaks, right or wrong: at 150-160 m a high-pressure day reads that.
          if (altitudeM >= 150 && Math.abs((pressurePa as number) - 101_325) <= 300) return;
          expect(checks({ pressurePa, altitudeM }, { altitudeM })).toEqual([]);
        },
      ),
    );
  });

  test('station pressure as altimeter setting', () => {
    const low = only({ pressureKind: 'altimeter', pressurePa: 97_400, altitudeM: 335 }, { altitudeM: 335 });
    expect(low).toMatchObject({ field: 'pressurePa', level: 'unlikely' });
    expect(low.message).toContain("Choose 'station pressure'");
    const high = only({ pressureKind: 'altimeter' });
    expect(high).toMatchObject({ field: 'pressurePa', level: 'impossible' });
    expect(high.message).toContain('looks like station pressure');
  });

  test('an ordinary altimeter setting is never questioned', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 2500, noNaN: true }),
        fc.double({ min: 99_700, max: 103_000, noNaN: true }),
        (altitudeM, pressurePa) => {
          expect(checks({ pressureKind: 'altimeter', pressurePa, altitudeM }, { altitudeM })).toEqual([]);
        },
      ),
    );
  });

  test('neither kind fits: the altitude is named', () => {
    expect(only({ pressurePa: 90_000 }).message).toContain('does not fit the track');
  });

  test('a pressure without its kind, or an altimeter setting without altitude, is refused', () => {
    expect(only({ pressureKind: null })).toMatchObject({ field: 'pressureKind', level: 'impossible' });
    const nowhere = only({ pressureKind: 'altimeter', pressurePa: 101_300, altitudeM: null }, { altitudeM: null });
    expect(nowhere).toMatchObject({ field: 'altitudeM', level: 'impossible' });
  });

  test("a reading without its own altitude is judged with the track's", () => {
    expect(only({ pressurePa: 101_600, altitudeM: null }).message).toContain('sea-level corrected');
  });
});

describe('numbers in another unit', () => {
  test('hPa typed as inHg', () => {
    const found = only({ pressurePa: inHgToPa(820) });
    expect(found).toMatchObject({ field: 'pressurePa', level: 'impossible' });
    expect(found.message).toBe('Station pressure 820 inHg is not possible. 820 looks like hPa: enter 24.21 inHg.');
  });

  test('kPa typed as inHg', () => {
    expect(only({ pressurePa: inHgToPa(82.1) }).message).toContain('82.1 looks like kPa: enter 24.24 inHg');
  });

  test('inHg typed as hPa', () => {
    const found = only({ pressurePa: 2422 }, { units: 'metric' });
    expect(found.level).toBe('impossible');
    expect(found.message).toContain('24.22 looks like inHg: enter 820.2 hPa');
  });

  test('a pressure that fits no unit names the range', () => {
    expect(only({ pressurePa: inHgToPa(5) }).message).toContain('Enter 17.72 inHg to 32.04 inHg.');
  });

  test('degC typed as degF', () => {
    const found = only({ airTempC: fromDisplay('airTemperature', 30, 'us') });
    expect(found).toMatchObject({ field: 'airTempC', level: 'unlikely' });
    expect(found.message).toContain('If the meter shows °C, enter 86.0 °F.');
  });

  test('degF typed as degC', () => {
    const found = only({ airTempC: 86 }, { units: 'metric' });
    expect(found).toMatchObject({ field: 'airTempC', level: 'impossible' });
    expect(found.message).toContain('If the meter shows °F, enter 30.0 °C.');
  });

  test('track temperature in degC typed as degF', () => {
    const found = only({ trackTempC: fromDisplay('trackTemperature', 48, 'us') });
    expect(found.field).toBe('trackTempC');
    expect(found.message).toContain('If the meter shows °C, enter 118.4 °F.');
  });

  test('a temperature far out names the range where no slip fits', () => {
    const found = only({ airTempC: 200 }, { units: 'metric' });
    expect(found.level).toBe('impossible');
    expect(found.message).toContain('Enter a value from -40.0 °C to 60.0 °C.');
  });

  test('meters typed as feet', () => {
    const found = checks({ altitudeM: fromDisplay('altitude', 1770, 'us') }).find(({ field }) => field === 'altitudeM');
    expect(found).toMatchObject({ level: 'unlikely' });
    expect(found?.message).toContain('If that is meters, enter 5,807 ft.');
  });

  test('feet typed as meters', () => {
    const found = checks({ altitudeM: 5807 }, { units: 'metric' }).find(({ field }) => field === 'altitudeM');
    expect(found).toMatchObject({ level: 'impossible' });
    expect(found?.message).toContain('If that is feet, enter 1,770 m.');
  });

  test('humidity as a fraction typed as percent', () => {
    const found = only({ relativeHumidity: 0.0045 });
    expect(found).toMatchObject({ field: 'relativeHumidity', level: 'unlikely' });
    expect(found.message).toContain('0.45 means 45 %');
  });

  test('percent sent as a fraction', () => {
    const found = only({ relativeHumidity: 45 });
    expect(found).toMatchObject({ field: 'relativeHumidity', level: 'impossible' });
    expect(found.message).toContain('If the meter shows 45.0 %, enter that.');
  });

  test('just above 100 % has no such hint', () => {
    expect(only({ relativeHumidity: 1.04 }).message).toBe('Humidity 104.0 % is not possible. Enter 0 to 100 %.');
  });
});

describe('pairs that cannot be', () => {
  const noRh = { relativeHumidity: null };

  test('dew point above the air temperature', () => {
    const found = only({ ...noRh, dewPointC: 33 });
    expect(found).toMatchObject({ field: 'dewPointC', level: 'impossible' });
    expect(found.message).toContain('above the air temperature (86.0 °F)');
    expect(checks({ ...noRh, dewPointC: 30 })).toEqual([expect.objectContaining({ level: 'unlikely' })]);
    expect(only({ ...noRh, airTempC: 20, trackTempC: 30, dewPointC: 20.01 }).level).toBe('impossible');
  });

  test('wet bulb above the dry bulb', () => {
    expect(only({ ...noRh, wetBulbC: 33 })).toMatchObject({ field: 'wetBulbC', level: 'impossible' });
  });

  test('wet bulb lower than bone-dry air could show', () => {
    const found = only({ ...noRh, wetBulbC: 3 });
    expect(found).toMatchObject({ field: 'wetBulbC', level: 'impossible' });
    expect(found.message).toContain('even bone-dry air would show');
  });

  test('a wick that is not wet', () => {
    expect(only({ ...noRh, wetBulbC: 30 }).message).toContain('Is the wick wet');
  });

  test('two humidities that disagree', () => {
    const found = only({ dewPointC: 22 });
    expect(found).toMatchObject({ field: 'dewPointC', level: 'unlikely' });
    expect(found.message).toContain('Relative humidity gives 40 %, dew point 62 %');
    expect(checks({ dewPointC: 14.94 })).toEqual([]);
  });

  test('a wet bulb or dew point that cannot be used', () => {
    expect(only({ ...noRh, wetBulbC: 20, pressurePa: null, pressureKind: null }).field).toBe('wetBulbC');
    expect(only({ ...noRh, dewPointC: 10, airTempC: null }).field).toBe('dewPointC');
  });

  test('what is refused as impossible gives no humidity either', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -10, max: 45, noNaN: true }),
        fc.double({ min: 0.01, max: 20, noNaN: true }),
        (t, up) => {
          const reading = { ...GOOD, ...noRh, airTempC: t, dewPointC: Math.min(40, t + up) };
          fc.pre((reading.dewPointC as number) > t);
          expect(mustRefuse(readingChecks(reading, HIGH_NOON))).toBe(true);
          expect(conditionsFromReading(reading).relativeHumidity).toBeNull();
        },
      ),
    );
  });
});

describe('track against air', () => {
  test('a cold track under a high sun', () => {
    const found = only({ trackTempC: 21 });
    expect(found).toMatchObject({ field: 'trackTempC', level: 'unlikely' });
    expect(found.message).toContain('below the air with the sun high');
  });

  test('the same track at night is fine', () => {
    expect(checks({ trackTempC: 21 }, { takenAt: NIGHT })).toEqual([]);
    expect(checks({ trackTempC: 21 }, { latitudeDeg: null })).toEqual([]);
    expect(only({ trackTempC: 14 }, { takenAt: NIGHT }).message).toContain('below the air.');
  });

  test('more than 40 degC above the air', () => {
    const found = only({ airTempC: 22, trackTempC: 64 });
    expect(found).toMatchObject({ field: 'trackTempC', level: 'unlikely' });
    expect(found.message).toContain('75.6 °F above the air');
  });

  test('a doubtful air temperature is named alone', () => {
    expect(only({ airTempC: -1, trackTempC: 48 }).field).toBe('airTempC');
  });
});

describe('jumps since the reading before', () => {
  const before = { ...GOOD, takenAt: '2026-06-13T18:10:00Z' };

  test('every value that jumped is named, with the time between', () => {
    const found = checks(
      {},
      { previous: { ...before, airTempC: 20, trackTempC: 24, relativeHumidity: 0.85, pressurePa: 82_900 } },
    );
    expect(found.map(({ field }) => field)).toEqual(['airTempC', 'trackTempC', 'relativeHumidity', 'pressurePa']);
    expect(found.every(({ level, message }) => level === 'unlikely' && message.includes('in 20 minutes'))).toBe(true);
    expect(found[0]?.message).toContain('rose 18.0 °F');
  });

  test('small changes, long gaps and no reading before raise nothing', () => {
    expect(checks({}, { previous: { ...before, airTempC: 27, pressurePa: 82_200 } })).toEqual([]);
    expect(checks({}, { previous: { ...before, airTempC: 15, takenAt: '2026-06-13T15:00:00Z' } })).toEqual([]);
    expect(checks({}, { previous: null })).toEqual([]);
  });

  test('a change of kind is no change of the air', () => {
    const altimeter = altimeterSettingPa(82_000, 1770);
    expect(checks({ pressurePa: altimeter, pressureKind: 'altimeter' }, { previous: before })).toEqual([]);
    expect(
      checks({}, { previous: { ...before, pressurePa: altimeter, pressureKind: 'altimeter', altitudeM: null } }),
    ).toEqual([]);
  });

  test('at a low track only the reading before betrays the wrong kind', () => {
    const low = { altitudeM: 100 };
    const pressurePa = isaPressurePa(100) as number;
    const previous = { ...before, ...low, pressurePa };
    const found = only({ ...low, pressurePa: altimeterSettingPa(pressurePa, 100) }, { ...low, previous });
    expect(found.message).toContain('It fits the last reading as altimeter setting');
  });

  test('a scale mixed up since then is named', () => {
    const found = checks({ airTempC: 13.9 }, { units: 'metric', previous: { ...before, airTempC: 38 } });
    expect(found.find(({ field }) => field === 'airTempC')?.message).toContain('fell 24.1 °C in 20 minutes');
    const mixed = checks(
      { airTempC: fromDisplay('airTemperature', 55, 'us'), trackTempC: null },
      { previous: { ...before, airTempC: 50 } },
    );
    expect(mixed.find(({ field }) => field === 'airTempC')?.message).toContain('If the meter shows °C, enter 131.0 °F');
  });
});

describe('the list', () => {
  test('impossible first, one line per field', () => {
    const found = checks(
      { airTempC: 61, trackTempC: 3, relativeHumidity: 2 },
      { previous: { ...GOOD, takenAt: '2026-06-13T18:10:00Z' } },
    );
    const levels = found.map(({ level }) => level);
    expect(levels).toEqual([...levels].sort());
    expect(new Set(found.map(({ field }) => field)).size).toBe(found.length);
    expect(mustRefuse(found)).toBe(true);
  });

  test('messages never show NaN, null or a raw float', () => {
    const value = fc.option(fc.double({ min: -200, max: 5e6, noNaN: true }), { nil: null });
    fc.assert(
      fc.property(
        value,
        value,
        value,
        value,
        value,
        fc.constantFrom('us' as const, 'metric' as const),
        (a, b, c, d, e, units) => {
          const reading = { ...GOOD, airTempC: a, relativeHumidity: b, dewPointC: c, wetBulbC: d, pressurePa: e };
          for (const { message } of readingChecks(reading, { ...HIGH_NOON, units })) {
            expect(message).not.toMatch(/NaN|null|undefined|Infinity|—|\d\.\d{5,}/);
            expect(message).toMatch(/[.?]$/);
          }
        },
      ),
    );
  });
});
