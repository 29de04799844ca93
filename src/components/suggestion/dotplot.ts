import type { Band, Forecast } from '@/lib/domain/types';
import { medianOf, type Zone, zoneOf } from '@/lib/domain/words';

/** Where everything of a quantile dotplot goes, in SVG units. Columns start at the band's edges, so no dot straddles one. */
export interface Dotplot {
  width: number;
  height: number;
  axisY: number;
  radius: number;
  band: { x: number; width: number };
  dots: readonly Dot[];
  ticks: readonly Tick[];
  medianX: number;
  /** Nested bars of the 50, 80 and 95 % intervals. */
  bars: readonly Bar[];
  /** Dots beyond the right end of the axis, drawn at its last column. */
  beyond: number;
}

export interface Dot {
  x: number;
  y: number;
  zone: Zone;
}

export interface Tick {
  x: number;
  label: string;
  edge: boolean;
}

export interface Bar {
  x: number;
  width: number;
  share: number;
}

/** One axis for all forecasts on a page, so that they can be compared by eye. */
export interface SlipScale {
  lowPct: number;
  highPct: number;
  /** Width of a column of dots, slip points. */
  columnPct: number;
}

const WIDTH = 400;
const SIDE = 12;
const PLOT = WIDTH - 2 * SIDE;
const TOP = 10;
const MAX_STACK = 168;
const MAX_COLUMN = 36;
const MIN_COLUMN = 11;
const BELOW_AXIS = 62;
const MIN_ROWS = 3;
/** A far tail must not squeeze the band: the axis ends at this many times the band's upper edge. */
const AXIS_REACH = 3;

/** An axis that holds every dot of the forecasts and the whole band. Throws RangeError when the band has no width. */
export function sharedScale(forecasts: readonly Forecast[], band: Band): SlipScale {
  const wide = band.highPct - band.lowPct;
  if (!(wide > 0)) throw new RangeError('The band needs a low edge under its high edge.');
  const dots = forecasts.flatMap((forecast) => forecast.dots);
  const from = Math.min(band.lowPct, ...dots);
  const to = Math.min(Math.max(band.highPct, ...dots), AXIS_REACH * band.highPct);
  const scales = COLUMNS_IN_BAND.map((columns) => scaleOf(from, to, band, wide / columns));
  const fits = (scale: SlipScale): boolean => {
    const column = columnWidth(scale);
    return column <= MAX_COLUMN && tallest(forecasts, band, scale) * column <= MAX_STACK;
  };
  return scales.find(fits) ?? scales.filter((scale) => columnWidth(scale) >= MIN_COLUMN).at(-1) ?? scales[0]!;
}

const COLUMNS_IN_BAND = [1, 2, 3, 4, 5, 6, 8, 10];

// Whole columns from the band's edges outwards, and half a column of air at each end.
function scaleOf(from: number, to: number, band: Band, columnPct: number): SlipScale {
  const below = Math.ceil((band.lowPct - from) / columnPct);
  const above = Math.ceil((to - band.highPct) / columnPct);
  const lowPct = Math.max(0, band.lowPct - (below + 0.5) * columnPct);
  return { lowPct, highPct: band.highPct + (above + 0.5) * columnPct, columnPct };
}

const columnWidth = (scale: SlipScale): number => (scale.columnPct * PLOT) / (scale.highPct - scale.lowPct);

function tallest(forecasts: readonly Forecast[], band: Band, scale: SlipScale): number {
  return Math.max(1, ...forecasts.map((forecast) => Math.max(0, ...stacks(forecast, band, scale).values())));
}

function stacks(forecast: Forecast, band: Band, scale: SlipScale): Map<number, number> {
  const heights = new Map<number, number>();
  for (const dot of forecast.dots) {
    const column = columnOf(dot, band, scale);
    heights.set(column, (heights.get(column) ?? 0) + 1);
  }
  return heights;
}

