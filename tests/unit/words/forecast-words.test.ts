import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Forecast } from '@/lib/domain/types';
import {
  bandText,
  dotplotText,
  intervalName,
  intervalsOf,
  intervalText,
  oddsSentence,
  ZONES,
  zoneLabel,
  zoneOdds,
  zoneOf,
} from '@/lib/domain/words';

const BAND = { lowPct: 13, highPct: 17 };

const forecast = (over: Partial<Forecast> = {}): Forecast => ({
  meanPct: 15.4,
  sdPct: 1.9,
  quantiles: { '0.025': 11.6, '0.1': 12.93, '0.25': 14.04, '0.5': 15.22, '0.75': 16.6, '0.9': 18, '0.975': 20.1 },
  dots: [11, 12, 12.9, 13, 13.4, 13.8, 14, 14.2, 14.5, 14.9, 15.2, 15.4, 15.8, 16.2, 17, 17.1, 17.5, 18, 18.6, 20],
  pBelow: 0.12,
  pInBand: 0.68,
  pAbove: 0.2,
  ...over,
});

describe('zones', () => {
  test('the edges belong to the band', () => {
    expect([12.99, 13, 17, 17.01].map((slip) => zoneOf(slip, BAND))).toEqual(['below', 'band', 'band', 'above']);
  });

  test('are named with the numbers of the team', () => {
    expect(ZONES.map((zone) => zoneLabel(zone, { lowPct: 12.5, highPct: 17 }))).toEqual([
      'Below 12.5 %',
      'In the band, 12.5 to 17 %',
      'Above 17 %',
    ]);
    expect(bandText(BAND)).toBe('13 to 17 %');
  });

  test('take their own probability', () => {
    expect(ZONES.map((zone) => zoneOdds(forecast(), zone))).toEqual([0.12, 0.68, 0.2]);
  });
});

describe('oddsSentence', () => {
  test('says the band first, then which way a miss goes', () => {
    expect(oddsSentence(forecast(), BAND)).toBe(
      'In the band of 13 to 17 %: likely, about 7 in 10 (68 %). A miss is more often over it (20 %) than under it (12 %).',
    );
    expect(oddsSentence(forecast({ pBelow: 0.3, pInBand: 0.6, pAbove: 0.1 }), BAND)).toContain(
      'more often under it (30 %) than over it (10 %)',
    );
  });

  test('calls misses even when they nearly are', () => {
    expect(oddsSentence(forecast({ pBelow: 0.16, pInBand: 0.68, pAbove: 0.16 }), BAND)).toContain(
      'as good as even: under it 16 %, over it 16 %',
    );
  });
});

describe('intervals', () => {
  test('are the 50, 80 and 95 % ones, each inside the next', () => {
    const intervals = intervalsOf(forecast());
    expect(intervals.map((one) => one.share)).toEqual([0.5, 0.8, 0.95]);
    expect(intervals.map(intervalText)).toEqual(['14.0 to 16.6 %', '12.9 to 18.0 %', '11.6 to 20.1 %']);
    expect(intervals.map(intervalName)).toEqual(['Half the time', '8 times in 10', '19 times in 20']);
  });

  test('refuse a forecast without its quantiles', () => {
    expect(() => intervalsOf(forecast({ quantiles: { '0.5': 15 } }))).toThrow(/no quantile 0.25/);
  });
});

describe('dotplotText', () => {
  test('counts the dots and names the middle', () => {
    expect(dotplotText(forecast(), BAND)).toBe(
      '20 equally likely outcomes: 3 below 13 %, 12 in the band, 5 above 17 %; middle 15.2 %.',
    );
  });

  test('leaves no dot out', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 1, max: 60, noNaN: true }), { minLength: 20, maxLength: 20 }), (dots) => {
        const text = dotplotText(forecast({ dots }), BAND);
        const counts = [...text.matchAll(/(\d+) (?:below|in the|above)/g)].map((match) => Number(match[1]));
        return counts.length === 3 && counts.reduce((sum, n) => sum + n, 0) === 20;
      }),
    );
  });
});
