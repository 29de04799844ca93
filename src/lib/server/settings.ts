import type { Adjustable, Settings } from '@/lib/domain/types';
import { validationError } from './errors';

/** Settings against what can be set on the car. Values are in each adjustable's own unit. */

/** Throws VALIDATION for a key that is none of the car's; `alsoKnown` keys are let through (adjustables since archived). */
export function refuseUnknownKeys(
  settings: Readonly<Record<string, unknown>>,
  adjustables: readonly Adjustable[],
  field: string,
  alsoKnown: Settings = {},
): void {
  const known = new Set([...adjustables.map((one) => one.key), ...Object.keys(alsoKnown)]);
  const unknown = Object.keys(settings).filter((key) => !known.has(key));
  if (unknown.length === 0) return;
  const list = adjustables.map((one) => one.key).join(', ') || 'none yet';
  const message = `The car has no adjustable ${unknown.join(', ')}. It has: ${list}.`;
  throw validationError(message, Object.fromEntries(unknown.map((key) => [`${field}.${key}`, message])));
}

/** Throws VALIDATION naming every adjustable of the car that has no value. */
export function refuseMissingKeys(settings: Settings, adjustables: readonly Adjustable[], field: string): void {
  const missing = adjustables.filter((one) => settings[one.key] === undefined);
  if (missing.length === 0) return;
  const message = `Enter a value for ${missing.map((one) => `${one.label} (${one.key})`).join(', ')}.`;
  throw validationError(
    message,
    Object.fromEntries(missing.map((one) => [`${field}.${one.key}`, `Enter a value for ${one.label}.`])),
  );
}

/** One plain sentence for each value outside the team's own limits. */
export function limitWarnings(settings: Settings, adjustables: readonly Adjustable[]): string[] {
  return adjustables.flatMap((one) => {
    const value = settings[one.key];
    if (value === undefined || (value >= one.low && value <= one.high)) return [];
    const range = `${one.low} to ${one.high} ${one.unit}`.trim();
    return [`${one.label} ${value} is outside the limits your team set (${range}).`];
  });
}

const ON_GRID = 1e-6;

/** One plain sentence for each value that is no whole number of steps from its low limit nor from where it stood. */
export function gridWarnings(settings: Settings, current: Settings, adjustables: readonly Adjustable[]): string[] {
  return adjustables.flatMap((one) => {
    const value = settings[one.key];
    if (value === undefined || wholeSteps(value - one.low, one.step)) return [];
    if (wholeSteps(value - (current[one.key] ?? one.low), one.step)) return [];
    return [`${one.label} ${value} is not a whole number of steps of ${one.step} ${one.unit}`.trim().concat('.')];
  });
}

function wholeSteps(difference: number, step: number): boolean {
  const steps = difference / step;
  return Math.abs(steps - Math.round(steps)) < ON_GRID;
}
