import type { Adjustable, EffectBelief } from './types';

export { AdjustablesError, adjustablesToJson, parseAdjustables } from './adjustables-json';

/** Where the defaults below come from; shown beside them until the team changes them. */
export const DEFAULT_BELIEF_BASIS = "invented defaults: a starting belief, the team's to change";

/** Belief of one step up, in slip points. More clamp or launch rpm: more slip; a later release: less. */
const belief = (meanPct: number, sdPct: number): EffectBelief => ({ meanPct, sdPct });

/**
 * Five adjustables of an invented car. Steps, limits, minutes and beliefs are invented (see DEFAULT_BELIEF_BASIS); the sd of
 * each belief is 60-100 % of its mean so that the team's own passes soon outweigh it.
 */
export const DEFAULT_ADJUSTABLES: Adjustable[] = [
  {
    key: 'counterweight_g',
    label: 'Counterweight',
    unit: 'g',
    step: 0.5,
    low: 8,
    high: 14,
    minutes: 12,
    group: 'clutch',
    movable: true,
    belief: belief(0.9, 0.7),
  },
  {
    key: 'base_pressure_lb',
    label: 'Base pressure',
    unit: 'lb',
    step: 5,
    low: 100,
    high: 400,
    minutes: 10,
    group: 'clutch',
    movable: true,
    belief: belief(0.4, 0.35),
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
    movable: true,
    belief: belief(-0.5, 0.4),
  },
  {
    key: 'launch_rpm',
    label: 'Launch rpm',
    unit: 'rpm',
    step: 50,
    low: 5500,
    high: 9000,
    minutes: 1,
    group: 'launch',
    movable: true,
    belief: belief(0.35, 0.3),
  },
  {
    key: 'tire_pressure_psi',
    label: 'Tire pressure',
    unit: 'psi',
    step: 0.2,
    low: 4,
    high: 10,
    minutes: 3,
    group: 'launch',
    movable: true,
    belief: belief(0.3, 0.3),
  },
];