/** Column number counted from the band's low edge; a dot exactly on the high edge stays in the band. */
function columnOf(slipPct: number, band: Band, { highPct, columnPct }: SlipScale): number {
  const last = Math.floor((highPct - band.lowPct) / columnPct - 1 + 1e-9);
  const column = Math.floor((slipPct - band.lowPct) / columnPct + 1e-9);
  const zone = zoneOf(slipPct, band);
  const inBand = Math.round((band.highPct - band.lowPct) / columnPct);
  if (zone === 'below') return Math.min(column, -1);
  if (zone === 'above') return Math.min(Math.max(column, inBand), last);
  return Math.min(Math.max(column, 0), inBand - 1);
}

/** Lays one forecast out on a scale. */
export function layoutDotplot(forecast: Forecast, band: Band, scale: SlipScale): Dotplot {
  const column = columnWidth(scale);
  const rows = Math.max(MIN_ROWS, tallest([forecast], band, scale));
  const axisY = TOP + rows * column + 4;
  const x = (pct: number): number =>
    SIDE + (clamp(pct, scale) - scale.lowPct) * (PLOT / (scale.highPct - scale.lowPct));
  return {
    width: WIDTH,
    height: axisY + BELOW_AXIS,
    axisY,
    radius: column * 0.46,
    band: { x: x(band.lowPct), width: x(band.highPct) - x(band.lowPct) },
    dots: placeDots(forecast, band, scale, { x, axisY, column }),
    ticks: ticksOf(band, scale, x),
    medianX: x(medianOf(forecast)),
    bars: barsOf(forecast, x),
    beyond: forecast.dots.filter((dot) => dot > scale.highPct).length,
  };
}

const clamp = (pct: number, { lowPct, highPct }: SlipScale): number => Math.min(highPct, Math.max(lowPct, pct));

interface Frame {
  x: (pct: number) => number;
  axisY: number;
  column: number;
}

function placeDots(forecast: Forecast, band: Band, scale: SlipScale, { x, axisY, column }: Frame): Dot[] {
  const heights = new Map<number, number>();
  return forecast.dots.map((dot) => {
    const at = columnOf(dot, band, scale);
    const height = heights.get(at) ?? 0;
    heights.set(at, height + 1);
    const centre = band.lowPct + (at + 0.5) * scale.columnPct;
    return { x: x(centre), y: axisY - 3 - (height + 0.5) * column, zone: zoneOf(dot, band) };
  });
}

const BAR_ENDS = [
  { share: 0.95, low: '0.025', high: '0.975' },
  { share: 0.8, low: '0.1', high: '0.9' },
  { share: 0.5, low: '0.25', high: '0.75' },
];

function barsOf(forecast: Forecast, x: Frame['x']): Bar[] {
  return BAR_ENDS.map(({ share, low, high }) => {
    const from = x(forecast.quantiles[low]!);
    return { share, x: from, width: Math.max(1, x(forecast.quantiles[high]!) - from) };
  });
}

const TICK_ROOM = 34;
const TICK_STEPS = [1, 2, 5, 10, 20];

/** The band's edges always; round numbers between them and the ends where there is room. */
function ticksOf(band: Band, scale: SlipScale, x: Frame['x']): Tick[] {
  const edges = [band.lowPct, band.highPct].map((pct) => ({ x: x(pct), label: label(pct), edge: true }));
  const span = scale.highPct - scale.lowPct;
  const step = TICK_STEPS.find((size) => (size * PLOT) / span >= TICK_ROOM) ?? 20;
  const others: Tick[] = [];
  for (let pct = Math.ceil(scale.lowPct / step) * step; pct <= scale.highPct; pct += step) {
    const tick = { x: x(pct), label: label(pct), edge: false };
    if (edges.every((edge) => Math.abs(edge.x - tick.x) >= TICK_ROOM)) others.push(tick);
  }
  return [...edges, ...others].sort((a, b) => a.x - b.x);
}

const label = (pct: number): string => String(Number(pct.toFixed(2)));
