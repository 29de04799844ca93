import { studentTCdf, studentTPdf } from '../stats/special';
import { type Band, FORECAST_QUANTILES, type Forecast } from '../types';

/**
 * Predictive distribution of ln slip: mostly a Student t, with a small share of a wider one for odd passes.
 * Slip itself is its exponential.
 */
export interface LogForecast {
  location: number;
  /** Scale (not standard deviation) of the regular and of the odd part. */
  scale: number;
  oddScale: number;
  oddShare: number;
  df: number;
}

/** P(ln slip <= value). */
export function logCdf(f: LogForecast, value: number): number {
  const z = value - f.location;
  return (1 - f.oddShare) * studentTCdf(z / f.scale, f.df) + f.oddShare * studentTCdf(z / f.oddScale, f.df);
}

export function logPdf(f: LogForecast, value: number): number {
  const z = value - f.location;
  const regular = ((1 - f.oddShare) * studentTPdf(z / f.scale, f.df)) / f.scale;
  return regular + (f.oddShare * studentTPdf(z / f.oddScale, f.df)) / f.oddScale;
}

/** Quantile of ln slip, Newton inside a bracket. */
export function logQuantile(f: LogForecast, p: number): number {
  if (p === 0.5) return f.location;
  let width = 4 * f.oddScale;
  while (logCdf(f, f.location - width) > p || logCdf(f, f.location + width) < p) width *= 2;
  let low = f.location - width;
  let high = f.location + width;
  let x = f.location;
  for (let i = 0; i < 100 && high - low > 1e-12; i++) {
    const error = logCdf(f, x) - p;
    if (error > 0) high = x;
    else low = x;
    const newton = x - error / logPdf(f, x);
    const next = newton > low && newton < high ? newton : 0.5 * (low + high);
    if (Math.abs(next - x) < 1e-10) return next;
    x = next;
  }
  return x;
}

const DOTS = 20;
const GRID = 161;
const GRID_SCALES = 8;

/** The forecast in slip percent: mean, sd, quantiles, dots and the odds around the band. */
export function toForecast(f: LogForecast, band: Band): Forecast {
  const { mean, sd } = momentsPct(f);
  const pBelow = logCdf(f, Math.log(band.lowPct));
  const pAbove = 1 - logCdf(f, Math.log(band.highPct));
  return {
    meanPct: mean,
    sdPct: sd,
    quantiles: Object.fromEntries(FORECAST_QUANTILES.map((p) => [String(p), Math.exp(logQuantile(f, p))])),
    dots: Array.from({ length: DOTS }, (_, i) => Math.exp(logQuantile(f, (i + 0.5) / DOTS))),
    pBelow,
    pInBand: Math.max(0, 1 - pBelow - pAbove),
    pAbove,
  };
}

// The exponential of a Student t has no mean; the moments are taken within eight scales of the middle.
export function momentsPct(f: LogForecast): { mean: number; sd: number } {
  let mass = 0;
  let first = 0;
  let second = 0;
  for (let i = 0; i < GRID; i++) {
    const y = f.location + f.scale * GRID_SCALES * ((2 * i) / (GRID - 1) - 1);
    const density = logPdf(f, y);
    const slip = Math.exp(y);
    mass += density;
    first += density * slip;
    second += density * slip * slip;
  }
  const mean = first / mass;
  return { mean, sd: Math.sqrt(Math.max(0, second / mass - mean * mean)) };
}

/**
 * A fast table of the Student t distribution function for one df, for ranking thousands of candidates.
 * Linear between points 0.01 apart: error below 5e-6.
 */
export function tabulatedTCdf(df: number): (t: number) => number {
  const table = TABLES.get(df) ?? buildTable(df);
  return (t) => {
    const at = (t + TABLE_REACH) / TABLE_STEP;
    if (at <= 0) return 0;
    if (at >= table.length - 1) return 1;
    const i = Math.floor(at);
    return table[i]! + (at - i) * (table[i + 1]! - table[i]!);
  };
}

const TABLE_REACH = 12;
const TABLE_STEP = 0.01;
const TABLES = new Map<number, Float64Array>();
const MAX_TABLES = 16;

function buildTable(df: number): Float64Array {
  const points = Math.round((2 * TABLE_REACH) / TABLE_STEP) + 1;
  const table = Float64Array.from({ length: points }, (_, i) => studentTCdf(i * TABLE_STEP - TABLE_REACH, df));
  if (TABLES.size >= MAX_TABLES) TABLES.clear();
  TABLES.set(df, table);
  return table;
}
