import { describe, expect, it } from 'vitest';
import { againSentence, readingLines } from '@/components/suggestion/reading-errors';
import type { ReadingSensitivity, Sensitivity } from '@/lib/domain/model/sensitivity';
import { fDeltaToC, fToC } from '@/lib/domain/units';

const track: ReadingSensitivity = {
  reading: 'trackTempC',
  label: 'track temperature',
  value: fToC(98),
  error: fDeltaToC(5),
  lower: { medianPct: 0.62, pInBand: -0.08 },
  higher: { medianPct: -0.44, pInBand: 0.05 },
  spreadPct: 0.53,
};
const humidity: ReadingSensitivity = {
  reading: 'relativeHumidity',
  label: 'humidity',
  value: 0.24,
  error: 0.03,
  lower: { medianPct: 0.01, pInBand: 0 },
  higher: { medianPct: -0.01, pInBand: 0 },
  spreadPct: 0.01,
};
const all = (...readings: ReadingSensitivity[]): Sensitivity => ({
  medianPct: 16,
  pInBand: 0.6,
  readings,
  totalPct: 0.5,
  totalPInBand: 0.06,
  shareOfVariance: 0.04,
});

describe('readingLines', () => {
  it('gives each reading with its error, and what it would do to the middle and the odds', () => {
    expect(readingLines(all(track, humidity), 'us')).toEqual([
      {
        name: 'Track temperature',
        values: '98.0 °F, give or take 5.0 °F',
        lower: { points: '+0.6', odds: '52 %' },
        higher: { points: '−0.4', odds: '65 %' },
      },
      {
        name: 'Humidity',
        values: '24 %, give or take 3 %',
        lower: { points: '0.0', odds: '60 %' },
        higher: { points: '0.0', odds: '60 %' },
      },
    ]);
  });

  it('is in the units of the team', () => {
    expect(readingLines(all(track), 'metric')[0]!.values).toBe('36.7 °C, give or take 2.8 °C');
  });
});

describe('againSentence', () => {
  it('names the reading that matters most', () => {
    expect(againSentence(all(track, humidity))).toBe(
      'If you take one reading again, take the track temperature: its usual error moves the middle by 0.5 points and puts the odds of the band anywhere from 52 % to 65 %.',
    );
  });

  it('says when none is worth the walk, and when none was taken', () => {
    expect(againSentence(all(humidity))).toMatch(/^None of them is worth taking again/);
    expect(againSentence(all())).toMatch(/^No reading was taken/);
  });
});
