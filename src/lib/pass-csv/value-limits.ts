import { HARD_LIMITS, type Limit } from '@/lib/domain/air/limits';
import { mphToMps } from '@/lib/domain/units';
import type { NumberField } from './columns';

const seconds = (low: number, high: number): Limit => ({ low, high });
const speeds: Limit = { low: mphToMps(1), high: mphToMps(450) };

/**
 * Outside these a row is refused: nothing measured on a strip lies there. Stored unit (SI, slip in percent). Times reach far up because an
 * aborted car coasts; the air limits are those of a reading; the rest is judgment (common practice, no published source).
 */
export const VALUE_LIMITS = {
  ...HARD_LIMITS,
  passNo: { low: 1, high: 1_000_000 },
  runsOnDiscs: { low: 0, high: 1000 },
  slipPct: { low: -50, high: 300 },
  sixtyFtS: seconds(0.5, 20),
  threeThirtyFtS: seconds(1, 60),
  eighthS: seconds(2, 120),
  eighthMps: speeds,
  thousandFtS: seconds(2.5, 150),
  quarterS: seconds(3, 180),
  quarterMps: speeds,
} as const satisfies Record<NumberField, Limit> & Record<string, Limit>;

/** Longest texts, characters: what the forms of the same names take. */
export const TEXT_LIMITS = { event: 80, track: 80, round: 40, excluded_reason: 300, notes: 2000 } as const;
