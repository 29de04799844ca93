import { describe, expect, it } from 'vitest';
import {
  AdjustablesError,
  adjustablesToJson,
  DEFAULT_ADJUSTABLES,
  parseAdjustables,
} from '@/lib/domain/default-adjustables';
import { RESERVED_COLUMNS } from '@/lib/pass-csv/columns';

const ENTRY = {
  key: 'counterweight_g',
  label: 'Counterweight',
  unit: 'g',
  step: 0.5,
  low: 8,
  high: 14,
  minutes: 12,
  group: 'clutch',
  movable: true,
  effect_per_step_pct: { mean: 0.8, sd: 0.6 },
};

describe('default adjustables', () => {
  it('are the five columns of the pass file, readable by their own parser', () => {
    expect(DEFAULT_ADJUSTABLES.map(({ key }) => key)).toEqual([
      'counterweight_g',
      'base_pressure_lb',
      'release_delay_s',
      'launch_rpm',
      'tire_pressure_psi',
    ]);
    expect(parseAdjustables(JSON.parse(JSON.stringify(adjustablesToJson(DEFAULT_ADJUSTABLES))))).toEqual(
      DEFAULT_ADJUSTABLES,
    );
  });

  it('hold loose beliefs: an sd of 60 to 100 % of the mean, later release meaning less slip', () => {
    for (const { key, belief } of DEFAULT_ADJUSTABLES) {
      const { meanPct, sdPct } = belief!;
      expect(sdPct / Math.abs(meanPct), key).toBeGreaterThanOrEqual(0.6);
      expect(sdPct / Math.abs(meanPct), key).toBeLessThanOrEqual(1);
      expect(Math.sign(meanPct), key).toBe(key === 'release_delay_s' ? -1 : 1);
    }
  });

  it('have no key a pass file uses itself', () => {
    for (const { key } of DEFAULT_ADJUSTABLES) expect(RESERVED_COLUMNS.has(key), key).toBe(false);
  });
});

describe('parseAdjustables', () => {
  it('reads an entry, with defaults where there is one right answer', () => {
    const { label: _l, movable: _m, effect_per_step_pct: _e, unit: _u, ...least } = ENTRY;
    expect(parseAdjustables([least])).toEqual([
      { ...least, label: 'counterweight_g', unit: '', movable: true, belief: null },
    ]);
    expect(parseAdjustables([ENTRY])[0]?.belief).toEqual({ meanPct: 0.8, sdPct: 0.6 });
    expect(parseAdjustables([{ ...ENTRY, effect_per_step_pct: null }])[0]?.belief).toBeNull();
  });

  it.each([
    [{}, 'array'],
    [null, 'array'],
    [[], 'at least one'],
    [['x'], 'Adjustable 1'],
    [[{ ...ENTRY, key: 'Not A Key' }], 'lower-case'],
    [[JSON.parse('{"__proto__": {"key": "counterweight_g"}}')], 'Adjustable 1'],
    [[ENTRY, ENTRY], 'given twice'],
    [[{ ...ENTRY, step: 0 }], 'step'],
    [[{ ...ENTRY, step: 7 }], 'step'],
    [[{ ...ENTRY, step: 0.001 }], 'larger step'],
    [[{ ...ENTRY, low: 14, high: 8 }], 'below high'],
    [[{ ...ENTRY, low: '8' }], 'low must be a number'],
    [[{ ...ENTRY, high: Number.NaN }], 'high must be a number'],
    [[{ ...ENTRY, minutes: -1 }], '0 or more'],
    [[{ ...ENTRY, group: 'engine' }], '"clutch" or "launch"'],
    [[{ ...ENTRY, movable: 'yes' }], 'true or false'],
    [[{ ...ENTRY, label: 'x'.repeat(61) }], '60 characters'],
    [[{ ...ENTRY, effect_per_step_pct: 1 }], 'effect_per_step_pct'],
    [[{ ...ENTRY, effect_per_step_pct: { mean: 1 } }], 'sd must be a number'],
    [[{ ...ENTRY, effect_per_step_pct: { mean: 1, sd: 0 } }], 'above 0'],
    [Array.from({ length: 21 }, (_, i) => ({ ...ENTRY, key: `a${i}` })), 'at most 20'],
  ])('refuses %j', (json, reason) => {
    expect(() => parseAdjustables(json)).toThrow(AdjustablesError);
    expect(() => parseAdjustables(json)).toThrow(reason);
  });
});
