import { expect, test } from 'vitest';
import { sixtyFtText } from '@/components/suggestion/sixty-ft';
import { suggestFor } from '@/lib/domain/model';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { contextOf, season } from '../../helpers/seasons';

test('the 60-ft time is said with its range, and not at all when there is none', () => {
  expect(sixtyFtText({ medianS: 0.8619, low80S: 0.848, high80S: 0.8761 })).toBe(
    '60 ft about 0.862 s, 8 times in 10 between 0.848 and 0.876 s.',
  );
  expect(sixtyFtText(null)).toBeNull();
  expect(sixtyFtText(undefined)).toBeNull();
});

test('a suggestion carries a 60-ft time for the car as it stands and for every offer, when passes recorded one', () => {
  const s = season('nonlinear', 2);
  const passes = s.passes.slice(0, 60).map((p) => ({ ...p, sixtyFtS: 0.85 + 0.001 * Math.abs(p.slipPct! - 15) }));
  const input = {
    adjustables: s.adjustables,
    band: DEFAULT_BAND,
    context: contextOf(s, 60),
    current: s.passes[59]!.settings,
    minutesLeft: null,
  };
  const timed = suggestFor({ ...input, passes });
  const outlooks = [timed.noChangeSixtyFt, ...timed.offers.map((o) => o.sixtyFt)];
  expect(outlooks.length).toBeGreaterThan(1);
  for (const o of outlooks) {
    expect(o!.low80S).toBeLessThan(o!.medianS);
    expect(o!.medianS).toBeLessThan(o!.high80S);
    expect(o!.medianS).toBeGreaterThan(0.8);
    expect(o!.medianS).toBeLessThan(0.9);
  }
  expect(suggestFor({ ...input, passes: s.passes.slice(0, 60) }).noChangeSixtyFt).toBeNull();
});
