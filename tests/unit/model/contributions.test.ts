import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { contributionsOf, logarithmicMean } from '@/lib/domain/model/contributions';
import type { RunFeatures } from '@/lib/domain/model/features';
import { forecastLog } from '@/lib/domain/model/forecast';
import { preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { season } from '../../helpers/seasons';

const s = season('nonlinear', 4);
const prepared = preparePasses(s.passes);
const model: TrainedModel = trainModel(prepared.slice(0, 120), s.adjustables, DEFAULT_BAND)!;
const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);
const partOf = (run: RunFeatures, fact: string) =>
  contributionsOf(model, run).contributions.find((c) => c.fact === fact)!;

describe('contributions add up', () => {
  test.each([3, 40, 119, 120, 125, 160])('to the forecast against the typical pass, pass %i', (i) => {
    const run = prepared[i]!.features;
    const { contributions, typicalPct, medianPct } = contributionsOf(model, run);
    expect(medianPct).toBeCloseTo(Math.exp(forecastLog(model, run).forecast.location), 12);
    expect(Math.abs(sum(contributions.map((c) => c.log)) - Math.log(medianPct / typicalPct))).toBeLessThan(1e-9);
    expect(Math.abs(sum(contributions.map((c) => c.pointsPct)) - (medianPct - typicalPct))).toBeLessThan(1e-9);
    const share = contributions.map((c) => c.pointsPct / c.log).filter(Number.isFinite);
    expect(Math.max(...share) - Math.min(...share)).toBeLessThan(1e-9);
  });

  test('with facts missing and at a track never seen', () => {
    const blank: RunFeatures = {
      ...prepared[125]!.features,
      trackTempC: null,
      dewMarginC: null,
      lane: null,
      track: 'Somewhere new',
      event: 'First visit',
    };
    const { contributions, typicalPct, medianPct } = contributionsOf(model, blank);
    expect(Math.abs(sum(contributions.map((c) => c.pointsPct)) - (medianPct - typicalPct))).toBeLessThan(1e-9);
    for (const fact of ['track temperature', 'dew margin']) expect(partOf(blank, fact).log).toBe(0);
    expect(partOf(blank, 'event').log).toBe(0);
    expect(partOf(blank, 'track temperature').value).toBeNull();
  });
});

test('one fact, one entry: the square goes with its temperature, lane with lane at the track', () => {
  const { contributions } = contributionsOf(model, prepared[125]!.features);
  const facts = contributions.map((c) => c.fact);
  expect(new Set(facts).size).toBe(facts.length);
  const others = [
    'track temperature',
    'air density',
    'dew margin',
    'discs',
    'lane',
    'round in event',
    'track',
    'event',
  ];
  expect([...facts].sort()).toEqual([...s.adjustables.map((a) => a.key), ...others].sort());
});

test('the typical pass gives zeros', () => {
  const middle = { ...model, input: { ...model.input, design: { ...model.input.design } } };
  const { design } = middle.input;
  design.columns = design.columns.map((c, j) => ({ ...c, value: () => design.means[j]! }));
  const { contributions, typicalPct, medianPct } = contributionsOf(middle, { ...prepared[0]!.features, event: 'new' });
  for (const c of contributions) expect(Math.abs(c.log) + Math.abs(c.pointsPct) + (c.sdPct ?? 0), c.fact).toBe(0);
  expect(medianPct).toBeCloseTo(typicalPct, 12);
});

describe('signs and sizes', () => {
  const run = prepared[125]!.features;
  const withWeight = (g: number): RunFeatures => ({ ...run, settings: { ...run.settings, counterweight_g: g } });

  test('more counterweight than typical adds slip, less takes it away, in proportion', () => {
    const { typical } = partOf(run, 'counterweight_g');
    expect(partOf(withWeight(typical! + 1.5), 'counterweight_g').pointsPct).toBeGreaterThan(0.5);
    expect(partOf(withWeight(typical! - 1.5), 'counterweight_g').pointsPct).toBeLessThan(-0.5);
    expect(partOf(withWeight(typical!), 'counterweight_g').log).toBeCloseTo(0, 9);
    expect(partOf(withWeight(typical! + 2), 'counterweight_g').log).toBeCloseTo(
      -partOf(withWeight(typical! - 2), 'counterweight_g').log,
      9,
    );
  });

  test('changing one fact moves the forecast by the change of its own part, and no other part in ln slip', () => {
    const [before, after] = [contributionsOf(model, withWeight(10)), contributionsOf(model, withWeight(12))];
    const of = (b: typeof before, fact: string) => b.contributions.find((c) => c.fact === fact)!.log;
    expect(of(after, 'counterweight_g') - of(before, 'counterweight_g')).toBeCloseTo(
      Math.log(after.medianPct / before.medianPct),
      9,
    );
    for (const c of before.contributions.filter((c) => c.fact !== 'counterweight_g'))
      expect(of(after, c.fact)).toBeCloseTo(c.log, 12);
  });

  test('an event that has run hot so far adds slip', () => {
    const hot = s.passes.slice(0, 120).map((p) => (p.event === 'Event 13' ? { ...p, slipPct: p.slipPct! * 1.3 } : p));
    const hotModel = trainModel(preparePasses(hot), s.adjustables, DEFAULT_BAND)!;
    const event = (m: TrainedModel) =>
      contributionsOf(m, prepared[115]!.features).contributions.find((c) => c.fact === 'event')!;
    expect(event(hotModel).pointsPct).toBeGreaterThan(event(model).pointsPct + 0.3);
  });

  test('the sd of a setting is that of its effect times its steps away', () => {
    const part = partOf(withWeight(13), 'counterweight_g');
    const j = model.columnSet.columns.findIndex((c) => c.key === 'counterweight_g');
    const sd = Math.sqrt(model.posterior.covariance[j * model.input.design.p + j]! * model.posterior.noiseVariance);
    const steps = (13 - part.typical!) / 0.5;
    expect(part.sdPct! / part.pointsPct).toBeCloseTo((sd * steps) / part.log, 9);
  });
});

test('logarithmic mean: between the two, symmetric, the value itself when they are equal', () => {
  const log = fc.double({ min: -3, max: 4, noNaN: true });
  fc.assert(
    fc.property(log, log, (a, b) => {
      const mean = logarithmicMean(a, b);
      expect(mean).toBeGreaterThanOrEqual(Math.exp(Math.min(a, b)) * (1 - 1e-12));
      expect(mean).toBeLessThanOrEqual(Math.exp(Math.max(a, b)) * (1 + 1e-12));
      expect(mean).toBeCloseTo(logarithmicMean(b, a), 9);
      expect(mean * (b - a)).toBeCloseTo(Math.exp(b) - Math.exp(a), 9);
    }),
  );
  expect(logarithmicMean(2, 2)).toBe(Math.exp(2));
});
