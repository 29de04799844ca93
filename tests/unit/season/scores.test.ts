import { describe, expect, test } from 'vitest';
import {
  brierScore,
  crpsNormal,
  crpsSample,
  crpsStudentT,
  exactBinomialInterval,
  flatnessTest,
  intervalScore,
  pinballLoss,
  skillScore,
} from '@/lib/domain/season/scores';
import { normalCdf, normalPdf, studentTCdf } from '@/lib/domain/stats/special';
import { type Quantity, runCheckPlan, same } from '../../helpers/check-values';
import { integrate } from '../../helpers/integrate';

type Inputs = Record<string, Quantity>;
const num = (i: Inputs, name: string): number => i[name]!.value;

runCheckPlan({
  area: 'forecast_verification',
  formulas: {
    crps_normal: (i) => {
      const z = (num(i, 'y') - num(i, 'mu')) / num(i, 'sigma');
      return {
        crps: same(crpsNormal(num(i, 'y'), num(i, 'mu'), num(i, 'sigma'))),
        pit: same(normalCdf(z)),
        log_score: same(-Math.log(normalPdf(z) / num(i, 'sigma'))),
      };
    },
    crps_t: (i) => ({
      crps: same(crpsStudentT(num(i, 'y'), num(i, 'df'), num(i, 'mu'), num(i, 'scale'))),
      pit: same(studentTCdf((num(i, 'y') - num(i, 'mu')) / num(i, 'scale'), num(i, 'df'))),
    }),
    pinball: (i) => ({ loss: same(pinballLoss(num(i, 'y'), num(i, 'q'), num(i, 'alpha'))) }),
    interval_score: (i) => ({
      score: same(intervalScore(num(i, 'y'), num(i, 'lower'), num(i, 'upper'), num(i, 'coverage'))),
    }),
    crps_sample: (i) => ({
      crps_ecdf: same(crpsSample(num(i, 'y'), i.sample!.value)),
      crps_fair: same(crpsSample(num(i, 'y'), i.sample!.value, true)),
    }),
    brier: (i) => ({ brier: same(brierScore(i.outcome!.value, i.p!.value)) }),
    skill: (i) => ({ skill: same(skillScore(num(i, 'score'), num(i, 'reference'))) }),
    pit_chi2: (i) => {
      const { chiSquare, df, pValue } = flatnessTest(i.counts!.value);
      return { chi2: same(chiSquare), df: same(df), p_value: same(pValue) };
    },
    clopper_pearson: (i) => {
      const { low, high } = exactBinomialInterval(num(i, 'hits'), num(i, 'n'), num(i, 'level'));
      return { low: same(low), high: same(high) };
    },
  },
  skippedIds: {},
});

describe('CRPS against its definition', () => {
  test('the integral of the squared difference of distribution functions', () => {
    const y = 15.8;
    const [df, location, scale] = [6, 15, 1.3];
    const f = (x: number) => studentTCdf((x - location) / scale, df);
    const below = integrate((x) => f(x) ** 2, location - 80, y, 40_000);
    const above = integrate((x) => (1 - f(x)) ** 2, y, location + 80, 40_000);
    expect(crpsStudentT(y, df, location, scale)).toBeCloseTo(below + above, 6);
  });
});
