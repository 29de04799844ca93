/** The columns of a pass file, explained from the same table that reads it. */

import type { Adjustable } from '@/lib/domain/types';
import { adjustableForms, NUMBER_COLUMNS, REQUIRED_COLUMNS, type TextField } from '@/lib/pass-csv/columns';

export interface ColumnNote {
  /** The name, then its twins. */
  names: string[];
  what: string;
  required: boolean;
}

const TEXT: Record<TextField, string> = {
  event: 'Name of the event',
  track: 'Name of the track; a new one is added',
  date_time: 'Time of the run with its offset, such as 2026-05-03T14:05-06:00',
  round: 'Q1, E2 and the like',
  lane: 'left or right',
  outcome: 'clean, shake, smoke or aborted',
  excluded: 'true for a pass that must not teach the model',
  excluded_reason: 'Why it is left out',
  notes: 'Anything worth keeping',
};

const required = new Set<string>(REQUIRED_COLUMNS);

export function columnGuide(adjustables: readonly Adjustable[]): ColumnNote[] {
  const text = Object.entries(TEXT).map(([name, what]) => ({ names: [name], what, required: required.has(name) }));
  const numbers = NUMBER_COLUMNS.map(({ title, forms }) => {
    const names = forms.map(({ name }) => name);
    return { names, what: title, required: names.some((name) => required.has(name)) };
  });
  const settings = adjustables.map((one) => ({
    names: adjustableForms(one).map(({ name }) => name),
    what: `${one.label}, in ${one.unit || 'its own unit'} for the first name`,
    required: false,
  }));
  const all = [...numbers, ...text, ...settings];
  return [...all.filter((one) => one.required), ...all.filter((one) => !one.required)];
}
