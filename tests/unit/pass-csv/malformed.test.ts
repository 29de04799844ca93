import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OUTCOMES } from '@/lib/domain/types';
import { decodePassCsv, type ParsedPassFile } from '@/lib/pass-csv';
import { fileWith, HEADER, parse, ROW_1 } from './sample';

/** Whatever came in, what came out is a file error alone, or rows that are sound and refusals that say where and why. */
function expectSound(parsed: ParsedPassFile): void {
  if (parsed.fileError !== null) expect(parsed.rows).toEqual([]);
  for (const { row, reason } of parsed.refused) {
    expect(row).toBeGreaterThan(0);
    expect(reason.length).toBeGreaterThan(10);
    // What is quoted is what was in the file.
    expect(reason.replace(/".*"/s, '')).not.toMatch(/undefined|NaN|\[object/);
  }
  for (const row of parsed.rows) {
    expect(Number.isInteger(row.passNo)).toBe(true);
    expect(new Date(row.time).toISOString()).toBe(row.time);
    expect(row.event !== '' && row.track !== '').toBe(true);
    expect([null, ...OUTCOMES]).toContain(row.outcome);
    for (const value of [row.airTempC, row.pressurePa, row.slipPct, ...Object.values(row.settings)]) {
      expect(value === null || Number.isFinite(value)).toBe(true);
    }
  }
}

const piece = fc.constantFrom(
  ...['"', '""', ',', ';', '\t', '\n', '\r\n', '\0', '\uFEFF', '=', '-', '1.234', '1,234', '1e999', 'NaN', '__proto__'],
  ...[
    '2026-13-45T99:99Z',
    '2026-03-14T14:05Z',
    'pass_no',
    'track',
    'left',
    HEADER,
    ROW_1,
    'x'.repeat(6000),
    '\ud800',
    '°F',
  ],
);

describe('malformed input', () => {
  it('made of random pieces', () => {
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 30 }), (pieces) => expectSound(parse(pieces.join('')))),
      { numRuns: 1500 },
    );
  });

  it('made by damaging a good file', () => {
    const good = fileWith() + ROW_1.replace(/^1,/, '2,');
    const damage = fc.record({
      at: fc.nat(good.length),
      cut: fc.nat(40),
      insert: fc.oneof(piece, fc.string({ maxLength: 5 })),
    });
    fc.assert(
      fc.property(fc.array(damage, { minLength: 1, maxLength: 4 }), (cuts) => {
        let text = good;
        for (const { at, cut, insert } of cuts) text = text.slice(0, at) + insert + text.slice(at + cut);
        expectSound(parse(text));
      }),
      { numRuns: 1500 },
    );
  });

  it('with any text in any cell', () => {
    const names = HEADER.split(',');
    const cell = fc.oneof(piece, fc.string({ maxLength: 12 }), fc.double().map(String));
    fc.assert(
      fc.property(fc.constantFrom(...names), cell, (name, value) => {
        expectSound(parse(fileWith({ [name]: `"${value.replaceAll('"', '""')}"` })));
      }),
      { numRuns: 1500 },
    );
  });

  it('of random bytes', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), (bytes) => {
        const decoded = decodePassCsv(bytes);
        if (decoded.text !== null) expectSound(parse(decoded.text));
      }),
      { numRuns: 1000 },
    );
  });
});
