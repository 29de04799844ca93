import { describe, expect, it } from 'vitest';
import {
  type BreakdownLines,
  breakdownLines,
  factSentence,
  pointsText,
  tenthsOf,
} from '@/components/suggestion/breakdown';
import type { Breakdown, Contribution } from '@/lib/domain/model/contributions';
import type { RunContext } from '@/lib/domain/types';
import { fToC } from '@/lib/domain/units';
import { SPECS } from './fixture';

const context: RunContext = {
  event: 'Spring 2026',
  track: 'Mesa Flats',
  time: '2026-05-02T18:00:00.000Z',
  round: 'Q2',
  lane: 'left',
  conditions: { airTempC: 22, relativeHumidity: 0.3, stationPressurePa: 84_300, trackTempC: 36 },
  runsOnDiscs: 1,
};
const writer = { units: 'us', specs: SPECS, context } as const;

const part = (fact: string, pointsPct: number, over: Partial<Contribution> = {}): Contribution => ({
  fact,
  label: fact,
  kind: 'condition',
  log: pointsPct / 15,
  pointsPct,
  sdPct: 0.3,
  value: null,
  typical: null,
  ...over,
});

/** Parts that add up, as the model's do. */
const breakdown = (typicalPct: number, ...contributions: Contribution[]): Breakdown => ({
  typicalPct,
  medianPct: typicalPct + contributions.reduce((sum, one) => sum + one.pointsPct, 0),
  contributions,
});

const shownSum = ({ lines }: BreakdownLines): number => lines.reduce((sum, line) => sum + line.tenths, 0);

describe('breakdownLines', () => {
  it('says a condition with its value today and usually', () => {
    const track = part('track temperature', 1.24, { value: fToC(118), typical: fToC(101) });
    const [line] = breakdownLines(breakdown(14.5, track), writer).lines;
    expect(factSentence(line!)).toBe('Track temperature 118 °F, usually 101 °F: +1.2 points');
    expect(line!.giveOrTake).toBe('± 0.3');
  });

  it('says a setting in its own unit, the usual one no finer than its step', () => {
    const set = { kind: 'setting', value: 11.5, typical: 11.3333 } as const;
    const [line] = breakdownLines(breakdown(14.5, part('counterweight_g', -0.44, set)), writer).lines;
    expect(factSentence(line!)).toBe('Counterweight 11.5 g, usually 11.3 g: −0.4 points');
  });

  it('says what was not known, and that a very sure effect is not certain', () => {
    const [line] = breakdownLines(breakdown(14.5, part('dew margin', 0.2, { sdPct: 0.01 })), writer).lines;
    expect(line).toMatchObject({ values: 'not known, taken as usual', giveOrTake: 'under\u00a00.1' });
  });

  it('folds what would show as 0.0 into one last line that names it', () => {
    const small = [part('discs', 0.049, { kind: 'discs' }), part('dew margin', -0.0499)];
    const { lines } = breakdownLines(breakdown(14.5, part('air density', 0.05), ...small), writer);
    expect(lines.map(({ name }) => name)).toEqual(['Air density', 'Everything else']);
    expect(lines[1]!.values).toBe('runs on the discs, track above dew point');
  });

  it.each([
    [14.46, [0.14, 0.14, 0.14, 0.14, 0.14]],
    [14.44, [1.26, -0.34, 0.04, 0.04, 0.04, 0.04]],
    [15.05, [-2.05, -0.05, 0.05, 0.15, 0.049]],
    [13.99, [0.04, 0.03, -0.02]],
  ])('adds up to the difference shown, from %f with %j', (from, points) => {
    const all = points.map((value, i) => part(`fact ${i}`, value));
    const shown = breakdownLines(breakdown(from, ...all), writer);
    expect(shown.fromTenths + shownSum(shown)).toBe(shown.toTenths);
    expect(shown.toTenths / 10).toBeCloseTo(from + points.reduce((sum, value) => sum + value, 0), 0);
  });

  it('calls what is left over rounding when nothing was folded, and is silent when nothing is left', () => {
    const five = Array.from({ length: 5 }, (_, i) => part(`fact ${i}`, 0.14));
    const { lines } = breakdownLines(breakdown(14.5, ...five), writer);
    expect(lines.at(-1)).toMatchObject({ name: 'Rounding', tenths: 2, values: '' });
    expect(breakdownLines(breakdown(14.5, part('air density', 1)), writer).lines).toHaveLength(1);
  });
});

describe('points', () => {
  it('rounds a change down as its mirror image, and never writes minus zero', () => {
    expect([tenthsOf(0.25), tenthsOf(-0.25), pointsText(tenthsOf(-0.04))]).toEqual([3, -3, '0.0']);
    expect([pointsText(12), pointsText(-3)]).toEqual(['+1.2', '−0.3']);
  });
});
