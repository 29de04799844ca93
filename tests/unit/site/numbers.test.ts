import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { counted, plain, signed, span, withUnit } from '@/components/site/numbers';

describe('numbers on screen', () => {
  it.each([
    [1250, '1,250'],
    [0.05, '0.05'],
    [-3.5, '\u22123.5'],
    [1234567.25, '1,234,567.25'],
    [0, '0'],
    [-0, '0'],
    [0.00001, '0'],
    [1e-7, '0'],
    [0.1 + 0.2, '0.3'],
  ])('%d is written %s', (value, text) => {
    expect(plain(value)).toBe(text);
  });

  it('reads back as the number it was, to four decimals', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), (value) => {
        const back = Number(plain(value).replaceAll(',', '').replace('\u2212', '-'));
        expect(Math.abs(back - value)).toBeLessThanOrEqual(0.00005 + 1e-9);
      }),
    );
  });

  it('always shows the sign of a change, and none for no change', () => {
    expect([signed(0.5), signed(-0.5), signed(0)]).toEqual(['+0.5', '\u22120.5', '0']);
  });

  it('puts the unit once, and never a dash between limits', () => {
    expect(span(8, 14, 'g')).toBe('8 to 14 g');
    expect(span(-2, 3, '')).toBe('\u22122 to 3');
    expect(withUnit(0.5, '')).toBe('0.5');
  });

  it('counts one as one', () => {
    expect([counted(1, 'round'), counted(0, 'round'), counted(1200, 'pass', 'passes')]).toEqual([
      '1 round',
      '0 rounds',
      '1,200 passes',
    ]);
  });
});
