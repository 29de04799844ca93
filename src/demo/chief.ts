/** The invented crew chief: reacts to the last pass and to the weather, with a picture of the car that is only roughly right. */
import type { Random } from '@/evaluate/random';
import type { Adjustable, Settings } from '@/lib/domain/types';

export interface ChiefView {
  /** Slip as read on the last pass; null when it was not. */
  lastSlipPct: number | null;
  trackTempC: number;
  lastTrackTempC: number | null;
  densityKgM3: number;
  test: boolean;
}

type Move = readonly [key: string, steps: number];

const AIM_PCT = 15;
/** Slip points the chief thinks one step is worth: about right, never exactly. */
const THOUGHT = { counterweight_g: 1.1, release_delay_s: -0.5, launch_rpm: 0.3 } as const;
const POINTS_PER_TRACK_DEGREE = 0.07;
const BIG_CHANGE_PCT = 1.8;
const SMALL_CHANGE_PCT = 0.5;

export const START_SETTINGS: Settings = {
  counterweight_g: 11.5,
  base_pressure_lb: 240,
  release_delay_s: 0.52,
  launch_rpm: 7400,
  tire_pressure_psi: 6.8,
};

/** Settings the car arrives with at an event: last notes, thinner air given more clutch, hotter months less tire pressure. */
export function arrivalSettings(view: ChiefView, adjustables: readonly Adjustable[], random: Random): Settings {
  const thin = 1.15 - view.densityKgM3;
  const moves: Move[] = [
    ['counterweight_g', 9 * thin + random.normal(0, 0.7)],
    ['base_pressure_lb', 8 * thin + random.normal(0, 1.5)],
    ['release_delay_s', -6 * thin + random.normal(0, 1)],
    ['launch_rpm', 6 * thin + random.normal(0, 1.5)],
    ['tire_pressure_psi', (34 - view.trackTempC) / 12 + random.normal(0, 0.7)],
  ];
  return moved(START_SETTINGS, moves, adjustables);
}

/** Settings for the next pass. On test days something else is tried each time. */
export function nextSettings(
  current: Settings,
  view: ChiefView,
  adjustables: readonly Adjustable[],
  random: Random,
): Settings {
  const wanted = wantedChangePct(view) + random.normal(0, 0.8);
  const moves = view.test
    ? [...reaction(wanted / 2, random), experiment(adjustables, random)]
    : reaction(wanted, random);
  return moved(current, moves, adjustables);
}

function wantedChangePct({ lastSlipPct, trackTempC, lastTrackTempC }: ChiefView): number {
  const missed = lastSlipPct === null ? 0 : Math.max(-8, Math.min(8, lastSlipPct - AIM_PCT));
  const hotter = lastTrackTempC === null ? 0 : trackTempC - lastTrackTempC;
  return -0.6 * missed - POINTS_PER_TRACK_DEGREE * hotter;
}

function reaction(wantedPct: number, random: Random): Move[] {
  const size = Math.abs(wantedPct);
  if (size < SMALL_CHANGE_PCT) return [];
  if (size > BIG_CHANGE_PCT) {
    const weights = Math.round(wantedPct / 1.6 / THOUGHT.counterweight_g);
    const left = wantedPct - weights * THOUGHT.counterweight_g;
    return [
      ['counterweight_g', weights],
      ['release_delay_s', left / THOUGHT.release_delay_s],
    ];
  }
  const key = random.uniform(0, 1) < 0.6 ? 'release_delay_s' : 'launch_rpm';
  return [[key, wantedPct / THOUGHT[key]]];
}

function experiment(adjustables: readonly Adjustable[], random: Random): Move {
  const tried = adjustables[random.integer(0, adjustables.length - 1)];
  const steps = random.integer(1, 3) * (random.uniform(0, 1) < 0.5 ? -1 : 1);
  return [tried?.key ?? 'launch_rpm', steps];
}

function moved(from: Settings, moves: readonly Move[], adjustables: readonly Adjustable[]): Settings {
  const to: Record<string, number> = { ...from };
  for (const [key, steps] of moves) {
    const adjustable = adjustables.find((entry) => entry.key === key);
    if (adjustable) to[key] = onGrid((to[key] ?? adjustable.low) + Math.round(steps) * adjustable.step, adjustable);
  }
  return to;
}

function onGrid(value: number, { low, high, step }: Adjustable): number {
  const inside = Math.min(high, Math.max(low, value));
  return Number((low + Math.round((inside - low) / step) * step).toFixed(6));
}
