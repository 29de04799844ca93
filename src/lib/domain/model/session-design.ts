import { formatNumber } from '../display';
import { multiply } from '../stats/cholesky';
import type { SettingChange, Settings } from '../types';
import type { RunFeatures } from './features';
import { afterRun, type Knowledge, knowledgeBefore } from './knowledge';
import {
  type Candidate,
  candidateSets,
  changesOf,
  type DesignOptions,
  minutesBetween,
  openSession,
  rowOf,
  type Session,
  settingsOf,
} from './test-session';
import type { TrainedModel } from './train';

export { DESIGN_DEFAULTS, type DesignOptions } from './test-session';

export const PLAN_RUNS = 3;

/** How well the effect of one step up is known before and after, one sd in slip points. */
export interface Learning {
  key: string;
  label: string;
  beforePct: number;
  afterPct: number;
}

export interface TestRun {
  settings: Settings;
  /** Against the settings as they stand; empty: run them as they are. */
  changes: readonly SettingChange[];
  /** Working minutes from the run before. */
  minutes: number;
  pInBand: number;
  /** Share of the uncertainty of the effects (sum of their variances, slip points squared per step) that this run takes away. */
  cut: number;
  /** One entry per adjustable that suggestions may move. */
  learning: readonly Learning[];
}

/** What one more run would teach, without knowing how it turns out. */
interface Lesson {
  run: Candidate;
  /** Variance taken away, summed over the effects, ln slip squared over the noise variance. */
  worth: number;
}

/**
 * Test runs that teach most about the effects, best first: changes of one or two adjustables inside the limits and near what has been run, at
 * odds no worse than allowed. One for each adjustable and pair; `hold` is what running the settings as they stand would teach.
 */
export function testRuns(
  model: TrainedModel,
  run: RunFeatures,
  options: Partial<DesignOptions> = {},
): { ranked: TestRun[]; hold: TestRun } {
  const session = openSession(model, run, options);
  const knowledge = knowledgeBefore(model, run);
  const teaching = lessons(session, knowledge);
  const ranked = candidateSets(session)
    .flatMap((set) => bestLesson(set, teaching))
    .sort((a, b) => b.worth - a.worth)
    .slice(0, session.options.offers);
  const shown = (candidate: Candidate) => toTestRun(session, candidate, knowledge, run.settings);
  return { ranked: ranked.map((lesson) => shown(lesson.run)), hold: shown(session.hold) };
}

export interface SessionPlan {
  runs: TestRun[];
  /** Of the whole plan. */
  cut: number;
  learning: readonly Learning[];
}

/**
 * A session of several runs, each chosen to teach most after those before it (greedy). Running the settings as they stand is among the choices:
 * a change teaches most beside a run without it. Conditions are taken to stay as they are.
 */
export function sessionPlan(
  model: TrainedModel,
  run: RunFeatures,
  options: Partial<DesignOptions> = {},
  count: number = PLAN_RUNS,
): SessionPlan {
  const session = openSession(model, run, options);
  const sets = [[session.hold], ...candidateSets(session)];
  const start = knowledgeBefore(model, run);
  const runs: TestRun[] = [];
  let knowledge = start;
  let settings = run.settings;
  for (let k = 0; k < count; k++) {
    const next = mostTelling(session, sets, knowledge, settings);
    if (!next) break;
    runs.push(toTestRun(session, next, knowledge, settings));
    knowledge = afterRun(knowledge, rowOf(session, next));
    settings = settingsOf(session, next);
  }
  return { runs, cut: cutBetween(session, start, knowledge), learning: learningBetween(session, start, knowledge) };
}

/** "would cut the uncertainty of Counterweight's effect from ±0.62 to ±0.51 points per step" */
export function learningText({ label, beforePct, afterPct }: Learning): string {
  const [before, after] = [formatNumber(beforePct, 2), formatNumber(afterPct, 2)];
  if (before === after) return `would hardly change what is known of ${label}'s effect (±${before} points per step)`;
  return `would cut the uncertainty of ${label}'s effect from ±${before} to ±${after} points per step`;
}

/** The effect a run teaches most about. Null when nothing may move. */
export function mostLearned(learning: readonly Learning[]): Learning | null {
  const share = (l: Learning): number => l.afterPct / l.beforePct;
  return learning.reduce<Learning | null>((best, l) => (best === null || share(l) < share(best) ? l : best), null);
}

/** Variance that a run would take away, from two products worked out once: quick enough for tens of thousands of candidates. */
function lessons({ base, columns }: Session, { covariance, size }: Knowledge): (run: Candidate) => Lesson {
  const pull = multiply(covariance, base, size);
  const ofBase = base.reduce((s, v, j) => s + v * pull[j]!, 0);
  return (run) => {
    const at = run.levers.map((lever) => lever.column);
    let total = 1 + ofBase;
    at.forEach((a, i) => {
      total += 2 * run.steps[i]! * pull[a]!;
      at.forEach((b, j) => {
        total += run.steps[i]! * run.steps[j]! * covariance[a * size + b]!;
      });
    });
    const worth = columns.reduce((sum, j) => {
      const gain = at.reduce((s, a, i) => s + run.steps[i]! * covariance[j * size + a]!, pull[j]!);
      return sum + (gain * gain) / total;
    }, 0);
    return { run, worth };
  };
}

function bestLesson(set: readonly Candidate[], teach: (run: Candidate) => Lesson): Lesson[] {
  let best: Lesson | null = null;
  for (const run of set) {
    const lesson = teach(run);
    if (!best || lesson.worth > best.worth) best = lesson;
  }
  return best ? [best] : [];
}

function mostTelling(
  session: Session,
  sets: readonly (readonly Candidate[])[],
  knowledge: Knowledge,
  from: Settings,
): Candidate | null {
  const { minutesLeft } = session.options;
  const inTime = (c: Candidate): boolean => minutesLeft === null || minutesBetween(session, from, c) <= minutesLeft;
  const teach = lessons(session, knowledge);
  const best = sets.flatMap((set) => bestLesson(set.filter(inTime), teach)).sort((a, b) => b.worth - a.worth);
  return best[0]?.run ?? null;
}

function toTestRun(session: Session, candidate: Candidate, before: Knowledge, from: Settings): TestRun {
  const after = afterRun(before, rowOf(session, candidate));
  return {
    settings: settingsOf(session, candidate),
    changes: changesOf(session, candidate),
    minutes: minutesBetween(session, from, candidate),
    pInBand: candidate.pInBand,
    cut: cutBetween(session, before, after),
    learning: learningBetween(session, before, after),
  };
}

const varianceAt = ({ covariance, size }: Knowledge, j: number): number => covariance[j * size + j]!;

function cutBetween({ columns }: Session, before: Knowledge, after: Knowledge): number {
  const sum = (knowledge: Knowledge): number => columns.reduce((s, j) => s + varianceAt(knowledge, j), 0);
  return columns.length === 0 ? 0 : 1 - sum(after) / sum(before);
}

function learningBetween({ model, columns }: Session, before: Knowledge, after: Knowledge): Learning[] {
  const points = Math.sqrt(model.posterior.noiseVariance * model.band.lowPct * model.band.highPct);
  return columns.map((j) => {
    const { key, name } = model.columnSet.columns[j]!;
    const sd = (knowledge: Knowledge): number => Math.sqrt(varianceAt(knowledge, j)) * points;
    return { key: key!, label: name, beforePct: sd(before), afterPct: sd(after) };
  });
}
