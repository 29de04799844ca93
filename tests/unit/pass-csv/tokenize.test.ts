import { parse as oracle } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Delimiter, tokenize } from '@/lib/pass-csv/tokenize';

const cell = fc.string({
  unit: fc.constantFrom('a', '1', '.', ',', ';', '\t', '"', '\n', '\r\n', '\r', ' ', 'é'),
  maxLength: 8,
});
const table = fc.array(fc.array(cell, { minLength: 1, maxLength: 5 }), { maxLength: 8 });
const delimiter = fc.constantFrom<Delimiter>(',', ';', '\t');
const quote = (text: string) => `"${text.replaceAll('"', '""')}"`;

describe('well-formed CSV', () => {
  it('is split as an independent reader splits it', () => {
    fc.assert(
      fc.property(table, delimiter, fc.constantFrom('\n', '\r\n', '\r'), (rows, sign, lineEnd) => {
        const text = rows.map((cells) => cells.map(quote).join(sign)).join(lineEnd);
        const expected = (
          oracle(text, { delimiter: sign, relax_column_count: true, record_delimiter: lineEnd }) as string[][]
        )
          .map((cells) => cells.map((value) => value.trim()))
          .filter((cells) => cells.some((value) => value !== ''));
        const got = tokenize(text, sign, 1000);
        expect(got.every(({ fault }) => fault === null)).toBe(true);
        expect(got.map(({ cells }) => cells)).toEqual(expected);
      }),
      { numRuns: 1000 },
    );
  });

  it('gives the line each record begins on', () => {
    fc.assert(
      fc.property(fc.array(fc.constantFrom('x', 'x\ny', '', 'x\r\ny\r\nz'), { maxLength: 12 }), (cells) => {
        const starts: number[] = [];
        let line = 1;
        for (const value of cells) {
          if (value !== '') starts.push(line);
          line += value.split('\n').length;
        }
        expect(tokenize(cells.map(quote).join('\n'), ',', 1000).map((row) => row.line)).toEqual(starts);
      }),
    );
  });
});

describe('broken CSV', () => {
  it('never throws, and always comes to an end', () => {
    const noise = fc.string({ unit: fc.constantFrom('"', '""', ',', '\n', '\r', 'a', ' '), maxLength: 60 });
    fc.assert(
      fc.property(noise, (text) => {
        const rows = tokenize(text, ',', 1000);
        for (const row of rows) expect(row.line).toBeLessThanOrEqual(text.split(/\r\n?|\n/).length);
      }),
      { numRuns: 2000 },
    );
  });
});
