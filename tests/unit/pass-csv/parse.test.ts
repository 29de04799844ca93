import { describe, expect, it } from 'vitest';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { parsePassCsv } from '@/lib/pass-csv';
import { fileWith, HEADER, onlyRow, parse, parseWith, ROW_1 } from './sample';

describe('a file of the contract', () => {
  it('is read into SI, with settings in their own units', () => {
    const row = onlyRow(parse(`${HEADER}\n${ROW_1}\n`));
    expect(row).toMatchObject({
      rowNumber: 2,
      passNo: 1,
      event: 'Spring Open',
      track: 'Testing Flats',
      time: '2026-03-14T20:05:00.000Z',
      utcOffset: '-06:00',
      round: 'Q1',
      lane: 'left',
      airTempC: 25,
      relativeHumidity: 0.45,
      pressureKind: 'station',
      altitudeM: 304.8,
      trackTempC: 40,
      windMps: 2.2352,
      windDirDeg: 270,
      runsOnDiscs: 2,
      slipPct: 15.4,
      sixtyFtS: 0.842,
      outcome: 'clean',
      excluded: false,
      notes: 'calm',
    });
    expect(row.settings).toEqual({
      counterweight_g: 11.5,
      base_pressure_lb: 240,
      release_delay_s: 0.52,
      launch_rpm: 7400,
      tire_pressure_psi: 6.8,
    });
    // 28.86 inHg of 32 degF (NIST SP 811: 3386.389 Pa).
    expect(row.pressurePa).toBeCloseTo(28.86 * 3386.389, 6);
    expect(row.eighthMps).toBeCloseTo(285.5 * 0.44704, 8);
  });

  it('has no missing column, no unknown one and nothing to say', () => {
    const parsed = parse(`${HEADER}\n${ROW_1}\n`);
    expect(parsed).toMatchObject({ unknownColumns: [], missingColumns: [], notes: [], fileError: null });
  });

  it('takes blank for not measured, and a missing setting for not recorded', () => {
    const row = onlyRow(parseWith({ air_temp_f: '', slip_pct: ' ', lane: '', outcome: '', counterweight_g: '' }));
    expect(row).toMatchObject({ airTempC: null, slipPct: null, lane: null, outcome: null });
    expect(row.settings).not.toHaveProperty('counterweight_g');
  });

  it('keeps text as text and trims it', () => {
    expect(onlyRow(parseWith({ event: ' 007 ', round: '1' }))).toMatchObject({ event: '007', round: '1' });
  });

  it.each([
    ['\uFEFF', '\n'],
    ['', '\r\n'],
    ['', '\r'],
  ])('accepts a byte-order mark and every line end (%j, %j)', (mark, lineEnd) => {
    expect(onlyRow(parse(mark + [HEADER, ROW_1, ''].join(lineEnd))).rowNumber).toBe(2);
  });
});

describe('metric twins', () => {
  it('are read by suffix', () => {
    const header = HEADER.replace('air_temp_f', 'air_temp_c')
      .replace('track_temp_f', 'track_temp_c')
      .replace('station_pressure_inhg', 'station_pressure_kpa')
      .replace('altitude_ft', 'altitude_m')
      .replace('wind_mph', 'wind_kmh')
      .replace('eighth_mph', 'eighth_kmh')
      .replace('base_pressure_lb', 'base_pressure_kg')
      .replace('tire_pressure_psi', 'tire_pressure_kpa');
    const row = onlyRow(
      parse(
        fileWith(
          {
            air_temp_c: '25',
            track_temp_c: '40',
            station_pressure_kpa: '98.5',
            altitude_m: '300',
            wind_kmh: '36',
            eighth_kmh: '450',
            base_pressure_kg: '100',
            tire_pressure_kpa: '50',
          },
          header,
        ),
      ),
    );
    expect(row).toMatchObject({ airTempC: 25, trackTempC: 40, pressurePa: 98_500, altitudeM: 300, windMps: 10 });
    expect(row.eighthMps).toBe(125);
    expect(row.settings.base_pressure_lb).toBeCloseTo(100 / 0.45359237, 8);
    expect(row.settings.tire_pressure_psi).toBeCloseTo(50_000 / 6894.757, 8);
  });

  it('are refused beside their own column', () => {
    const { fileError } = parse(`${HEADER},air_temp_c\n${ROW_1},25\n`);
    expect(fileError).toContain('"air_temp_f" and "air_temp_c"');
  });

  it('give an adjustable kept in metric units from its US column', () => {
    const kept = [{ ...DEFAULT_ADJUSTABLES[1]!, key: 'base_pressure_kg', unit: 'kg' }];
    const row = onlyRow(parsePassCsv(fileWith({ base_pressure_lb: '220.462262' }), kept));
    expect(row.settings.base_pressure_kg).toBeCloseTo(100, 6);
  });
});

