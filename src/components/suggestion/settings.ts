import { formatNumber } from '@/lib/domain/display';
import type { Adjustable, SettingChange } from '@/lib/domain/types';

/** What these screens need to know of an adjustable. */
export type SettingSpec = Pick<Adjustable, 'key' | 'label' | 'unit' | 'step' | 'low' | 'high' | 'minutes' | 'group'>;

/** What writing a value needs. */
export type ValueSpec = Pick<Adjustable, 'unit' | 'step'>;

const MAX_DECIMALS = 4;

const decimalsOf = (value: number): number => {
  const fraction = String(Number(value.toFixed(MAX_DECIMALS))).split('.')[1];
  return fraction?.length ?? 0;
};

/** As precise as the adjustable's step, or as the value itself when it is finer: "11.0". */
export const settingNumber = (value: number, spec: ValueSpec): string =>
  formatNumber(value, Math.max(decimalsOf(spec.step), decimalsOf(value)));

/** "11.0 g" */
export const settingText = (value: number, spec: ValueSpec): string =>
  `${settingNumber(value, spec)} ${spec.unit}`.trimEnd();

/** A mean over passes, no finer than the adjustable's step: "11.3 g". */
export const usualSettingText = (value: number, spec: ValueSpec): string =>
  `${formatNumber(value, decimalsOf(spec.step))} ${spec.unit}`.trimEnd();

/** For an input field: no thousands comma. */
export const settingInput = (value: number, spec: ValueSpec): string =>
  value.toFixed(Math.max(decimalsOf(spec.step), decimalsOf(value)));

/** A key the car no longer has still has a name and a value. */
export function specOf(key: string, specs: readonly SettingSpec[]): SettingSpec {
  const known = specs.find((spec) => spec.key === key);
  return known ?? { key, label: key, unit: '', step: 0.01, low: 0, high: 0, minutes: 0, group: 'clutch' };
}

const COUNT_WORDS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];

/** "one step up", "two steps down", "12 steps up" */
export function stepsText(steps: number): string {
  const count = Math.abs(steps);
  const word = COUNT_WORDS[count] ?? String(count);
  return `${word} ${count === 1 ? 'step' : 'steps'} ${steps < 0 ? 'down' : 'up'}`;
}

/** "11.0 to 11.5 g": read aloud as well as seen. */
export const moveText = (change: SettingChange, spec: SettingSpec): string =>
  `${settingNumber(change.from, spec)} to ${settingText(change.to, spec)}`;

export const minutesText = (minutes: number): string =>
  `${formatNumber(minutes, Number.isInteger(minutes) ? 0 : 1)} min`;

/** The whole change on one line: "Counterweight 11.0 to 11.5 g, one step up, 12 min". */
export function changeText(change: SettingChange, specs: readonly SettingSpec[]): string {
  const spec = specOf(change.key, specs);
  return `${spec.label} ${moveText(change, spec)}, ${stepsText(change.steps)}, ${minutesText(change.minutes)}`;
}

/** What an offer is called: "Counterweight one step up and release delay two steps down", or "No change". */
export function offerTitle(changes: readonly SettingChange[], specs: readonly SettingSpec[]): string {
  if (changes.length === 0) return 'No change';
  const parts = changes.map((change) => `${specOf(change.key, specs).label} ${stepsText(change.steps)}`);
  const [first = '', ...rest] = parts;
  return [first, ...rest.map(lowerFirst)].join(' and ');
}

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);

/** What an offer costs against the clock: "12 min of 48 left". */
export function minutesLine(minutes: number, minutesLeft: number | null): string {
  if (minutes === 0) return 'No work';
  const cost = minutesText(minutes);
  if (minutesLeft !== null && minutes > minutesLeft) return `${cost}, more than the ${minutesText(minutesLeft)} left`;
  return minutesLeft === null ? `${cost} of work` : `${cost} of ${minutesText(minutesLeft)} left`;
}
