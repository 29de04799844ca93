import { toInputText, type UnitSystem } from '@/lib/domain/display';
import { kmhToMps, mphToMps } from '@/lib/domain/units';
import type { AdjustableView, CarView } from '@/lib/server/cars';

export const DISTANCES = [
  { value: '660', label: '660 ft (eighth mile)' },
  { value: '1000', label: '1,000 ft' },
  { value: '1320', label: '1,320 ft (quarter mile)' },
] as const;

/** Names of the length inputs in the team's units: the verbs take either twin and store SI. */
export const LENGTH_FIELDS = {
  us: { rollout: 'rolloutIn', front: 'frontRolloutIn', growth: 'rolloutGrowthPctAt100Mph', growthUnit: '% at 100 mph' },
  metric: {
    rollout: 'rolloutM',
    front: 'frontRolloutM',
    growth: 'rolloutGrowthPctAt100Kmh',
    growthUnit: '% at 100 km/h',
  },
} as const satisfies Record<UnitSystem, Record<string, string>>;

/** A stored car as its form shows it. */
export function carValues(car: CarView, units: UnitSystem): Record<string, unknown> {
  const fields = LENGTH_FIELDS[units];
  const { name, carClass, distanceFt, finalDriveRatio, pulsesPerTurn, bandLowPct, bandHighPct, sensorNote } = car;
  return {
    ...{ name, carClass, distanceFt, finalDriveRatio, pulsesPerTurn, bandLowPct, bandHighPct, sensorNote },
    slipWindowStartS: car.slipWindowStartS,
    slipWindowEndS: car.slipWindowEndS,
    [fields.rollout]: toInputText('rollout', car.rolloutM, units),
    [fields.front]: toInputText('rollout', car.frontRolloutM, units),
    [fields.growth]: growthPct(car.rolloutGrowthPerMps, units),
  };
}

function growthPct(perMps: number | null, units: UnitSystem): string {
  if (perMps === null) return '';
  const speedMps = units === 'us' ? mphToMps(100) : kmhToMps(100);
  return String(Number((perMps * speedMps * 100).toFixed(3)));
}

/** A stored adjustable as its form shows it. */
export function adjustableValues(adjustable: AdjustableView): Record<string, unknown> {
  const { key, label, unit, step, low, high, minutes, group, movable, beliefMeanPct, beliefSdPct } = adjustable;
  return { key, label, unit, step, low, high, minutes, group, movable, beliefMeanPct, beliefSdPct };
}
