import { describe, expect, it } from 'vitest';
import { CURVE_FRAME, curvePicture, ticksBetween } from '@/components/site/effect-curves';
import { effectCell, effectSentences, effectText } from '@/components/site/effects';
import type { BeliefView } from '@/lib/domain/model/belief-view';

const density = (mean: number, sd: number) => (at: number) => Math.exp(-0.5 * ((at - mean) / sd) ** 2) / sd;
const curve = Array.from({ length: 81 }, (_, i) => {
  const effectPct = -1.34 + (i * 4.48) / 80;
  return { effectPct, belief: density(0.9, 0.7)(effectPct), now: density(0.91, 0.1)(effectPct), passes: null };
});
const view = (over: Partial<BeliefView> = {}): BeliefView => ({
  key: 'counterweight_g',
  label: 'Counterweight',
  given: true,
  inModel: true,
  belief: { meanPct: 0.9, sdPct: 0.7, pRaises: 0.9 },
  now: { meanPct: 0.91, sdPct: 0.1, pRaises: 0.9999 },
  passes: { meanPct: 0.91, sdPct: 0.1, pRaises: 0.9999 },
  shareOnBelief: 0.02,
  disagreement: 0.01,
  curve,
  ...over,
});

describe('effectSentences', () => {
  it('says the belief, what it is now and what rests on the belief', () => {
    expect(effectSentences(view(), 126)).toEqual([
      'You believed +0.90 ± 0.70 points a step; with your 126 passes it is +0.91 ± 0.10; 2 % rests on the belief.',
      'That one step up raises slip: 90 % then, over 99 % now.',
    ]);
  });

  it('says when the passes say little, or too few record the setting', () => {
    expect(effectSentences(view({ passes: null, disagreement: null }), 9)[0]).toMatch(/9 passes hardly say anything/);
    expect(effectSentences(view({ inModel: false }), 9)).toEqual([
      'You believed +0.90 ± 0.70 points a step; too few of your 9 passes record this setting, so that is all there is.',
    ]);
    expect(effectCell(view({ inModel: false }))).toEqual(['too few', 'record it']);
  });

  it("does not call an open belief the reader's own, and points at one the passes contradict", () => {
    const open = view({ given: false, belief: { meanPct: 0, sdPct: 0.5, pRaises: 0.5 } });
    expect(effectSentences(open, 30)[0]).toMatch(/^The belief was left open, so 0.00 ± 0.50 points a step stood in;/);
    const apart = view({ disagreement: -2.4, passes: { meanPct: -1.1, sdPct: 0.2, pRaises: 0 } });
    expect(effectSentences(apart, 30).at(-1)).toMatch(/^The passes alone say −1.10 ± 0.20, far from the belief/);
  });
});

describe('effectText', () => {
  it('shows the sign of what is shown', () => {
    expect([0.914, -0.5, -0.001].map((meanPct) => effectText({ meanPct, sdPct: 0.1 }))).toEqual([
      '+0.91 ± 0.10',
      '−0.50 ± 0.10',
      '0.00 ± 0.10',
    ]);
  });
});

describe('curvePicture', () => {
  const numbers = (path: string): number[] => path.match(/-?[\d.]+/g)!.map(Number);

  it('keeps curves and labels inside the frame, zero and the peak where they belong', () => {
    const picture = curvePicture(view());
    for (const path of [picture.beliefPath, picture.nowPath]) {
      const ys = numbers(path).filter((_, i) => i % 2 === 1);
      expect(Math.max(...ys)).toBeLessThanOrEqual(CURVE_FRAME.base);
      expect(Math.min(...ys)).toBeGreaterThanOrEqual(CURVE_FRAME.top - 3);
    }
    expect(picture.zeroX).toBeCloseTo(8 + (1.34 / 4.48) * 344, 0);
    expect(picture.nowLabel.x).toBeCloseTo(8 + (2.25 / 4.48) * 344, 0);
    expect(curvePicture(view({ curve: curve.filter((p) => p.effectPct > 0.2) })).zeroX).toBeNull();
  });

  it.each([
    [-1.34, 3.14, [-1, 0, 1, 2, 3]],
    [-0.66, 1.26, [-0.5, 0, 0.5, 1]],
    [0.21, 0.59, [0.3, 0.4, 0.5]],
  ])('ticks between %f and %f', (low, high, ticks) => {
    expect(ticksBetween(low, high)).toEqual(ticks);
  });
});
