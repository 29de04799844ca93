import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { LANES, OUTCOMES } from '@/lib/domain/types';
import { type ExportLayout, exportPassCsv, type PassCsvData, type PassCsvRow, parsePassCsv } from '@/lib/pass-csv';
import { toNineDecimals } from '@/lib/pass-csv/numbers';
import { manyLines, oneLine } from '@/lib/pass-csv/text-cells';
import { VALUE_LIMITS } from '@/lib/pass-csv/value-limits';
import { onlyRow, parseWith } from './sample';

type Field = keyof typeof VALUE_LIMITS;
const INSIDE = 1e-6;
const real = (low: number, high: number) =>
  fc.double({ min: low + INSIDE, max: high - INSIDE, noNaN: true }).map(toNineDecimals);
const number = (field: Field) => real(VALUE_LIMITS[field].low, VALUE_LIMITS[field].high);
const whole = (field: Field) => fc.integer({ min: VALUE_LIMITS[field].low, max: VALUE_LIMITS[field].high });
const maybe = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null });

// What a spreadsheet would run, split or quote comes up often.
const risky = fc.constantFrom(
  '=',
  '+',
  '-',
  '@',
  "'",
  '"',
  ',',
  ';',
  '\t',
  '\n',
  '\r',
  ' ',
  '007',
  'é',
  '\u2028',
  '名',
  'Q1',
);
const text = (length: number) =>
  fc.string({ unit: fc.oneof(risky, fc.string({ unit: 'grapheme', maxLength: 2 })), maxLength: length });
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are refused on import
const shown = (value: string) => value.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/g, '');
const line = (length: number) => text(length).map((value) => oneLine(shown(value)).slice(0, length).trim());
const needed = line(20).filter((value) => value !== '');

const offset = fc.oneof(
  fc.constant('Z'),
  fc
    .tuple(fc.constantFrom('+', '-'), fc.integer({ min: 0, max: 13 }), fc.constantFrom('00', '15', '30', '45'))
    .map(([sign, hours, minutes]) => `${sign}${String(hours).padStart(2, '0')}:${minutes}`),
);
const instant = fc
  .date({ min: new Date('1991-01-01T00:00:00Z'), max: new Date('2099-12-30T00:00:00Z'), noInvalidDate: true })
  .map((date) => date.toISOString());

const humidity = fc.oneof(
  fc.record({
    relativeHumidity: maybe(number('relativeHumidity')),
    dewPointC: fc.constant(null),
    wetBulbC: fc.constant(null),
  }),
  fc.record({ relativeHumidity: fc.constant(null), dewPointC: real(-59, -41), wetBulbC: fc.constant(null) }),
  fc.record({ relativeHumidity: fc.constant(null), dewPointC: fc.constant(null), wetBulbC: fc.constant(-40) }),
);
const pressure = fc.oneof(
  fc.constant({ pressurePa: null, pressureKind: null }),
  fc.record({ pressurePa: number('stationPressurePa'), pressureKind: fc.constant('station' as const) }),
  fc.record({ pressurePa: number('altimeterPa'), pressureKind: fc.constant('altimeter' as const) }),
);
const settings = fc
  .tuple(
    ...DEFAULT_ADJUSTABLES.map(({ key, low, high }) =>
      maybe(real(low - 1, high + 1)).map((value) => [key, value] as const),
    ),
  )
  .map((pairs) => Object.fromEntries(pairs.filter(([, value]) => value !== null)) as Record<string, number>);
/** Increasing times, each with a chance to be blank. */
const times = fc
  .tuple(maybe(real(0.6, 0.99)), maybe(real(1.5, 1.99)), maybe(real(2.6, 3)), maybe(real(3.3, 4)), maybe(real(4.1, 9)))
  .map(([sixtyFtS, threeThirtyFtS, eighthS, thousandFtS, quarterS]) => ({
    sixtyFtS,
    threeThirtyFtS,
    eighthS,
    thousandFtS,
    quarterS,
  }));
