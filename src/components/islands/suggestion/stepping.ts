import { type SettingSpec, settingInput } from '@/components/suggestion/settings';
import { parseDecimal } from '@/lib/domain/decimal';
import type { Settings } from '@/lib/domain/types';

/** What the inputs hold, as typed, by adjustable key. */
export type Typed = Readonly<Record<string, string>>;

export const typedOf = (settings: Settings, specs: readonly SettingSpec[]): Typed =>
  Object.fromEntries(
    specs.map((spec) => {
      const value = settings[spec.key];
      return [spec.key, value === undefined ? '' : settingInput(value, spec)];
    }),
  );

/** One step up (1) or down (-1) from what is typed; null when that is no number or the step would leave the limits. */
export function stepped(text: string, spec: SettingSpec, direction: 1 | -1): string | null {
  const value = parseDecimal(text);
  if (value === null) return null;
  const next = Number((value + direction * spec.step).toFixed(6));
  const leaves = direction === 1 ? next > spec.high + 1e-9 : next < spec.low - 1e-9;
  return leaves ? null : settingInput(next, spec);
}

/** All settings as numbers; null while any of them cannot be read. */
export function settingsOf(typed: Typed, specs: readonly SettingSpec[]): Settings | null {
  const entries = specs.map((spec) => [spec.key, parseDecimal(typed[spec.key] ?? '')] as const);
  if (entries.some(([, value]) => value === null)) return null;
  return Object.fromEntries(entries) as Settings;
}

/** Names the limit a value breaks; null when it is inside or not a number. */
export function limitText(text: string, spec: SettingSpec): string | null {
  const value = parseDecimal(text);
  if (value === null || (value >= spec.low && value <= spec.high)) return null;
  const side = value > spec.high ? 'above the high' : 'below the low';
  const limit = value > spec.high ? spec.high : spec.low;
  return `${side} limit of ${settingInput(limit, spec)} ${spec.unit}`.trimEnd();
}

/** Working minutes of everything that differs between two settings. */
export function minutesBetween(from: Settings, to: Settings, specs: readonly SettingSpec[]): number {
  return specs.filter((spec) => from[spec.key] !== to[spec.key]).reduce((sum, spec) => sum + spec.minutes, 0);
}