describe('humidity and pressure', () => {
  const with3 = `${HEADER},dew_point_f,wet_bulb_f,altimeter_inhg`;

  it('keeps the humidity that was read', () => {
    const row = onlyRow(parse(fileWith({ relative_humidity_pct: '', dew_point_f: '50' }, with3)));
    expect(row).toMatchObject({ relativeHumidity: null, dewPointC: 10, wetBulbC: null });
  });

  it('uses one of several humidities and says which', () => {
    const parsed = parse(fileWith({ dew_point_f: '50' }, with3));
    expect(onlyRow(parsed)).toMatchObject({ relativeHumidity: 0.45, dewPointC: null });
    expect(parsed.notes.join()).toContain('relative_humidity_pct was used');
  });

  it.each([
    ['dew_point_f', '80'],
    ['wet_bulb_f', '78'],
  ])('refuses a %s above the air temperature', (column, value) => {
    const { refused } = parse(fileWith({ relative_humidity_pct: '', [column]: value }, with3));
    expect(refused).toEqual([{ row: 2, column, reason: expect.stringContaining('above the air temperature') }]);
  });

  it('never takes an altimeter setting for station pressure', () => {
    const parsed = parse(fileWith({ station_pressure_inhg: '', altimeter_inhg: '29.92' }, with3));
    expect(onlyRow(parsed).pressureKind).toBe('altimeter');
    expect(parsed.notes.join()).toContain('converted to station pressure');
  });

  it('prefers the station pressure when both are given', () => {
    const parsed = parse(fileWith({ station_pressure_inhg: '28.9', altimeter_inhg: '29.95' }, with3));
    const row = onlyRow(parsed);
    expect(row.pressureKind).toBe('station');
    expect(row.pressurePa).toBeCloseTo(28.9 * 3386.389, 5);
    expect(parsed.notes.join()).toContain('altimeter setting was ignored');
  });

  it('questions a station pressure that looks sea-level corrected', () => {
    const parsed = parse(fileWith({ station_pressure_inhg: '29.92', altitude_ft: '5200' }));
    expect(parsed.notes.join()).toContain('looks sea-level corrected');
  });

  it('says when an altimeter setting cannot be converted', () => {
    const parsed = parse(fileWith({ station_pressure_inhg: '', altimeter_inhg: '29.92', altitude_ft: '' }, with3));
    expect(parsed.notes.join()).toContain('without an altitude');
  });
});