const rest = fc.record({
  event: needed,
  track: needed,
  time: instant,
  utcOffset: offset,
  round: line(10),
  lane: maybe(fc.constantFrom(...LANES)),
  airTempC: maybe(number('airTempC')),
  altitudeM: maybe(number('altitudeM')),
  trackTempC: maybe(number('trackTempC')),
  windMps: maybe(number('windMps')),
  windDirDeg: maybe(number('windDirDeg')),
  runsOnDiscs: maybe(whole('runsOnDiscs')),
  slipPct: maybe(number('slipPct')),
  eighthMps: maybe(number('eighthMps')),
  quarterMps: maybe(number('quarterMps')),
  outcome: maybe(fc.constantFrom(...OUTCOMES)),
  excluded: fc.boolean(),
  excludedReason: line(30),
  notes: text(30).map((value) => manyLines(shown(value))),
});
const data: fc.Arbitrary<Omit<PassCsvData, 'passNo'>> = fc
  .tuple(rest, humidity, pressure, times, settings)
  .map(([a, b, c, d, values]) => ({ ...a, ...b, ...c, ...d, settings: values }));
const passes = fc
  .array(data, { minLength: 1, maxLength: 6 })
  .map((rows): PassCsvData[] => rows.map((row, index) => ({ ...row, passNo: index + 1 })));

const LAYOUTS: ExportLayout[] = [
  { delimiter: ',', decimal: '.' },
  { delimiter: ';', decimal: '.' },
  { delimiter: '\t', decimal: '.' },
  { delimiter: ';', decimal: ',' },
  { delimiter: '\t', decimal: ',' },
];
const withoutRowNumber = ({ rowNumber: _, ...row }: PassCsvRow): PassCsvData => row;

describe('what is exported', () => {
  it.each(LAYOUTS.flatMap((layout) => (['us', 'metric'] as const).map((units) => ({ ...layout, units }))))(
    'is read back the same ($delimiter $decimal $units)',
    ({ units, ...layout }) => {
      fc.assert(
        fc.property(passes, (rows) => {
          const file = exportPassCsv(rows, DEFAULT_ADJUSTABLES, units, layout as ExportLayout);
          const parsed = parsePassCsv(file, DEFAULT_ADJUSTABLES);
          expect({ refused: parsed.refused, fileError: parsed.fileError }).toEqual({ refused: [], fileError: null });
          expect(parsed.rows.map(withoutRowNumber)).toEqual(rows);
          expect(parsed.unknownColumns).toEqual([]);
          expect(parsed.missingColumns).toEqual([]);
        }),
        { numRuns: 250 },
      );
    },
  );

  it('is the same file again after an import', () => {
    fc.assert(
      fc.property(passes, fc.constantFrom('us' as const, 'metric' as const), (rows, units) => {
        const once = exportPassCsv(rows, DEFAULT_ADJUSTABLES, units);
        expect(exportPassCsv(parsePassCsv(once, DEFAULT_ADJUSTABLES).rows, DEFAULT_ADJUSTABLES, units)).toBe(once);
      }),
      { numRuns: 100 },
    );
  });

  it('writes what a person wrote, not its echo in other units', () => {
    const [header, row] = exportPassCsv([onlyRow(parseWith({ air_temp_f: '72.6' }))], DEFAULT_ADJUSTABLES, 'us').split(
      '\r\n',
    );
    const cells = row!.split(',');
    expect(cells[header!.split(',').indexOf('air_temp_f')]).toBe('72.6');
    expect(cells[header!.split(',').indexOf('station_pressure_inhg')]).toBe('28.86');
    expect(cells[header!.split(',').indexOf('date_time')]).toBe('2026-03-14T14:05:00-06:00');
  });
});

describe('formula guard', () => {
  const exported = (changes: Partial<PassCsvData>) =>
    exportPassCsv([{ ...onlyRow(parseWith({})), ...changes }], DEFAULT_ADJUSTABLES, 'us');

  it.each(['=1+1', '+1', '-2', '@sum', "'=1", '=HYPERLINK("x")'])('prefixes %j', (notes) => {
    const file = exported({ notes, event: notes });
    expect(file).not.toMatch(/(^|,|\n)"?[=+@]/);
    expect(file).toContain(`'${notes.replaceAll('"', '""')}`);
    expect(onlyRow(parsePassCsv(file, DEFAULT_ADJUSTABLES))).toMatchObject({ notes, event: notes });
  });

  it('leaves numbers numbers', () => {
    expect(exported({ slipPct: -5, airTempC: -10 })).toMatch(/,-5,/);
  });
});
