import type { Adjustable, AdjustableGroup, EffectBelief } from './types';

const KEY_PATTERN = /^[a-z][a-z0-9_]{0,39}$/;
const MAX_ENTRIES = 20;
/** Keeps the search over the step grid small. */
const MAX_STEPS = 1000;
const MAX_LABEL_LENGTH = 60;
/** Settings beyond this are a typing error in any unit a team uses. */
export const MAX_SETTING_MAGNITUDE = 1_000_000;

/** The adjustables JSON was not understood; the message names the entry and the fix. */
export class AdjustablesError extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'AdjustablesError';
  }
}

type Entry = Readonly<Record<string, unknown>>;

/**
 * Reads the adjustables JSON of the commands: an array of {key, label, unit, step, low, high, minutes, group, movable,
 * effect_per_step_pct: {mean, sd} | null}. Throws AdjustablesError.
 */
export function parseAdjustables(json: unknown): Adjustable[] {
  if (!Array.isArray(json) || json.length === 0) {
    throw new AdjustablesError('The adjustables must be a JSON array with at least one entry.');
  }
  if (json.length > MAX_ENTRIES) {
    throw new AdjustablesError(`There are ${json.length} adjustables; at most ${MAX_ENTRIES} are used. Remove some.`);
  }
  const adjustables = json.map(readEntry);
  refuseRepeatedKeys(adjustables);
  return adjustables;
}

/** The same adjustables as plain JSON data, in the form parseAdjustables reads. */
export function adjustablesToJson(adjustables: readonly Adjustable[]): Record<string, unknown>[] {
  return adjustables.map(({ belief, ...rest }) => ({
    ...rest,
    effect_per_step_pct: belief ? { mean: belief.meanPct, sd: belief.sdPct } : null,
  }));
}

function readEntry(value: unknown, index: number): Adjustable {
  if (!isEntry(value)) throw new AdjustablesError(`Adjustable ${index + 1} must be an object with a key.`);
  const key = readKey(value, index);
  const where = `Adjustable ${index + 1} ("${key}")`;
  const low = readNumber(value, 'low', where);
  const high = readNumber(value, 'high', where);
  const step = readNumber(value, 'step', where);
  checkRange(where, low, high, step);
  const minutes = readNumber(value, 'minutes', where);
  if (minutes < 0) throw new AdjustablesError(`${where}: minutes is ${minutes}; give 0 or more.`);
  return {
    key,
    label: readText(value, 'label', where) || key,
    unit: readText(value, 'unit', where),
    step,
    low,
    high,
    minutes,
    group: readGroup(value, where),
    movable: readMovable(value, where),
    belief: readBelief(value, where),
  };
}

function refuseRepeatedKeys(adjustables: readonly Adjustable[]): void {
  const seen = new Set<string>();
  for (const { key } of adjustables) {
    if (seen.has(key))
      throw new AdjustablesError(`The key "${key}" is given twice. Every adjustable needs its own key.`);
    seen.add(key);
  }
}

function isEntry(value: unknown): value is Entry {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

// Own properties only: an entry must not pick up anything from Object.prototype.
const own = (entry: Entry, name: string): unknown => (Object.hasOwn(entry, name) ? entry[name] : undefined);

function readKey(entry: Entry, index: number): string {
  const key = own(entry, 'key');
  if (typeof key === 'string' && KEY_PATTERN.test(key)) return key;
  throw new AdjustablesError(
    `Adjustable ${index + 1}: the key must be lower-case letters, digits and underscores, e.g. "counterweight_g".`,
  );
}

function readNumber(entry: Entry, name: string, where: string): number {
  const value = own(entry, name);
  if (typeof value !== 'number' || !Number.isFinite(value) || Math.abs(value) > MAX_SETTING_MAGNITUDE) {
    throw new AdjustablesError(`${where}: ${name} must be a number, e.g. "${name}": 1.`);
  }
  return value;
}

function checkRange(where: string, low: number, high: number, step: number): void {
  if (low >= high) throw new AdjustablesError(`${where}: low is ${low} and high ${high}; low must be below high.`);
  if (step <= 0 || step > high - low) {
    throw new AdjustablesError(`${where}: step is ${step}; give a step above 0 that fits between low and high.`);
  }
  if ((high - low) / step > MAX_STEPS) {
    throw new AdjustablesError(`${where}: more than ${MAX_STEPS} steps from low to high. Give a larger step.`);
  }
}

function readText(entry: Entry, name: string, where: string): string {
  const value = own(entry, name) ?? '';
  if (typeof value !== 'string' || value.length > MAX_LABEL_LENGTH) {
    throw new AdjustablesError(`${where}: ${name} must be a text of at most ${MAX_LABEL_LENGTH} characters.`);
  }
  return value.trim();
}

function readGroup(entry: Entry, where: string): AdjustableGroup {
  const group = own(entry, 'group');
  if (group === 'clutch' || group === 'launch') return group;
  throw new AdjustablesError(`${where}: group must be "clutch" or "launch".`);
}

function readMovable(entry: Entry, where: string): boolean {
  const movable = own(entry, 'movable') ?? true;
  if (typeof movable !== 'boolean') throw new AdjustablesError(`${where}: movable must be true or false.`);
  return movable;
}

function readBelief(entry: Entry, where: string): EffectBelief | null {
  const effect = own(entry, 'effect_per_step_pct') ?? null;
  if (effect === null) return null;
  if (!isEntry(effect)) throw new AdjustablesError(`${where}: effect_per_step_pct must be {"mean", "sd"} or null.`);
  const meanPct = readNumber(effect, 'mean', `${where}, effect_per_step_pct`);
  const sdPct = readNumber(effect, 'sd', `${where}, effect_per_step_pct`);
  if (sdPct <= 0) throw new AdjustablesError(`${where}: the sd of effect_per_step_pct must be above 0.`);
  return { meanPct, sdPct };
}
