import { describe, expect, it } from 'vitest';
import { lessonText, runLines } from '@/components/suggestion/test-session';
import type { TestRun } from '@/lib/domain/model/session-design';
import { CURRENT, SPECS } from './fixture';

const run = (over: Partial<TestRun> = {}): TestRun => ({
  settings: CURRENT,
  changes: [],
  minutes: 0,
  pInBand: 0.5,
  cut: 0.1,
  learning: [
    { key: 'launch_rpm', label: 'Launch rpm', beforePct: 0.2, afterPct: 0.19 },
    { key: 'counterweight_g', label: 'Counterweight', beforePct: 0.62, afterPct: 0.51 },
  ],
  ...over,
});

describe('a test run in words', () => {
  it('names each change with its steps, or says that nothing is changed', () => {
    const changes = [
      { key: 'counterweight_g', from: 11, to: 12, steps: 2, minutes: 12 },
      { key: 'launch_rpm', from: 7450, to: 7400, steps: -1, minutes: 1 },
    ];
    expect(runLines(run({ changes }), SPECS)).toEqual([
      'Counterweight 11.0 to 12.0 g, two steps up',
      'Launch rpm 7,450 to 7,400 rpm, one step down',
    ]);
    expect(runLines(run(), SPECS)).toEqual(['As the car stands']);
  });

  it('says what it teaches most about, as a sentence', () => {
    expect(lessonText(run())).toBe(
      "Would cut the uncertainty of Counterweight's effect from ±0.62 to ±0.51 points per step.",
    );
    expect(lessonText(run({ learning: [] }))).toBe('');
  });
});
