import { describe, expect, it } from 'vitest';
import { passKey, toPassRecord } from '@/lib/pass-csv';
import { fileWith, HEADER, onlyRow, parse, parseWith } from './sample';

const withAltimeter = (altitude: string) =>
  onlyRow(
    parse(
      fileWith(
        { station_pressure_inhg: '', altimeter_inhg: '29.92', altitude_ft: altitude },
        HEADER.replace('station_pressure_inhg', 'station_pressure_inhg,altimeter_inhg'),
      ),
    ),
  );

describe('toPassRecord', () => {
  it('carries what the model needs', () => {
    const row = onlyRow(parseWith({}));
    expect(toPassRecord(row)).toMatchObject({
      passNo: 1,
      event: 'Spring Open',
      track: 'Testing Flats',
      lane: 'left',
      slipPct: 15.4,
      slipSdPct: null,
      excluded: false,
      settings: row.settings,
      conditions: { airTempC: 25, relativeHumidity: 0.45, trackTempC: 40, stationPressurePa: row.pressurePa },
    });
  });

  it('converts an altimeter setting with the altitude of the row', () => {
    // 29.92 inHg is the standard atmosphere's; at 5000 ft it has 843.1 hPa (U.S. Standard Atmosphere 1976).
    const { conditions } = toPassRecord(withAltimeter('5000'));
    expect(conditions.stationPressurePa).toBeGreaterThan(84_200);
    expect(conditions.stationPressurePa).toBeLessThan(84_400);
  });

  it('leaves the pressure open when it has no altitude', () => {
    expect(toPassRecord(withAltimeter('')).conditions.stationPressurePa).toBeNull();
  });
});

describe('passKey', () => {
  const row = onlyRow(parseWith({}));

  it('is the same for the same pass read twice', () => {
    expect(passKey('car', onlyRow(parseWith({ date_time: '2026-03-14T20:05Z', track: 'TESTING flats' })))).toBe(
      passKey('car', row),
    );
  });

  it('differs with car, number, time and track', () => {
    const keys = [
      passKey('car', row),
      passKey('car 2', row),
      passKey('car', { ...row, passNo: 2 }),
      passKey('car', { ...row, time: '2026-03-14T20:06:00.000Z' }),
      passKey('car', { ...row, track: 'Other' }),
    ];
    expect(new Set(keys).size).toBe(keys.length);
  });
});
