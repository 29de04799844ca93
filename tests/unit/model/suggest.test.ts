import { describe, expect, test } from 'vitest';
import { forecastSettings, suggestFor } from '@/lib/domain/model';
import { STEPS_BEYOND_SEEN } from '@/lib/domain/model/constants';
import { DEFAULT_BAND, type RunContext, type Settings } from '@/lib/domain/types';
import { fToC } from '@/lib/domain/units';
import { contextOf, season } from '../../helpers/seasons';

const s = season('nonlinear', 2);
const AT = 120;
const passes = s.passes.slice(0, AT);
const context = contextOf(s, AT);
const current = s.passes[AT - 1]!.settings;
const base = { passes, adjustables: s.adjustables, band: DEFAULT_BAND, context, current, minutesLeft: null };

/** Settings the model expects to give far too much slip, so that a change is worth making. */
const hot: Settings = { ...current, counterweight_g: Math.min(14, current.counterweight_g! + 2.5) };

describe('offers', () => {
  const suggestion = suggestFor({ ...base, current: hot });

  test('a change is offered, better than no change, no change among the offers', () => {
    expect(suggestion.status).toBe('offered');
    expect(suggestion.offers.length).toBeLessThanOrEqual(3);
    const hold = suggestion.offers.find((o) => o.changes.length === 0);
    expect(hold?.forecast.pInBand).toBeCloseTo(suggestion.noChange!.pInBand, 9);
    expect(suggestion.offers[0]!.forecast.pInBand).toBeGreaterThan(hold!.forecast.pInBand);
    expect(suggestion.passesUsed).toBe(passes.filter((p) => p.outcome !== 'aborted').length);
  });

  test('changes are whole steps inside the limits, at most two adjustables, near what has been run', () => {
    for (const offer of suggestion.offers) {
      expect(offer.changes.length).toBeLessThanOrEqual(2);
      for (const c of offer.changes) {
        const a = s.adjustables.find((x) => x.key === c.key)!;
        expect(Number.isInteger(c.steps)).toBe(true);
        expect(c.to).toBeCloseTo(c.from + c.steps * a.step, 9);
        expect(c.to).toBeGreaterThanOrEqual(a.low);
        expect(c.to).toBeLessThanOrEqual(a.high);
        const seen = [...passes.map((p) => p.settings[c.key]!), hot[c.key]!];
        expect(c.to).toBeGreaterThanOrEqual(Math.min(...seen) - STEPS_BEYOND_SEEN * a.step - 1e-9);
        expect(c.to).toBeLessThanOrEqual(Math.max(...seen) + STEPS_BEYOND_SEEN * a.step + 1e-9);
      }
    }
  });

  test('the odds of an offer are those of its settings asked for directly', () => {
    const { changes: _changes, ...offer } = suggestion.offers[0]!;
    const direct = forecastSettings({ ...base, settings: offer.settings })!;
    expect(direct.pInBand).toBeCloseTo(offer.forecast.pInBand, 9);
  });

  test('only changes that fit the minutes left', () => {
    const short = suggestFor({ ...base, current: hot, minutesLeft: 3 });
    expect(short.offers.length).toBeGreaterThan(0);
    for (const o of short.offers) expect(o.minutes).toBeLessThanOrEqual(3);
    const none = suggestFor({ ...base, current: hot, minutesLeft: 0 });
    expect(none.status).toBe('hold');
    expect(none.offers).toHaveLength(1);
  });

  test('an adjustable that may not move does not', () => {
    const adjustables = s.adjustables.map((a) => ({ ...a, movable: a.key === 'launch_rpm' }));
    const keys = suggestFor({ ...base, adjustables, current: hot }).offers.flatMap((o) => o.changes.map((c) => c.key));
    expect(keys.every((k) => k === 'launch_rpm')).toBe(true);
  });
});

describe('effects in the direction the passes show', () => {
  test('more counterweight, more slip, step after step', () => {
    const medians = [9, 10, 11, 12].map(
      (g) => forecastSettings({ ...base, settings: { ...current, counterweight_g: g } })!.quantiles['0.5']!,
    );
    expect([...medians].sort((a, b) => a - b)).toEqual(medians);
  });
  test('the share resting on the belief falls as passes come in', () => {
    const share = (n: number) =>
      suggestFor({ ...base, passes: passes.slice(0, n) }).effects.find((e) => e.key === 'counterweight_g')!
        .shareOnBelief;
    expect(share(100)).toBeLessThan(share(12));
    expect(share(12)).toBeLessThanOrEqual(1);
  });
});

describe('refusals are results', () => {
  test('too few passes says how many more', () => {
    const few = suggestFor({ ...base, passes: passes.slice(0, 5) });
    expect(few.status).toBe('too_few_passes');
    expect(few.noChange).toBeNull();
    expect(few.reasons[0]).toContain('3 more');
  });
  test('outside experience names the condition, keeps the forecast, offers nothing', () => {
    const hotTrack: RunContext = { ...context, conditions: { ...context.conditions, trackTempC: fToC(175) } };
    const outside = suggestFor({ ...base, context: hotTrack });
    expect(outside.status).toBe('outside_experience');
    expect(outside.outsideVariables).toContain('track temperature');
    expect(outside.offers).toHaveLength(0);
    const width = (f: typeof outside.noChange) => f!.quantiles['0.9']! / f!.quantiles['0.1']!;
    expect(width(outside.noChange)).toBeGreaterThan(width(suggestFor(base).noChange));
  });
  test('a reading without track temperature gives a wider forecast and no offers', () => {
    const blank: RunContext = { ...context, conditions: { ...context.conditions, trackTempC: null } };
    const missing = suggestFor({ ...base, context: blank });
    expect(missing.status).toBe('missing_input');
    expect(missing.reasons[0]).toContain('track temperature');
    expect(missing.offers).toHaveLength(0);
    expect(missing.noChange).not.toBeNull();
  });
  test('aborted, excluded and unmeasured passes do not train', () => {
    const unusable = passes.map((p, i) => {
      if (i % 3 === 0) return { ...p, outcome: 'aborted' as const };
      return i % 3 === 1 ? { ...p, excluded: true } : { ...p, slipPct: null };
    });
    expect(suggestFor({ ...base, passes: unusable }).status).toBe('too_few_passes');
  });
});

test('an unseen track is said and widens the forecast', () => {
  const elsewhere = suggestFor({ ...base, context: { ...context, track: 'Somewhere new', event: 'First visit' } });
  expect(elsewhere.warnings.join(' ')).toContain('Somewhere new');
  expect(elsewhere.noChange!.sdPct).toBeGreaterThan(suggestFor(base).noChange!.sdPct);
});
