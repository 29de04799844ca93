import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  formatAbout,
  formatNumber,
  formatPercent,
  formatQuantity,
  formatValue,
  fromDisplay,
  NO_VALUE,
  QUANTITIES,
  type Quantity,
  toDisplay,
  toInputText,
  UNIT_SYSTEMS,
  unitLabel,
  unitView,
} from '@/lib/domain/display';

const quantities = Object.keys(QUANTITIES) as Quantity[];
const views = quantities.flatMap((quantity) => UNIT_SYSTEMS.map((units) => [quantity, units] as const));

test('every quantity has both systems, a unit and sensible decimals', () => {
  expect(quantities.length).toBeGreaterThanOrEqual(9);
  for (const [quantity, units] of views) {
    const { unit, decimals } = unitView(quantity, units);
    expect(unit).not.toBe('');
    expect(Number.isInteger(decimals) && decimals >= 0 && decimals <= 4).toBe(true);
    expect(unitLabel(quantity, units)).toBe(unit);
  }
});

test.each(views)('%s in %s: what is typed comes back', (quantity, units) => {
  const { decimals } = unitView(quantity, units);
  const typed = fc.integer({ min: -99_999, max: 999_999 }).map((n) => n / 10 ** Math.min(decimals + 1, 4));
  fc.assert(
    fc.property(typed, (value) => {
      const si = fromDisplay(quantity, value, units);
      expect(Math.abs(toDisplay(quantity, si, units) - value)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(value)));
      expect(Number(toInputText(quantity, si, units))).toBeCloseTo(value, 8);
    }),
  );
});

test.each(views)('%s in %s: more stays more', (quantity, units) => {
  fc.assert(
    fc.property(
      fc.double({ min: -50, max: 1e5, noNaN: true }),
      (si) => toDisplay(quantity, si + 1, units) > toDisplay(quantity, si, units),
    ),
  );
});

describe('known pairs (NIST SP 811 factors)', () => {
  test.each([
    ['airTemperature', 30, '86.0 °F', '30.0 °C'],
    ['temperatureDifference', 10, '18.0 °F', '10.0 °C'],
    ['pressure', 101_325, '29.92 inHg', '1,013.3 hPa'],
    ['altitude', 1770, '5,807 ft', '1,770 m'],
    ['windSpeed', 4.4704, '10 mph', '16 km/h'],
    ['density', 1.225, '0.0765 lb/ft³', '1.225 kg/m³'],
    ['grains', 0.012, '84.0 gr/lb', '12.0 g/kg'],
    ['speed', 147.5232, '330.00 mph', '531.08 km/h'],
    ['length', 304.8, '1,000.0 ft', '304.80 m'],
    ['rollout', 2.872672, '113.1 in', '2.873 m'],
  ] as const)('%s', (quantity, si, us, metric) => {
    expect(formatQuantity(quantity, si, 'us')).toBe(us);
    expect(formatQuantity(quantity, si, 'metric')).toBe(metric);
  });
});

describe('formatting', () => {
  test.each([
    [1234567.891, 1, '1,234,567.9'],
    [-1234.5, 0, '-1,235'],
    [-123, 0, '-123'],
    [999.999, 2, '1,000.00'],
    [-0.0004, 2, '0.00'],
    [0, 0, '0'],
  ])('%f with %i decimals is %s', (value, decimals, text) => expect(formatNumber(value, decimals)).toBe(text));

  test('no number is a dash, an empty field and never NaN', () => {
    for (const nothing of [null, undefined, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(formatQuantity('pressure', nothing, 'us')).toBe(NO_VALUE);
      expect(formatValue('pressure', nothing, 'us')).toBe(NO_VALUE);
      expect(formatPercent(nothing)).toContain(NO_VALUE);
      expect(toInputText('pressure', nothing, 'us')).toBe('');
    }
  });

  test('percent and typical values', () => {
    expect(formatPercent(0.456)).toBe('46 %');
    expect(formatPercent(0.456, 1)).toBe('45.6 %');
    expect(formatAbout('pressure', 81_834, 'us')).toBe('24.2 inHg');
    expect(formatAbout('pressure', 81_834, 'metric')).toBe('818 hPa');
  });

  test('a form field carries no grouping', () => expect(toInputText('altitude', 1770, 'us')).toBe('5807.09'));
});
