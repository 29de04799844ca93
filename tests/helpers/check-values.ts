/** Reads fixtures/check-values and judges computed numbers by the tolerance each entry states. Format: fixtures/check-values/README.md. */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';

interface Tolerance {
  abs?: number;
  rel?: number;
  per?: Record<string, { abs?: number; rel?: number }>;
  why?: string;
  // solar_position.json has one block per generation of the library
  [block: string]: unknown;
}

export interface Quantity {
  // biome-ignore lint/suspicious/noExplicitAny: numbers, texts and arrays of either, by entry
  value: any;
  unit: string;
}

export interface CheckEntry {
  id: string;
  quantity: string;
  method: string;
  kind: string;
  inputs: Record<string, Quantity>;
  expected: Record<string, Quantity>;
  tolerance: Tolerance;
  product_tolerance?: Tolerance;
  source: string;
}

/** Every entry of one file, e.g. 'air_density'. */
export function checkEntries(area: string): CheckEntry[] {
  const file = new URL(`../../fixtures/check-values/${area}.json`, import.meta.url);
  return JSON.parse(readFileSync(file, 'utf8')).entries;
}

/** The one entry of that id; throws when there is none, so that a test cannot run on nothing. */
export function checkEntry(area: string, id: string): CheckEntry {
  const entry = checkEntries(area).find((candidate) => candidate.id === id);
  if (!entry) throw new Error(`No check value ${id} in ${area}.json`);
  return entry;
}

/** Allowed difference for one output: |got - expected| <= this. */
export function allowedDifference(tolerance: Tolerance, output: string, expected: number): number {
  const { abs = 0, rel = 0 } = tolerance.per?.[output] ?? tolerance;
  return abs + rel * Math.abs(expected);
}

/** A computed output: by the entry's own formula, or by another sound one. */
export type Computed = { got: number | null; by: 'same-formula' | 'other-formula' };

export const same = (got: number | null): Computed => ({ got, by: 'same-formula' });
export const other = (got: number | null): Computed => ({ got, by: 'other-formula' });

export interface CheckPlan {
  area: string;
  /** Ids this plan is about; the rest of the file belongs to another test. Default: all. */
  ids?: (id: string) => boolean;
  /** By entry method, or by id where one method serves several kinds of entry: outputs computed by the product. */
  formulas: Record<string, (inputs: Record<string, Quantity>, entry: CheckEntry) => Record<string, Computed>>;
  /** Ids the product does not compute, with the reason. */
  skippedIds: Record<string, string>;
  /** By method or id, outputs the product does not compute, with the reason. */
  skippedOutputs?: Record<string, Record<string, string>>;
}

/** One test per entry, and one that fails on an entry or output that is neither judged nor skipped with a reason. */
export function runCheckPlan(plan: CheckPlan): void {
  const entries = checkEntries(plan.area).filter(({ id }) => plan.ids?.(id) ?? true);
  const judged = entries.filter(({ id }) => !(id in plan.skippedIds));
  describe(`check values: ${plan.area}`, () => {
    test('every entry is judged or skipped with a reason', () => expectComplete(plan, entries));
    test.each(judged.map((entry) => [entry.id, entry] as const))('%s', (_id, entry) => judge(plan, entry));
  });
}

const keyFor = <T>(table: Record<string, T>, { id, method }: CheckEntry): T | undefined => table[id] ?? table[method];

function expectComplete(plan: CheckPlan, entries: CheckEntry[]): void {
  expect(entries.length).toBeGreaterThan(0);
  const ids = entries.map(({ id }) => id);
  const methods = entries.map(({ method }) => method);
  expect(Object.keys(plan.skippedIds).filter((id) => !ids.includes(id))).toEqual([]);
  const known = [...ids, ...methods];
  const tables = [...Object.keys(plan.formulas), ...Object.keys(plan.skippedOutputs ?? {})];
  expect(tables.filter((key) => !known.includes(key))).toEqual([]);
  const open = entries.filter((entry) => !(entry.id in plan.skippedIds) && !keyFor(plan.formulas, entry));
  expect(open.map(({ id }) => id)).toEqual([]);
}

function judge(plan: CheckPlan, entry: CheckEntry): void {
  const computed = keyFor(plan.formulas, entry)?.(entry.inputs, entry) ?? {};
  const skipped = Object.keys(keyFor(plan.skippedOutputs ?? {}, entry) ?? {});
  const named = [...Object.keys(computed), ...skipped].sort();
  expect(named, 'outputs judged or skipped').toEqual(Object.keys(entry.expected).sort());
  expect(Object.keys(computed).length).toBeGreaterThan(0);
  for (const [output, value] of Object.entries(computed)) judgeOutput(entry, output, value);
}

function judgeOutput(entry: CheckEntry, output: string, { got, by }: Computed): void {
  const tolerance = by === 'same-formula' ? entry.tolerance : entry.product_tolerance;
  if (!tolerance) throw new Error(`${entry.id} has no product_tolerance to judge another formula by`);
  const expected = entry.expected[output]?.value as number;
  expect(typeof got, `${entry.id} ${output}`).toBe('number');
  expect(Math.abs((got as number) - expected), `${entry.id} ${output}: ${got} for ${expected}`).toBeLessThanOrEqual(
    allowedDifference(tolerance, output, expected),
  );
}
