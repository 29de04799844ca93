import { describe, expect, test } from 'vitest';
import { replaySeason } from '@/lib/domain/season/replay';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { season } from '../../helpers/seasons';

const s = season('nonlinear', 3);
const passes = s.passes.slice(0, 60);
const options = { adjustables: s.adjustables, band: DEFAULT_BAND, suggest: true };
const entries = replaySeason(passes, options);

describe('replay is one step ahead', () => {
  test('one entry per pass from the ninth on', () => {
    expect(entries.map((e) => e.passNo)).toEqual(passes.slice(8).map((p) => p.passNo));
    expect(entries[0]!.passesUsed).toBe(8);
  });

  test('nothing that happens at a pass or later changes its forecast or suggestion', () => {
    const at = 35;
    const changed = passes.map((p, i) => (i < at ? p : { ...p, slipPct: 40, outcome: 'smoke' as const }));
    const again = replaySeason(changed, options);
    const upTo = at - 8 + 1;
    expect(again.slice(0, upTo).map((e) => [e.forecast, e.suggestion])).toEqual(
      entries.slice(0, upTo).map((e) => [e.forecast, e.suggestion]),
    );
    expect(again[upTo]!.forecast).not.toEqual(entries[upTo]!.forecast);
  });

  test('a pass without its own slip is forecast all the same', () => {
    const blank = passes.map((p, i) => (i === 20 ? { ...p, slipPct: null } : p));
    expect(replaySeason(blank, options).find((e) => e.passNo === passes[20]!.passNo)!.forecast).toEqual(
      entries.find((e) => e.passNo === passes[20]!.passNo)!.forecast,
    );
  });

  test('too few usable passes are refused, not guessed', () => {
    const aborted = passes.slice(0, 12).map((p, i) => (i < 6 ? { ...p, outcome: 'aborted' as const } : p));
    const [first] = replaySeason(aborted, options);
    expect(first!.forecast).toBeNull();
    expect(first!.refused).toBe('too_few_passes');
    expect(first!.suggestion!.status).toBe('too_few_passes');
  });
});

test('over simulated seasons the 80 % range holds about 80 % of the time, and beats the last pass by far', () => {
  let inside = 0;
  let n = 0;
  let error = 0;
  let lastError = 0;
  for (const seed of [11, 12, 13]) {
    const run = season('nonlinear', seed);
    for (const [k, e] of replaySeason(run.passes, { ...options, suggest: false }).entries()) {
      const slip = e.slipPct!;
      inside += Number(slip > e.forecast!.quantiles['0.1']! && slip < e.forecast!.quantiles['0.9']!);
      error += Math.abs(slip - e.forecast!.quantiles['0.5']!);
      lastError += Math.abs(slip - run.passes[k + 7]!.slipPct!);
      n++;
    }
  }
  expect(n).toBeGreaterThan(400);
  expect(inside / n).toBeGreaterThan(0.72);
  expect(inside / n).toBeLessThan(0.88);
  expect(error / lastError).toBeLessThan(0.7);
});
