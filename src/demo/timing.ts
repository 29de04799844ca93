import type { Random } from '@/evaluate/random';
import { mphToMps } from '@/lib/domain/units';
import { toNineDecimals } from '@/lib/pass-csv/numbers';
import type { Mishap } from './truth';

export interface Times {
  sixtyFtS: number | null;
  threeThirtyFtS: number | null;
  eighthS: number | null;
  eighthMps: number | null;
  thousandFtS: number | null;
}

const BEST_SLIP_PCT = 15;
const thousandths = (seconds: number): number => Number(seconds.toFixed(3));

/** Timing-slip numbers that go with a slip: slower to 60 ft the farther from the band, much slower after a mishap. */
export function timesOf(slipPct: number, densityKgM3: number, mishap: Mishap, random: Random): Times {
  const thin = 1 + 0.22 * (1.15 - densityKgM3);
  const off = slipPct - BEST_SLIP_PCT;
  const lost = Math.min(0.25, 0.0005 * off ** 2 * (off < 0 ? 1.3 : 1));
  const sixty = 0.846 * thin + lost + random.normal(0, 0.005);
  const pedaled = mishap === 'none' ? 0 : random.uniform(0.12, 0.7);
  const threeThirty = sixty + 1.272 * thin + 0.4 * lost + 0.6 * pedaled + random.normal(0, 0.008);
  const eighth = threeThirty + 0.938 * thin + 0.2 * lost + 0.4 * pedaled + random.normal(0, 0.008);
  const mph = (284 - 70 * pedaled - 40 * lost) / thin + random.normal(0, 1.2);
  return {
    sixtyFtS: thousandths(sixty),
    threeThirtyFtS: thousandths(threeThirty),
    eighthS: thousandths(eighth),
    eighthMps: toNineDecimals(mphToMps(Number(mph.toFixed(2)))),
    thousandFtS: thousandths(eighth + 0.762 * thin + 0.25 * pedaled + random.normal(0, 0.008)),
  };
}

/** The driver lifted: at most the first time is on the slip. */
export function abortedTimes(times: Times, random: Random): Times {
  const sixtyFtS = random.uniform(0, 1) < 0.6 ? times.sixtyFtS : null;
  return { sixtyFtS, threeThirtyFtS: null, eighthS: null, eighthMps: null, thousandFtS: null };
}
