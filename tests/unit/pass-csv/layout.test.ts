import { describe, expect, it } from 'vitest';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { decodePassCsv, PASS_CSV_LIMITS, parsePassCsv } from '@/lib/pass-csv';
import { fileWith, HEADER, onlyRow, parse, ROW_1 } from './sample';

const MINIMAL = 'pass_no,date_time,event,track';
const pass = (no: number) => `${no},2026-03-14T14:05Z,E,T`;

describe('delimiters and decimal signs', () => {
  it.each([
    [';', 'semicolon'],
    ['\t', 'tab'],
  ])('detects %j', (delimiter, name) => {
    const parsed = parse(`${HEADER}\n${ROW_1}\n`.replaceAll(',', delimiter));
    expect(onlyRow(parsed).airTempC).toBe(25);
    expect(parsed.notes).toEqual([`The cells are divided by a ${name}.`]);
  });

  it('reads decimal commas and says so', () => {
    const parsed = parse(fileWith().replaceAll(',', ';').replaceAll('.', ','));
    expect(onlyRow(parsed)).toMatchObject({ slipPct: 15.4, sixtyFtS: 0.842 });
    expect(parsed.notes.join()).toContain('comma is the decimal sign');
  });

  it('takes 7.400 for 7400 beside decimal commas, and says how it was read', () => {
    const text = fileWith({ launch_rpm: '7#400' }).replaceAll(',', ';').replaceAll('.', ',').replace('#', '.');
    const parsed = parse(text);
    expect(onlyRow(parsed).settings.launch_rpm).toBe(7400);
    expect(parsed.notes.join()).toContain('launch_rpm "7.400" was read as 7400');
  });

  it('refuses a clear decimal point beside decimal commas', () => {
    const text = fileWith({ slip_pct: '15#4' }).replaceAll(',', ';').replaceAll('.', ',').replace('#', '.');
    expect(parse(text).refused).toMatchObject([
      { column: 'slip_pct', reason: expect.stringContaining('decimal point') },
    ]);
  });

  it('takes 1.234 for a decimal when no comma is about', () => {
    const text = `${MINIMAL};sixty_ft_s\n${pass(1)};1.234\n`.replaceAll(',', ';');
    expect(onlyRow(parse(text)).sixtyFtS).toBe(1.234);
  });

  it.each([
    ['"7,400"', 'two ways'],
    ['"15,4"', 'decimal comma'],
  ])('refuses %s in a file divided by commas', (cell, reason) => {
    const { refused } = parse(fileWith({ launch_rpm: cell }));
    expect(refused).toEqual([{ row: 2, column: 'launch_rpm', reason: expect.stringContaining(reason) }]);
  });
});

describe('header row', () => {
  it('is found below a preamble, whose lines count in row numbers', () => {
    const parsed = parse(`sep=,\nLog of the car, season 2026\n\n${HEADER}\n${ROW_1}\n`);
    expect(onlyRow(parsed).rowNumber).toBe(5);
    expect(parsed.notes).toEqual(['The header row is line 4; the lines above it were skipped.']);
  });

  it('may be in any case, with spaces', () => {
    expect(onlyRow(parse('Pass No,Date Time,EVENT,Track\n1,2026-03-14T14:05Z,E,T')).passNo).toBe(1);
  });

  it('refuses a repeated name, known or not', () => {
    expect(parse(`${MINIMAL},track\n${pass(1)},T`).fileError).toContain('"track"');
    expect(parse(`${MINIMAL},mood,Mood\n${pass(1)},a,b`).fileError).toContain('"mood"');
  });

  it('takes __proto__ and constructor for unknown columns like others', () => {
    const parsed = parse(`__proto__,constructor,${MINIMAL}\nx,y,${pass(1)}`);
    expect(parsed.unknownColumns).toEqual(['__proto__', 'constructor']);
    expect(onlyRow(parsed).settings).toEqual({});
  });

  it('names the required columns that are missing', () => {
    expect(parse('pass_no,slip_pct\n1,15\n').fileError).toContain('date_time, event, track');
  });

  it('refuses an adjustable named like a pass column', () => {
    const adjustables = [{ ...DEFAULT_ADJUSTABLES[0]!, key: 'slip_pct' }];
    expect(parsePassCsv(`${MINIMAL}\n${pass(1)}`, adjustables).fileError).toContain('"slip_pct"');
  });
});

describe('units row', () => {
  it('is skipped and said', () => {
    const units = fileWith(Object.fromEntries(HEADER.split(',').map((name) => [name, ''])))
      .split('\n')[1]!
      .split(',');
    units[6] = '(°F)';
    units[7] = '%';
    const parsed = parse([HEADER, units.join(','), ROW_1].join('\n'));
    expect(onlyRow(parsed).rowNumber).toBe(3);
    expect(parsed.notes).toEqual(['Line 2 names units and was skipped.']);
  });

  it('that contradicts a column name stops the import', () => {
    const parsed = parse(`${MINIMAL},air_temp_f\n,,,,°C\n${pass(1)},25`);
    expect(parsed.fileError).toContain('air_temp_f');
    expect(parsed.fileError).toContain('_c');
  });

  it('is not seen in a bad first pass', () => {
    const parsed = parse(`${MINIMAL},air_temp_f\nx,2026-03-14T14:05Z,E,T,F\n${pass(2)},70`);
    expect(parsed.refused.map(({ column }) => column)).toEqual(['pass_no', 'air_temp_f']);
    expect(parsed.rows).toHaveLength(1);
  });
});

