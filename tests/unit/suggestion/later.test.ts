import { describe, expect, it } from 'vitest';
import { laterTitle, oddsThenText, trackThenText } from '@/components/suggestion/later';
import type { TrackTempForecast } from '@/lib/domain/model/track-temperature';
import { fDeltaToC, fToC } from '@/lib/domain/units';
import { spread } from './fixture';

const then = { meanC: fToC(96), sdC: fDeltaToC(5) } as TrackTempForecast;

describe('a later run in words', () => {
  it('names which way the track goes, by the degrees shown', () => {
    expect(laterTitle(fToC(101), fToC(96), 'us')).toBe('If the track cools until the run');
    expect(laterTitle(fToC(90), fToC(96), 'us')).toBe('If the track warms until the run');
    expect(laterTitle(fToC(96.3), fToC(95.8), 'us')).toBe('If the run is as late as planned');
  });

  it('gives the range with the middle', () => {
    expect(trackThenText(then, 'us')).toBe('96 °F, 8 times in 10 between 90 °F and 102 °F');
    expect(trackThenText(then, 'metric')).toBe('36 °C, 8 times in 10 between 32 °C and 39 °C');
  });

  it('sets the odds then beside the odds as read', () => {
    expect(oddsThenText(spread(12, 22), spread(12, 18))).toBe(
      'As the car stands, slip in the band is then about as likely as not, about 4 in 10 (40 %), against 70 % as read. Middle 17.0 %, 8 times in 10 between 13.0 and 21.0 %.',
    );
  });
});
