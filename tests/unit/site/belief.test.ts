import { describe, expect, it } from 'vitest';
import { beliefSentence, beliefText, tightBelief } from '@/components/site/belief';

const belief = (beliefMeanPct: number | null, beliefSdPct: number | null) => ({ beliefMeanPct, beliefSdPct });

describe('a belief in words', () => {
  it('gives the effect and its give or take', () => {
    expect(beliefText(belief(-1.2, 0.8))).toBe('\u22121.2 \u00b1 0.8 points');
    expect(beliefSentence(belief(-1.2, 0.8), '+0.5 g')).toBe(
      'One step up (+0.5 g) moves slip by about \u22121.2 points; about two times in three between \u22122 and \u22120.4.',
    );
  });

  it('says when it is left open', () => {
    expect(beliefText(belief(null, null))).toBe('left open');
    expect(beliefSentence(belief(null, null), '+0.5 g')).toContain('from your passes alone');
  });

  it('warns below 60 % of the effect, whatever its sign, and not at it', () => {
    expect(tightBelief(belief(-1, 0.59))).not.toBeNull();
    expect(tightBelief(belief(1, 0.59))).not.toBeNull();
    expect(tightBelief(belief(1, 0.6))).toBeNull();
    expect(tightBelief(belief(0, 0.1))).toBeNull();
    expect(tightBelief(belief(null, null))).toBeNull();
  });
});