describe('refusals name row, column, reason and fix', () => {
  it.each([
    ['pass_no', '', 'blank'],
    ['pass_no', '1.5', 'whole number'],
    ['pass_no', '0', 'not possible'],
    ['event', '', 'blank'],
    ['track', ' ', 'blank'],
    ['date_time', '', 'blank'],
    ['date_time', '2026-03-14T14:05', 'no offset from UTC'],
    ['date_time', '3/14/2026 2:05 PM', 'Write it as 2026-05-03T14:05:00-06:00'],
    ['date_time', '2026-02-30T14:05:00-06:00', 'not a time that exists'],
    ['lane', 'middle', 'left, right'],
    ['outcome', 'great', 'clean, shake, smoke, aborted'],
    ['air_temp_f', '250', 'not possible'],
    ['air_temp_f', 'warm', 'not a number'],
    ['air_temp_f', 'NaN', 'not a number'],
    ['air_temp_f', '1e400', 'too large'],
    ['air_temp_f', '1e300', 'not possible'],
    ['air_temp_f', '77 F', 'not a number'],
    ['relative_humidity_pct', '145', 'must be 0 to 100 %'],
    ['station_pressure_inhg', '1013', 'name the column station_pressure_hpa'],
    ['slip_pct', 'Infinity', 'not a number'],
    ['sixty_ft_s', '-1', 'not possible'],
    ['eighth_s', '2.1', 'not after three_thirty_ft_s'],
    ['runs_on_discs', '2.5', 'whole number'],
    ['launch_rpm', '1e9', 'too large'],
    ['notes', 'x'.repeat(2001), '2001 characters'],
    ['notes', 'bell \u0007', 'cannot be shown'],
  ])('%s = %j', (column, value, reason) => {
    const { rows, refused } = parseWith({ [column]: value });
    expect(rows).toEqual([]);
    expect(refused).toEqual([{ row: 2, column, reason: expect.stringContaining(reason) }]);
  });

  it('gives one reason per column of a row, and keeps the good rows', () => {
    const bad = ROW_1.replace('77,45', 'hot,wet').replace(/^1,/, '2,');
    const { rows, refused } = parse([HEADER, ROW_1, bad, ROW_1.replace(/^1,/, '3,')].join('\n'));
    expect(rows.map(({ passNo, rowNumber }) => [passNo, rowNumber])).toEqual([
      [1, 2],
      [3, 4],
    ]);
    expect(refused.map(({ row, column }) => [row, column])).toEqual([
      [3, 'air_temp_f'],
      [3, 'relative_humidity_pct'],
    ]);
  });

  it('refuses the second of two equal passes', () => {
    const sameInstant = ROW_1.replace('2026-03-14T14:05:00-06:00', '2026-03-14T20:05Z');
    const { rows, refused } = parse([HEADER, ROW_1, sameInstant].join('\n'));
    expect(rows).toHaveLength(1);
    expect(refused).toEqual([{ row: 3, column: 'pass_no', reason: 'This is the same pass as row 2.' }]);
  });

  it('keeps a setting outside its limits as history and says so once', () => {
    const rows = [1, 2, 3, 4, 5, 6, 7].map((no) => ROW_1.replace(/^1,/, `${no},`).replace(',11.5,', ',15,'));
    const parsed = parse([HEADER, ...rows].join('\n'));
    expect(parsed.rows).toHaveLength(7);
    expect(parsed.notes).toEqual([
      'Rows 2, 3, 4, 5, 6 and 2 more: counterweight_g is outside its limits of 8 to 14; kept as history.',
    ]);
  });
});

describe('optional columns', () => {
  it('are read when they are there', () => {
    const header = `${HEADER},thousand_ft_s,quarter_s,quarter_mph,excluded,excluded_reason`;
    const row = onlyRow(
      parse(
        fileWith(
          { thousand_ft_s: '3.8', quarter_s: '4.5', excluded: 'Yes', excluded_reason: 'sensor fell off' },
          header,
        ),
      ),
    );
    expect(row).toMatchObject({ thousandFtS: 3.8, quarterS: 4.5, quarterMps: null, excluded: true });
    expect(row.excludedReason).toBe('sensor fell off');
  });

  it('lists missing and unknown columns', () => {
    const parsed = parsePassCsv(
      'pass_no,date_time,event,track,Fuel Mix,wing_angle_deg\n1,2026-03-14T14:05Z,E,T,5,3\n',
      DEFAULT_ADJUSTABLES.slice(0, 1),
    );
    expect(parsed.unknownColumns).toEqual(['Fuel Mix', 'wing_angle_deg']);
    expect(parsed.missingColumns).toContain('counterweight_g');
    expect(parsed.missingColumns).toContain('slip_pct');
    expect(parsed.missingColumns).not.toContain('dew_point_f');
    expect(parsed.rows).toHaveLength(1);
  });
});
