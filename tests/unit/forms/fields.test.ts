import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import {
  decimal,
  flag,
  localInputValue,
  optionalDecimal,
  parseDecimal,
  parseInstant,
  parsePatch,
  text,
  zonedInstant,
} from '@/lib/forms/fields';

describe('parseDecimal', () => {
  it.each([
    ['12', 12],
    [' 0,5 ', 0.5],
    ['.5', 0.5],
    ['5.', 5],
    ['-3', -3],
    ['\u22123', -3],
    ['+1.25', 1.25],
  ])('reads %j', (typed, value) => {
    expect(parseDecimal(typed)).toBe(value);
  });

  it.each([
    '',
    ' ',
    '1,234.5',
    '1.234,5',
    '12 psi',
    '1e3',
    'Infinity',
    'NaN',
    '0x10',
    '--1',
    '.',
    '1 000',
    '9'.repeat(40),
  ])('does not guess at %j', (typed) => {
    expect(parseDecimal(typed)).toBeNull();
  });

  it('reads back what is written, with point or comma', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1e9, max: 1e9 }), fc.integer({ min: 0, max: 6 }), (whole, places) => {
        const value = whole / 10 ** places;
        const written = value.toFixed(places);
        expect(parseDecimal(written)).toBeCloseTo(value, 9);
        expect(parseDecimal(written.replace('.', ','))).toBe(parseDecimal(written));
      }),
    );
  });
});

describe('numbers in a form', () => {
  const rule = { label: 'The step', unit: 'g', low: 0, high: 10, hint: 'Enter grams.' };
  const messageOf = (schema: z.ZodType, value: unknown) => schema.safeParse(value).error?.issues[0]?.message;

  it.each([
    [undefined, 'The step is missing. Enter a number.'],
    ['', 'The step is missing. Enter a number.'],
    ['a few', 'The step must be a plain number such as 12.5, with no unit or spaces.'],
    [11, 'The step must be between 0 and 10 g. Enter grams.'],
    [Number.NaN, 'The step is missing. Enter a number.'],
    [Number.POSITIVE_INFINITY, 'The step is missing. Enter a number.'],
  ])('%j: says %s', (value, message) => {
    expect(messageOf(decimal(rule), value)).toBe(message);
  });

  it('asks back where a comma may mean thousands, and only where both would be taken', () => {
    const rpm = { label: 'The setting', low: -1_000_000, high: 1_000_000 };
    const asked = 'The setting: is 7,550 meant as 7550 or as 7.55? Type it without the comma.';
    expect(messageOf(decimal(rpm), '7,550')).toBe(asked);
    expect(messageOf(decimal({ ...rpm, low: 5500 }), '7,550')).toBe(asked);
    const seconds = optionalDecimal({ label: 'The time', low: 0, high: 60 });
    expect(['3,816', '0,848', '12,5', '7.550'].map((typed) => seconds.parse(typed))).toEqual([
      3.816, 0.848, 12.5, 7.55,
    ]);
    expect(['7550', '7.550', '0,125', '7,55'].map((typed) => decimal(rpm).parse(typed))).toEqual([
      7550, 7.55, 0.125, 7.55,
    ]);
  });

  it.each([undefined, null, '', '  '])('takes %j for "not given"', (value) => {
    expect(optionalDecimal(rule).parse(value)).toBeNull();
  });

  it('never stores a number outside its range', () => {
    fc.assert(
      fc.property(fc.oneof(fc.double(), fc.string(), fc.integer().map(String)), (value) => {
        const { success, data } = decimal(rule).safeParse(value);
        expect(!success || (data >= 0 && data <= 10)).toBe(true);
      }),
    );
  });
});

describe('times', () => {
  it.each([
    ['2026-05-03T14:05-06:00', '2026-05-03T20:05:00.000Z'],
    ['2026-05-03 14:05:06Z', '2026-05-03T14:05:06.000Z'],
    ['2026-05-03T14:05:06.123+0530', '2026-05-03T08:35:06.123Z'],
  ])('reads %s', (typed, utc) => {
    expect(parseInstant(typed)).toBe(utc);
  });

  it.each(['2026-05-03T14:05', '2026-05-03', '2026-02-30T14:05Z', '1026-05-03T14:05Z', '2026-05-03T25:05Z', 'noon'])(
    'refuses %s',
    (typed) => {
      expect(parseInstant(typed)).toBeNull();
    },
  );

  it("reads the wall clock in the track's zone, summer and winter, and back", () => {
    expect(zonedInstant('2026-07-01T12:00', 'America/Denver')).toBe('2026-07-01T18:00:00.000Z');
    expect(zonedInstant('2026-01-01T12:00', 'America/Denver')).toBe('2026-01-01T19:00:00.000Z');
    expect(localInputValue('2026-07-01T18:00:00.000Z', 'America/Denver')).toBe('2026-07-01T12:00');
    expect(zonedInstant('2026-07-01T12:00Z', 'America/Denver')).toBeNull();
  });
});

describe('text and flags', () => {
  it('trims, joins white space, and refuses what cannot be shown', () => {
    expect(text('The name', 10).parse(' a \n b ')).toBe('a b');
    expect(text('The name', 3).safeParse('abcd').error?.issues[0]?.message).toContain('3 characters');
    expect(text('The name', 10).safeParse('a\u0000b').success).toBe(false);
  });

  it.each([
    [true, true],
    ['on', true],
    ['true', true],
    ['false', false],
    ['', false],
  ])('takes %j for %s', (value, meaning) => {
    expect(flag('Say yes or no.').parse(value)).toBe(meaning);
  });
});

describe('parsePatch', () => {
  const shape = { name: text('The name', 10), size: optionalDecimal({ label: 'Size', low: 0, high: 9 }) };

  it('returns what was sent and nothing else', () => {
    expect(parsePatch(shape, { size: '' })).toEqual({ size: null });
    expect(parsePatch(shape, { name: 'x', role: 'owner', toString: 'x' })).toEqual({ name: 'x' });
    expect(parsePatch(shape, JSON.parse('{"name":"x","__proto__":{"size":3}}'))).toEqual({ name: 'x' });
  });

  it('refuses a body without any known field, and one that is no object', () => {
    expect(() => parsePatch(shape, { role: 'owner' })).toThrow(/Nothing to change: send name, size/);
    for (const body of [null, 'name', 3, undefined]) expect(() => parsePatch(shape, body)).toThrow(z.ZodError);
  });
});
