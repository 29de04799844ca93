import {
  cToF,
  fToC,
  ftToM,
  hPaToPa,
  inHgToPa,
  KG_PER_LB,
  kmhToMps,
  kPaToPa,
  M_PER_IN,
  mphToMps,
  mpsToKmh,
  mpsToMph,
  mToFt,
  PA_PER_KPA,
  PA_PER_PSI,
  paToHPa,
  paToInHg,
} from '@/lib/domain/units';

/** A unit as the suffix of a column name, with the way to and from the stored value. */
export interface ColumnUnit {
  suffix: string;
  label: string;
  toStored(value: number): number;
  fromStored(value: number): number;
}

const same = (value: number): number => value;
const unit = (
  suffix: string,
  label: string,
  toStored: (value: number) => number = same,
  fromStored: (value: number) => number = same,
): ColumnUnit => ({ suffix, label, toStored, fromStored });

export const UNIT = {
  f: unit('f', '°F', fToC, cToF),
  c: unit('c', '°C'),
  inhg: unit('inhg', 'inHg', inHgToPa, paToInHg),
  hpa: unit('hpa', 'hPa', hPaToPa, paToHPa),
  kpa: unit('kpa', 'kPa', kPaToPa, (pa) => pa / PA_PER_KPA),
  ft: unit('ft', 'ft', ftToM, mToFt),
  m: unit('m', 'm'),
  mph: unit('mph', 'mph', mphToMps, mpsToMph),
  kmh: unit('kmh', 'km/h', kmhToMps, mpsToKmh),
  /** Percent of a fraction. */
  pct: unit(
    'pct',
    '%',
    (pct) => pct / 100,
    (fraction) => fraction * 100,
  ),
  deg: unit('deg', '°'),
  s: unit('s', 's'),
  /** Stored in percent as it is. */
  percent: unit('pct', '%'),
  count: unit('', ''),
} as const;

/** Two suffixes of the same quantity, for adjustables: stored in the adjustable's own unit. */
interface TwinPair {
  us: string;
  metric: string;
  metricPerUs: number;
  /** Metric value at a US value of zero is `-usZero * metricPerUs`; only temperatures need it. */
  usZero: number;
}

const TWIN_PAIRS: readonly TwinPair[] = [
  { us: 'lb', metric: 'kg', metricPerUs: KG_PER_LB, usZero: 0 },
  { us: 'psi', metric: 'kpa', metricPerUs: PA_PER_PSI / PA_PER_KPA, usZero: 0 },
  { us: 'in', metric: 'mm', metricPerUs: M_PER_IN * 1000, usZero: 0 },
  { us: 'ft', metric: 'm', metricPerUs: ftToM(1), usZero: 0 },
  { us: 'mph', metric: 'kmh', metricPerUs: mpsToKmh(mphToMps(1)), usZero: 0 },
  { us: 'f', metric: 'c', metricPerUs: 5 / 9, usZero: 32 },
];

export interface TwinColumn {
  name: string;
  unit: ColumnUnit;
  system: 'us' | 'metric';
}

/** The column that gives an adjustable in the other system of units, e.g. base_pressure_kg for base_pressure_lb; null if none. */
export function twinOf(key: string): TwinColumn | null {
  const cut = key.lastIndexOf('_');
  if (cut < 1) return null;
  const stem = key.slice(0, cut);
  const suffix = key.slice(cut + 1);
  for (const pair of TWIN_PAIRS) {
    if (suffix === pair.us) return { name: `${stem}_${pair.metric}`, unit: metricUnit(pair), system: 'metric' };
    if (suffix === pair.metric) return { name: `${stem}_${pair.us}`, unit: usUnit(pair), system: 'us' };
  }
  return null;
}

const toUs = (pair: TwinPair) => (metric: number) => metric / pair.metricPerUs + pair.usZero;
const toMetric = (pair: TwinPair) => (us: number) => (us - pair.usZero) * pair.metricPerUs;
const metricUnit = (pair: TwinPair): ColumnUnit => unit(pair.metric, pair.metric, toUs(pair), toMetric(pair));
const usUnit = (pair: TwinPair): ColumnUnit => unit(pair.us, pair.us, toMetric(pair), toUs(pair));
