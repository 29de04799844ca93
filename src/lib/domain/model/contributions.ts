import { quadraticForm } from '../stats/cholesky';
import type { Column, ColumnKind } from './columns';
import { designRow } from './design';
import type { RunFeatures } from './features';
import { expectedLog } from './fit';
import { forecastLog } from './forecast';
import type { TrainedModel } from './train';

export type FactKind = 'setting' | 'condition' | 'discs' | 'lane' | 'round' | 'track' | 'event' | 'other';

/** What one fact adds to the forecast of a run, against the team's typical pass. */
export interface Contribution {
  /** Stable name: the adjustable's key for a setting, otherwise the plain name of the fact. */
  fact: string;
  label: string;
  kind: FactKind;
  /** In ln slip: exact, adds up to the difference in ln slip of the medians. */
  log: number;
  /** In slip points: adds up to the difference of the medians in slip percent. */
  pointsPct: number;
  /** One sd of `pointsPct`: how well the effect itself is known. Null for the event. */
  sdPct: number | null;
  /** The fact in this run and in the typical pass, SI or the adjustable's own unit; null when not known or not a number. */
  value: number | null;
  typical: number | null;
}

export interface Breakdown {
  /** Median slip of the typical pass and of this run, percent. */
  typicalPct: number;
  medianPct: number;
  /** Largest first. */
  contributions: Contribution[];
}

/**
 * Why the forecast of a run differs from the team's typical pass: every fact at its mean over the passes that know it, at an
 * event like any other. A fact not known for this run is taken at that mean, so it adds nothing.
 *
 * The parts add up in ln slip. They are turned into points by one common factor, the logarithmic mean of the two slips,
 * (b - a) / (ln b - ln a): the only sharing that is in proportion to the ln parts and adds up exactly.
 * Source: the logarithmic mean Divisia index, B. W. Ang, Energy Policy 32 (2004) 1131-1139.
 */
export function contributionsOf(model: TrainedModel, run: RunFeatures): Breakdown {
  const { means } = model.input.design;
  const location = forecastLog(model, run).forecast.location;
  const typicalLog = expectedLog(model.posterior, means, -1).location;
  const perLog = logarithmicMean(typicalLog, location);
  const parts = [...columnParts(model, run), eventPart(model, run)];
  return {
    typicalPct: Math.exp(typicalLog),
    medianPct: Math.exp(location),
    contributions: parts
      .map((part) => ({
        ...part,
        pointsPct: part.log * perLog,
        sdPct: part.sdPct === null ? null : part.sdPct * perLog,
      }))
      .sort((a, b) => Math.abs(b.log) - Math.abs(a.log)),
  };
}

/** (e^b - e^a) / (b - a), which tends to e^a as b tends to a. */
export function logarithmicMean(a: number, b: number): number {
  const gap = b - a;
  return gap === 0 ? Math.exp(a) : Math.exp(a) * (Math.expm1(gap) / gap);
}

// Until they are scaled, `pointsPct` is empty and `sdPct` is in ln slip.
function columnParts(model: TrainedModel, run: RunFeatures): Contribution[] {
  const { design } = model.input;
  const { x } = designRow(run, design);
  const away = x.map((v, j) => v - design.means[j]!);
  return [...columnsByFact(design.columns)].map(([fact, members]) => {
    const own = new Float64Array(design.p);
    for (const j of members) own[j] = away[j]!;
    const variance = quadraticForm(model.posterior.covariance, own, design.p) * model.posterior.noiseVariance;
    return {
      ...named(fact, design.columns[members[0]!]!, model, run),
      log: members.reduce((s, j) => s + model.posterior.coefficients[j]! * own[j]!, 0),
      pointsPct: 0,
      sdPct: Math.sqrt(Math.max(0, variance)),
    };
  });
}

/** Columns made of one fact belong together: track temperature and its square, the disc columns, every track. */
function columnsByFact(columns: readonly Column[]): Map<string, number[]> {
  const groups = new Map<string, number[]>();
  columns.forEach((c, j) => {
    if (c.kind === 'intercept') return;
    const fact = factOf(c);
    groups.set(fact, [...(groups.get(fact) ?? []), j]);
  });
  return groups;
}

const SHARED_FACT: Partial<Record<ColumnKind, { fact: string; kind: FactKind }>> = {
  car: { fact: 'discs', kind: 'discs' },
  lane: { fact: 'lane', kind: 'lane' },
  'track-lane': { fact: 'lane', kind: 'lane' },
  round: { fact: 'round in event', kind: 'round' },
  track: { fact: 'track', kind: 'track' },
  condition: { fact: '', kind: 'condition' },
};

const baseName = (c: Column): string => c.name.split(',')[0]!;
const factOf = (c: Column): string => c.key ?? (SHARED_FACT[c.kind]?.fact || baseName(c));

type Named = Pick<Contribution, 'fact' | 'label' | 'kind' | 'value' | 'typical'>;

function named(fact: string, column: Column, model: TrainedModel, run: RunFeatures): Named {
  const kind = column.key === null ? (SHARED_FACT[column.kind]?.kind ?? 'other') : 'setting';
  const read = readerOf(fact, kind);
  const label = column.key === null ? fact : column.name;
  return { fact, label, kind, value: read(run), typical: meanKnown(model, read) };
}

type Reader = (run: RunFeatures) => number | null;

const READERS: Readonly<Record<string, Reader>> = {
  'air density': (r) => r.densityKgM3,
  'track temperature': (r) => r.trackTempC,
  'dew margin': (r) => r.dewMarginC,
  discs: (r) => r.runsOnDiscs,
  'round in event': (r) => r.roundInEvent,
};

const readerOf = (fact: string, kind: FactKind): Reader =>
  kind === 'setting' ? (r) => r.settings[fact] ?? null : (READERS[fact] ?? (() => null));

function meanKnown(model: TrainedModel, read: Reader): number | null {
  const known = model.rows.map((r) => read(r.features)).filter((v) => v !== null);
  return known.length === 0 ? null : known.reduce((s, v) => s + v, 0) / known.length;
}

/** What the passes of this event so far say of it; nothing for an event not seen. */
function eventPart(model: TrainedModel, run: RunFeatures): Contribution {
  const { x } = designRow(run, model.input.design);
  const at = (event: number): number => expectedLog(model.posterior, x, event).location;
  const log = at(model.eventIndex.get(run.event) ?? -1) - at(-1);
  return {
    fact: 'event',
    label: 'this event',
    kind: 'event',
    log,
    pointsPct: 0,
    sdPct: null,
    value: null,
    typical: null,
  };
}