describe('rows of another width', () => {
  it('refuses a row with more cells than the header', () => {
    const { refused } = parse(`${MINIMAL}\n${pass(1)},extra`);
    expect(refused).toEqual([{ row: 2, column: null, reason: expect.stringContaining('5 cells and the header 4') }]);
  });

  it('accepts blank cells too many and blank lines', () => {
    expect(parse(`${MINIMAL}\n\n${pass(1)},,,\n,,,\n\n`).rows).toHaveLength(1);
  });

  it('refuses a row that may be cut off, but not for want of notes', () => {
    const cut = ROW_1.slice(0, ROW_1.indexOf(',0.842') + 3);
    expect(parse(`${HEADER}\n${cut}`).refused).toMatchObject([{ row: 2, column: null }]);
    expect(parse(`${HEADER}\n${ROW_1.replace(/,calm$/, '')}`).rows).toHaveLength(1);
  });
});

describe('quotation marks', () => {
  it('hold delimiters, line ends and quotes; row numbers stay line numbers', () => {
    const parsed = parse(`${MINIMAL},notes\n${pass(1)},"a, ""b""\r\nc"\n${pass(2)},d\n`);
    expect(parsed.rows.map(({ notes, rowNumber }) => [notes, rowNumber])).toEqual([
      ['a, "b"\nc', 2],
      ['d', 4],
    ]);
  });

  it('left open cost one row, not the file', () => {
    const parsed = parse(`${MINIMAL},notes\n${pass(1)},"open\n${pass(2)},fine\n${pass(3)},"a"b\n${pass(4)},5" wheel\n`);
    expect(parsed.rows.map(({ passNo }) => passNo)).toEqual([2, 4]);
    expect(parsed.rows[1]!.notes).toBe('5" wheel');
    expect(parsed.refused.map(({ row, column }) => [row, column])).toEqual([
      [2, null],
      [4, null],
    ]);
  });
});

describe('whole-file refusals', () => {
  it.each([
    ['', 'empty'],
    ['\uFEFF \n\n', 'empty'],
    ['hello world', 'No header row'],
    ['a,b,c\n1,2,3\n', 'No header row'],
    [`${HEADER}\n`, 'no pass below'],
    [`${HEADER}\n,,,\n`, 'no pass below'],
    ['pass_no\0,track', 'not a text file'],
  ])('%j', (text, reason) => {
    const parsed = parse(text);
    expect(parsed.fileError).toContain(reason);
    expect(parsed).toMatchObject({ rows: [], refused: [] });
  });

  it('holds the limits', () => {
    const wide = `${MINIMAL},${Array.from({ length: 197 }, (_, i) => `x${i}`).join(',')}`;
    expect(parse(`${wide}\n${pass(1)}`).fileError).toContain('201 columns');
    const long = Array.from({ length: PASS_CSV_LIMITS.rows + 1 }, (_, i) => pass(i + 1)).join('\n');
    expect(parse(`${MINIMAL}\n${long}`).fileError).toContain('more than 50000 rows');
    expect(parse('x'.repeat(PASS_CSV_LIMITS.bytes + 1)).fileError).toContain('larger than 20 MB');
    const cell = 'x'.repeat(PASS_CSV_LIMITS.cellLength + 1);
    expect(parse(`${MINIMAL},notes\n${pass(1)},${cell}\n${pass(2)},"${cell}${cell}"`).refused).toMatchObject([
      { row: 2, reason: expect.stringContaining('longer than 5000') },
      { row: 3, reason: expect.stringContaining('longer than 5000') },
    ]);
  });

  it('reads a file with exactly the most rows', () => {
    const rows = Array.from({ length: PASS_CSV_LIMITS.rows }, (_, i) => pass(i + 1)).join('\n');
    expect(parse(`${MINIMAL}\n${rows}`).rows).toHaveLength(PASS_CSV_LIMITS.rows);
  });
});

describe('bytes', () => {
  const PNG = Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0x00, 0x00, 0x00, 0x0d, 0x49]);

  it.each([
    ['a renamed picture', PNG, 'not a text file'],
    ['binary without NUL', PNG.filter((byte) => byte !== 0), 'not a text file'],
    ['UTF-16', Uint8Array.from([0xff, 0xfe, 0x70, 0x00]), 'not UTF-8'],
    ['Latin-1', Uint8Array.from([0x70, 0xe9, 0x2c]), 'not UTF-8'],
    ['too much', new Uint8Array(PASS_CSV_LIMITS.bytes + 1), 'larger than 20 MB'],
  ])('refuses %s', (_, bytes, reason) => {
    expect(decodePassCsv(bytes).fileError).toContain(reason);
  });

  it('accepts UTF-8', () => {
    expect(decodePassCsv(new TextEncoder().encode('événement'))).toEqual({ text: 'événement', fileError: null });
  });
});
