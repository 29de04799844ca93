import { type Band, FORECAST_QUANTILES, type Forecast } from '../types';
import { type LogForecast, logCdf, logPdf, momentsPct, toForecast } from './predictive';

type Parts = readonly LogForecast[];

const average = (parts: Parts, of: (part: LogForecast) => number): number =>
  parts.reduce((s, part) => s + of(part), 0) / parts.length;

const mixtureCdf = (parts: Parts, value: number): number => average(parts, (f) => logCdf(f, value));

/** Quantile of ln slip of equally likely forecasts: Newton inside a bracket. */
export function mixtureQuantile(parts: Parts, p: number): number {
  let { low, high } = bracket(parts, p);
  let x = average(parts, (f) => f.location);
  for (let i = 0; i < 200 && high - low > 1e-12; i++) {
    const error = mixtureCdf(parts, x) - p;
    if (error > 0) high = x;
    else low = x;
    const newton = x - error / average(parts, (f) => logPdf(f, x));
    const next = newton > low && newton < high ? newton : 0.5 * (low + high);
    if (Math.abs(next - x) < 1e-11) return next;
    x = next;
  }
  return x;
}

function bracket(parts: Parts, p: number): { low: number; high: number } {
  let width = 4 * Math.max(...parts.map((f) => f.oddScale));
  const lowest = Math.min(...parts.map((f) => f.location));
  const highest = Math.max(...parts.map((f) => f.location));
  while (mixtureCdf(parts, lowest - width) > p || mixtureCdf(parts, highest + width) < p) width *= 2;
  return { low: lowest - width, high: highest + width };
}

const DOTS = 20;

/** The forecast in slip percent when any of `parts` is as likely as any other. One part is that part's own forecast. */
export function mixtureForecast(parts: Parts, band: Band): Forecast {
  if (parts.length === 1) return toForecast(parts[0]!, band);
  const slipAt = (p: number): number => Math.exp(mixtureQuantile(parts, p));
  const pBelow = mixtureCdf(parts, Math.log(band.lowPct));
  const pAbove = 1 - mixtureCdf(parts, Math.log(band.highPct));
  return {
    ...mixtureMoments(parts),
    quantiles: Object.fromEntries(FORECAST_QUANTILES.map((p) => [String(p), slipAt(p)])),
    dots: Array.from({ length: DOTS }, (_, i) => slipAt((i + 0.5) / DOTS)),
    pBelow,
    pInBand: Math.max(0, 1 - pBelow - pAbove),
    pAbove,
  };
}

function mixtureMoments(parts: Parts): { meanPct: number; sdPct: number } {
  const moments = parts.map(momentsPct);
  const mean = moments.reduce((s, m) => s + m.mean, 0) / parts.length;
  const square = moments.reduce((s, m) => s + m.sd ** 2 + m.mean ** 2, 0) / parts.length;
  return { meanPct: mean, sdPct: Math.sqrt(Math.max(0, square - mean ** 2)) };
}
