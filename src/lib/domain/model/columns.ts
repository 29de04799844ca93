import type { Adjustable, Band } from '../types';
import { OPEN_BELIEF_RANGE_SD, PRIOR } from './constants';
import { type RunFeatures, settingOf } from './features';

export type ColumnKind = 'intercept' | 'setting' | 'condition' | 'car' | 'lane' | 'round' | 'track' | 'track-lane';

/** One column of the regression. `value` gives null where the run has no such fact. Priors are in ln slip per unit of the column. */
export interface Column {
  name: string;
  kind: ColumnKind;
  priorMean: number;
  priorSd: number;
  value(run: RunFeatures): number | null;
  /** Adjustable key for settings, otherwise null. */
  key: string | null;
  /** Nothing is offered for a run that does not know this fact. */
  essential: boolean;
}

/** A source column that several model columns may be made of (track temperature and its square). */
const SOURCES = {
  density: { label: 'air density', read: (r: RunFeatures) => r.densityKgM3 },
  trackTemp: { label: 'track temperature', read: (r: RunFeatures) => r.trackTempC },
  dewMargin: { label: 'dew margin', read: (r: RunFeatures) => r.dewMarginC },
  discs: { label: 'runs on discs', read: (r: RunFeatures) => r.runsOnDiscs },
} as const;

/** Share of training passes that must know a fact for it to be used. */
const MIN_KNOWN_SHARE = 0.5;

export const densityUnits = (rho: number): number => (rho - 1.15) / 0.05;
export const trackTempUnits = (c: number): number => (c - 38) / 10;
const dewHinge = (marginC: number): number => Math.max(0, 10 - marginC) / 10;
const discUnits = (runs: number): number => 1 - Math.exp(-runs / 4);

const mapped = (v: number | null, f: (x: number) => number): number | null => (v === null ? null : f(v));

export interface ColumnSet {
  columns: Column[];
  /** Plain names of what was left out because too few passes know it. */
  leftOut: string[];
}

/** Chooses the columns that the training passes can support. */
export function chooseColumns(runs: readonly RunFeatures[], adjustables: readonly Adjustable[], band: Band): ColumnSet {
  const leftOut: string[] = [];
  const known = (label: string, read: (r: RunFeatures) => number | null): boolean => {
    const share = runs.filter((r) => read(r) !== null).length / Math.max(1, runs.length);
    if (share < MIN_KNOWN_SHARE) leftOut.push(label);
    return share >= MIN_KNOWN_SHARE;
  };
  const columns: Column[] = [interceptColumn(band)];
  for (const a of adjustables)
    if (known(a.label.toLowerCase(), (r) => settingOf(r, a))) columns.push(settingColumn(a, band));
  if (known(SOURCES.density.label, SOURCES.density.read)) columns.push(densityColumn());
  if (known(SOURCES.trackTemp.label, SOURCES.trackTemp.read)) columns.push(...trackTempColumns());
  if (known(SOURCES.dewMargin.label, SOURCES.dewMargin.read)) columns.push(dewColumn());
  if (known(SOURCES.discs.label, SOURCES.discs.read)) columns.push(...discColumns());
  if (known('lane', (r) => (r.lane === null ? null : 1))) columns.push(laneColumn());
  columns.push(roundColumn(), ...trackColumns(runs));
  return { columns, leftOut };
}

const column = (c: Partial<Column> & Pick<Column, 'name' | 'kind' | 'priorSd' | 'value'>): Column => ({
  priorMean: 0,
  key: null,
  essential: false,
  ...c,
});

const bandMiddle = (band: Band): number => Math.sqrt(band.lowPct * band.highPct);

function interceptColumn(band: Band): Column {
  return column({
    name: 'typical pass',
    kind: 'intercept',
    priorMean: Math.log(bandMiddle(band)),
    priorSd: PRIOR.intercept,
    value: () => 1,
  });
}

