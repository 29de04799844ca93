import type { SettingSpec } from '@/components/suggestion/settings';
import type { Forecast, Suggestion } from '@/lib/domain/types';

export const BAND = { lowPct: 13, highPct: 17 };

export const SPECS: readonly SettingSpec[] = [
  {
    key: 'counterweight_g',
    label: 'Counterweight',
    unit: 'g',
    step: 0.5,
    low: 8,
    high: 14,
    minutes: 12,
    group: 'clutch',
  },
  {
    key: 'release_delay_s',
    label: 'Release delay',
    unit: 's',
    step: 0.02,
    low: 0,
    high: 1.2,
    minutes: 2,
    group: 'clutch',
  },
  { key: 'launch_rpm', label: 'Launch rpm', unit: 'rpm', step: 50, low: 5500, high: 9000, minutes: 1, group: 'launch' },
];

export const CURRENT = { counterweight_g: 11, release_delay_s: 0.46, launch_rpm: 7450 };

/** A forecast whose dots are evenly spread between two slips; the odds are counted from the dots. */
export function spread(lowPct: number, highPct: number): Forecast {
  const at = (p: number): number => lowPct + (highPct - lowPct) * p;
  const dots = Array.from({ length: 20 }, (_, i) => at((i + 0.5) / 20));
  const share = (test: (dot: number) => boolean): number => dots.filter(test).length / dots.length;
  const ends = ['0.025', '0.1', '0.25', '0.5', '0.75', '0.9', '0.975'];
  return {
    meanPct: at(0.5),
    sdPct: (highPct - lowPct) / Math.sqrt(12),
    quantiles: Object.fromEntries(ends.map((p) => [p, at(Number(p))])),
    dots,
    pBelow: share((dot) => dot < BAND.lowPct),
    pInBand: share((dot) => dot >= BAND.lowPct && dot <= BAND.highPct),
    pAbove: share((dot) => dot > BAND.highPct),
  };
}

export function suggestion(over: Partial<Suggestion> = {}): Suggestion {
  const noChange = spread(12, 24);
  const changes = [{ key: 'counterweight_g', from: 11, to: 11.5, steps: 1, minutes: 12 }];
  return {
    status: 'offered',
    noChange,
    noChangeSixtyFt: null,
    offers: [
      {
        settings: { ...CURRENT, counterweight_g: 11.5 },
        changes,
        minutes: 12,
        forecast: spread(12, 18),
        sixtyFt: null,
      },
      { settings: CURRENT, changes: [], minutes: 0, forecast: noChange, sixtyFt: null },
    ],
    band: BAND,
    passesUsed: 126,
    passesNeeded: 8,
    reasons: [],
    warnings: [],
    outsideVariables: [],
    discounted: [],
    nearest: [],
    effects: [],
    breakdown: null,
    sensitivity: null,
    modelVersion: 'traction-1',
    ...over,
  };
}
