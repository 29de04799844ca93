import type { BeliefView, CurvePoint } from '@/lib/domain/model/belief-view';

/** Where everything of the drawing stands, in units of its view box. */
export interface CurvePicture {
  beliefPath: string;
  nowPath: string;
  ticks: { x: number; effectPct: number }[];
  zeroX: number | null;
  beliefLabel: Label;
  nowLabel: Label;
}

export interface Label {
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
}

export const CURVE_FRAME = { width: 360, height: 220, left: 8, right: 352, top: 34, base: 176 } as const;
const { left, right, top, base } = CURVE_FRAME;

interface Scale {
  x(effectPct: number): number;
  y(density: number): number;
  low: number;
  high: number;
}

/** Both curves on one scale: the same area under each, so a sure one is tall and narrow. */
export function curvePicture({ curve, belief, now }: Pick<BeliefView, 'curve' | 'belief' | 'now'>): CurvePicture {
  const scale = scaleOf(curve);
  const { x, low, high } = scale;
  return {
    beliefPath: pathOf(curve, (p) => p.belief, scale),
    nowPath: pathOf(curve, (p) => p.now, scale),
    ticks: ticksBetween(low, high).map((effectPct) => ({ effectPct, x: x(effectPct) })),
    zeroX: low < 0 && high > 0 ? x(0) : null,
    beliefLabel: shoulderLabel(belief.meanPct, belief.sdPct, now.meanPct, curve, scale),
    nowLabel: peakLabel(x(now.meanPct)),
  };
}

function scaleOf(curve: readonly CurvePoint[]): Scale {
  const [low, high] = [curve[0]!.effectPct, curve.at(-1)!.effectPct];
  const tallest = Math.max(...curve.flatMap((p) => [p.belief, p.now]));
  return {
    low,
    high,
    x: (effectPct) => tenth(left + ((effectPct - low) / (high - low)) * (right - left)),
    y: (density) => tenth(base - (density / tallest) * (base - top)),
  };
}

const tenth = (value: number): number => Math.round(value * 10) / 10;

/** A smooth line through the points: cubic pieces whose slopes are those between the neighbours. */
function pathOf(curve: readonly CurvePoint[], read: (p: CurvePoint) => number, { x, y }: Scale): string {
  const at = curve.map((p) => [x(p.effectPct), y(read(p))] as const);
  const near = (i: number) => at[Math.min(at.length - 1, Math.max(0, i))]!;
  const pieces = at.slice(1).map((to, i) => {
    const from = at[i]!;
    const [before, after] = [near(i - 1), near(i + 2)];
    const a = [from[0] + (to[0] - before[0]) / 6, Math.min(base, from[1] + (to[1] - before[1]) / 6)];
    const b = [to[0] - (after[0] - from[0]) / 6, Math.min(base, to[1] - (after[1] - from[1]) / 6)];
    return `C${[...a, ...b, ...to].map(tenth).join(' ')}`;
  });
  return `M${at[0]!.join(' ')}${pieces.join('')}`;
}

const TICK_STEPS = [0.1, 0.2, 0.5, 1, 2, 5, 10];
const MOST_TICKS = 6;

/** Round sizes of effect, zero among them when it is in sight. */
export function ticksBetween(low: number, high: number): number[] {
  const step = TICK_STEPS.find((one) => (high - low) / one <= MOST_TICKS) ?? high - low;
  const first = Math.ceil(low / step);
  const count = Math.floor(high / step) - first + 1;
  return Array.from({ length: count }, (_, i) => Number(((first + i) * step).toFixed(2)));
}

const EDGE = 60;

function peakLabel(x: number): Label {
  if (x < left + EDGE) return { x: left, y: top - 12, anchor: 'start' };
  if (x > right - EDGE) return { x: right, y: top - 12, anchor: 'end' };
  return { x, y: top - 12, anchor: 'middle' };
}

/** Over the shoulder of the belief that is away from what it is now. */
function shoulderLabel(mean: number, sd: number, away: number, curve: readonly CurvePoint[], { x, y }: Scale): Label {
  const side = away >= mean ? -1 : 1;
  const at = mean + side * SHOULDER_SD * sd;
  const nearest = curve.reduce((a, b) => (Math.abs(b.effectPct - at) < Math.abs(a.effectPct - at) ? b : a));
  const onBelief = y(nearest.belief) - 10;
  const reach = Math.min(right - LABEL_LENGTH, Math.max(left + LABEL_LENGTH, x(at)));
  return { x: reach, y: Math.max(top + 20, onBelief), anchor: side < 0 ? 'end' : 'start' };
}

const SHOULDER_SD = 1.2;
const LABEL_LENGTH = 84;