/** One unit is one step of the adjustable, counted from the middle of its limits. */
function settingColumn(a: Adjustable, band: Band): Column {
  const middle = (a.low + a.high) / 2;
  const { mean, sd } = beliefInLog(a, band);
  return column({
    name: a.label,
    kind: 'setting',
    key: a.key,
    essential: true,
    priorMean: mean,
    priorSd: sd,
    value: (r) => mapped(settingOf(r, a), (v) => (v - middle) / a.step),
  });
}

/** A belief in slip points per step, read at the middle of the band, as ln slip per step. */
export function beliefInLog(a: Adjustable, band: Band): { mean: number; sd: number } {
  if (a.belief) return { mean: a.belief.meanPct / bandMiddle(band), sd: a.belief.sdPct / bandMiddle(band) };
  const steps = Math.max(1, (a.high - a.low) / a.step);
  return { mean: 0, sd: OPEN_BELIEF_RANGE_SD / steps };
}

const densityColumn = (): Column =>
  column({
    name: 'air density',
    kind: 'condition',
    essential: true,
    priorSd: PRIOR.density,
    value: (r) => mapped(r.densityKgM3, densityUnits),
  });

const trackTempColumns = (): Column[] => [
  column({
    name: 'track temperature',
    kind: 'condition',
    essential: true,
    priorSd: PRIOR.trackTemp,
    value: (r) => mapped(r.trackTempC, trackTempUnits),
  }),
  column({
    name: 'track temperature, squared',
    kind: 'condition',
    priorSd: PRIOR.trackTempSquared,
    value: (r) => mapped(r.trackTempC, (c) => trackTempUnits(c) ** 2),
  }),
];

const dewColumn = (): Column =>
  column({
    name: 'dew margin',
    kind: 'condition',
    priorSd: PRIOR.dewHinge,
    value: (r) => mapped(r.dewMarginC, dewHinge),
  });

const discColumns = (): Column[] => [
  column({
    name: 'runs on discs',
    kind: 'car',
    priorSd: PRIOR.discRuns,
    value: (r) => mapped(r.runsOnDiscs, discUnits),
  }),
  column({
    name: 'fresh discs',
    kind: 'car',
    priorSd: PRIOR.freshDiscs,
    value: (r) => mapped(r.runsOnDiscs, (n) => Number(n === 0)),
  }),
];

const laneSign = (r: RunFeatures): number | null => {
  if (r.lane === null) return null;
  return r.lane === 'left' ? 0.5 : -0.5;
};

const laneColumn = (): Column => column({ name: 'lane', kind: 'lane', priorSd: PRIOR.lane, value: laneSign });

const roundColumn = (): Column =>
  column({
    name: 'round in event',
    kind: 'round',
    priorSd: PRIOR.roundInEvent,
    value: (r) => Math.min(r.roundInEvent, 8) / 4,
  });

/** One column per track seen, and per track and lane; a track not seen has none, and its variance is added to the forecast. */
function trackColumns(runs: readonly RunFeatures[]): Column[] {
  const tracks = [...new Set(runs.map((r) => r.track))];
  return tracks.flatMap((track) => [
    column({ name: `track: ${track}`, kind: 'track', priorSd: PRIOR.track, value: (r) => Number(r.track === track) }),
    column({
      name: `track and lane: ${track}`,
      kind: 'track-lane',
      priorSd: PRIOR.trackLane * Math.SQRT2,
      value: (r) => (r.track === track ? (laneSign(r) ?? 0) : 0),
    }),
  ]);
}

/** Extra variance (ln slip squared) of a run at a track the model has never seen. */
export function unseenTrackVariance(run: RunFeatures, columns: readonly Column[]): number {
  const seen = columns.some((c) => c.kind === 'track' && c.name === `track: ${run.track}`);
  return seen ? 0 : PRIOR.track ** 2 + (run.lane ? PRIOR.trackLane ** 2 : 0);
}
