import { describe, expect, test } from 'vitest';
import { PRIOR } from '@/lib/domain/model/constants';
import { designRow } from '@/lib/domain/model/design';
import { type RunFeatures, roundOfContext, runFeatures } from '@/lib/domain/model/features';
import { forecastLog } from '@/lib/domain/model/forecast';
import { afterRun, knowledgeBefore } from '@/lib/domain/model/knowledge';
import { toForecast } from '@/lib/domain/model/predictive';
import {
  DESIGN_DEFAULTS,
  learningText,
  mostLearned,
  sessionPlan,
  type TestRun,
  testRuns,
} from '@/lib/domain/model/session-design';
import { preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import { decomposeSymmetric } from '@/lib/domain/stats/cholesky';
import { type Adjustable, DEFAULT_BAND } from '@/lib/domain/types';
import { contextOf, season } from '../../helpers/seasons';

const s = season('nonlinear', 2);
const AT = 40;
const passes = s.passes.slice(0, AT);
const train = (adjustables: readonly Adjustable[] = s.adjustables): TrainedModel =>
  trainModel(preparePasses(passes), adjustables, DEFAULT_BAND)!;
const model = train();
const context = contextOf(s, AT);
const current = s.passes[AT - 1]!.settings;
const known: RunFeatures = runFeatures({ ...context, settings: current }, roundOfContext(passes, context));
const fresh: RunFeatures = { ...known, event: 'Test day' };
const points = Math.sqrt(model.posterior.noiseVariance * DEFAULT_BAND.lowPct * DEFAULT_BAND.highPct);

/** Covariance of the effects (relative to the noise) solved from scratch with a column per event, weights and noise as they are. */
function solvedAfter(m: TrainedModel, runs: readonly RunFeatures[]): { key: string; variance: number }[] {
  const { design, event, events } = m.input;
  const p = design.p;
  const size = p + events + 1;
  const noise = m.posterior.eventSums.lambda * PRIOR.event ** 2;
  const normal = new Float64Array(size * size);
  const add = (x: ArrayLike<number>, g: number, weight: number): void => {
    const row = new Float64Array(size);
    row.set(Array.from(x));
    row[p + g] = 1;
    for (let j = 0; j < size; j++) for (let k = 0; k < size; k++) normal[j * size + k]! += weight * (row[j]! * row[k]!);
  };
  for (let i = 0; i < design.n; i++) add(design.x.subarray(i * p, i * p + p), event[i]!, m.posterior.weights[i]!);
  for (const run of runs) add(designRow(run, design).x, m.eventIndex.get(run.event) ?? events, 1);
  design.columns.forEach((c, j) => {
    normal[j * size + j]! += noise / c.priorSd ** 2;
  });
  for (let g = p; g < size; g++) normal[g * size + g]! += noise / PRIOR.event ** 2;
  const { inverse } = decomposeSymmetric(normal, size)!;
  return design.columns.flatMap((c, j) => (c.key ? [{ key: c.key, variance: inverse[j * size + j]! }] : []));
}

const withSettings = (run: RunFeatures, test: TestRun): RunFeatures => ({ ...run, settings: test.settings });

describe('one more run, closed form against solving again with its row', () => {
  test.each([
    ['at the event under way', known],
    ['at a new event', fresh],
  ])('%s', (_, run) => {
    const { ranked, hold } = testRuns(model, run);
    expect(ranked.length).toBeGreaterThan(2);
    for (const test of [...ranked.slice(0, 3), hold]) {
      for (const { key, variance } of solvedAfter(model, [withSettings(run, test)])) {
        const learned = test.learning.find((l) => l.key === key)!;
        expect(learned.afterPct, key).toBeCloseTo(Math.sqrt(variance) * points, 8);
      }
    }
  });

  test('a plan of three equals solving again with all three', () => {
    for (const run of [known, fresh]) {
      const plan = sessionPlan(model, run);
      const solved = solvedAfter(
        model,
        plan.runs.map((r) => withSettings(run, r)),
      );
      for (const { key, variance } of solved)
        expect(plan.learning.find((l) => l.key === key)!.afterPct).toBeCloseTo(Math.sqrt(variance) * points, 8);
    }
  });

  test('an unseen track is one more thing the session shares', () => {
    const elsewhere = { ...fresh, track: 'Somewhere new' };
    const [there, here] = [elsewhere, { ...fresh }].map((run) => knowledgeBefore(model, run));
    const last = there!.size ** 2 - 1;
    const added = (there!.covariance[last]! - here!.covariance[last]!) * model.posterior.noiseVariance;
    expect(added).toBeCloseTo(PRIOR.track ** 2 + PRIOR.trackLane ** 2, 9);
  });

  test('the order of runs does not matter, and every run takes something away', () => {
    const start = knowledgeBefore(model, fresh);
    const [a, b] = testRuns(model, fresh).ranked.map((r) => [
      ...designRow(withSettings(fresh, r), model.input.design).x,
      1,
    ]);
    const [ab, ba] = [afterRun(afterRun(start, a!), b!), afterRun(afterRun(start, b!), a!)];
    ab.covariance.forEach((v, at) => {
      expect(v).toBeCloseTo(ba.covariance[at]!, 9);
    });
    for (let j = 0; j < start.size; j++)
      expect(ab.covariance[j * start.size + j]!).toBeLessThanOrEqual(start.covariance[j * start.size + j]! + 1e-12);
  });
});

describe('test runs', () => {
  const { ranked, hold } = testRuns(model, fresh);

  test('best first, each better than running the settings as they stand', () => {
    const cuts = ranked.map((r) => r.cut);
    expect([...cuts].sort((a, b) => b - a)).toEqual(cuts);
    expect(cuts[0]!).toBeGreaterThan(hold.cut);
    expect(hold.changes).toEqual([]);
    expect(ranked.length).toBeLessThanOrEqual(DESIGN_DEFAULTS.offers);
    for (const r of [...ranked, hold]) {
      const sum = (of: 'beforePct' | 'afterPct') => r.learning.reduce((t, l) => t + l[of] ** 2, 0);
      expect(r.cut).toBeCloseTo(1 - sum('afterPct') / sum('beforePct'), 9);
    }
  });

  test('inside the limits, whole steps, at most two adjustables, at odds no worse than allowed', () => {
    for (const r of ranked) {
      expect(r.changes.length).toBeLessThanOrEqual(2);
      const forecast = toForecast(forecastLog(model, withSettings(fresh, r)).forecast, DEFAULT_BAND);
      expect(r.pInBand).toBeCloseTo(forecast.pInBand, 4);
      expect(r.pInBand).toBeGreaterThanOrEqual(Math.max(0.35, hold.pInBand - DESIGN_DEFAULTS.maxLoss));
      for (const c of r.changes) {
        const a = s.adjustables.find((x) => x.key === c.key)!;
        expect(c.to).toBeCloseTo(c.from + c.steps * a.step, 9);
        expect(c.to).toBeGreaterThanOrEqual(a.low);
        expect(c.to).toBeLessThanOrEqual(a.high);
      }
      expect(r.minutes).toBe(r.changes.reduce((t, c) => t + c.minutes, 0));
    }
  });

  test('nothing allowed teaches more: every single step of two adjustables tried by solving again', () => {
    const keys = ['counterweight_g', 'launch_rpm'];
    const two = train(s.adjustables.map((a) => ({ ...a, movable: keys.includes(a.key) })));
    const found = testRuns(two, fresh).ranked;
    const floor = Math.max(0.35, testRuns(two, fresh).hold.pInBand - DESIGN_DEFAULTS.maxLoss);
    const total = (vs: { key: string; variance: number }[]) =>
      vs.filter((v) => keys.includes(v.key)).reduce((sum, v) => sum + v.variance, 0);
    const before = total(solvedAfter(two, []));
    const weight = s.adjustables.find((a) => a.key === 'counterweight_g')!;
    const single = found.find((r) => r.changes.length === 1 && r.changes[0]!.key === weight.key)!;
    let tried = 0;
    for (let steps = -8; steps <= 8; steps++) {
      const to = current.counterweight_g! + steps * weight.step;
      const seen = passes.map((p) => p.settings.counterweight_g!);
      const inReach =
        to >= Math.max(weight.low, Math.min(...seen) - 1) && to <= Math.min(weight.high, Math.max(...seen) + 1);
      const run = { ...fresh, settings: { ...current, counterweight_g: to } };
      if (!inReach || toForecast(forecastLog(two, run).forecast, DEFAULT_BAND).pInBand < floor) continue;
      tried++;
      expect(1 - total(solvedAfter(two, [run])) / before).toBeLessThanOrEqual(single.cut + 1e-9);
    }
    expect(tried).toBeGreaterThan(3);
  });

  test('one adjustable at a time when that is wanted', () => {
    const single = testRuns(model, fresh, { maxChanged: 1 }).ranked;
    expect(single.length).toBeGreaterThan(2);
    for (const r of single) expect(r.changes).toHaveLength(1);
  });

  test('a stricter floor teaches less, one that nothing reaches leaves only the settings as they stand', () => {
    const strict = testRuns(model, fresh, { maxLoss: 0.03 });
    expect(strict.ranked[0]!.cut).toBeLessThan(ranked[0]!.cut);
    expect(testRuns(model, fresh, { minPInBand: 0.99 }).ranked).toEqual([]);
  });

  test('only what fits the minutes, only what may move', () => {
    for (const r of testRuns(model, fresh, { minutesLeft: 5 }).ranked) expect(r.minutes).toBeLessThanOrEqual(5);
    const fixed = train(s.adjustables.map((a) => ({ ...a, movable: false })));
    const none = testRuns(fixed, fresh);
    expect([none.ranked, none.hold.cut, none.hold.learning]).toEqual([[], 0, []]);
    expect(mostLearned([])).toBeNull();
  });
});

describe('a plan of runs', () => {
  const plan = sessionPlan(model, fresh);

  test('three runs, together teaching at least as much as the best single one, and more with each', () => {
    expect(plan.runs).toHaveLength(3);
    expect(plan.cut).toBeGreaterThan(testRuns(model, fresh).ranked[0]!.cut);
    const cuts = [1, 2, 3, 4].map((n) => sessionPlan(model, fresh, {}, n).cut);
    expect([...cuts].sort((a, b) => a - b)).toEqual(cuts);
    expect(cuts[2]).toBeCloseTo(plan.cut, 12);
  });

  test('runs chain: each starts from what those before taught, minutes from the settings before it', () => {
    let settings = current;
    plan.runs.forEach((r, k) => {
      const moved = s.adjustables.filter((a) => r.settings[a.key] !== settings[a.key]);
      expect(r.minutes).toBe(moved.reduce((t, a) => t + a.minutes, 0));
      for (const l of r.learning) {
        const earlier = k === 0 ? l.beforePct : plan.runs[k - 1]!.learning.find((x) => x.key === l.key)!.afterPct;
        expect(l.beforePct).toBeCloseTo(earlier, 12);
      }
      settings = r.settings;
    });
  });

  test('minutes hold between runs too', () => {
    const short = sessionPlan(model, fresh, { minutesLeft: 12 });
    expect(short.runs).toHaveLength(3);
    for (const r of short.runs) expect(r.minutes).toBeLessThanOrEqual(12);
  });

  test('beats the same number of runs with the settings as they stand', () => {
    let knowledge = knowledgeBefore(model, fresh);
    const row = [...designRow(fresh, model.input.design).x, 1];
    const start = knowledge;
    for (let k = 0; k < 3; k++) knowledge = afterRun(knowledge, row);
    const columns = model.columnSet.columns.flatMap((c, j) => (c.key ? [j] : []));
    const trace = (k: typeof knowledge) => columns.reduce((t, j) => t + k.covariance[j * k.size + j]!, 0);
    expect(plan.cut).toBeGreaterThan(2 * (1 - trace(knowledge) / trace(start)));
  });
});

test('in plain words', () => {
  const learned = { key: 'counterweight_g', label: 'Counterweight', beforePct: 0.6, afterPct: 0.5 };
  expect(learningText(learned)).toBe(
    "would cut the uncertainty of Counterweight's effect from ±0.60 to ±0.50 points per step",
  );
  expect(learningText({ ...learned, afterPct: 0.599 })).toContain('hardly change');
  const best = mostLearned([learned, { ...learned, key: 'x', afterPct: 0.59 }]);
  expect(best!.key).toBe('counterweight_g');
});
