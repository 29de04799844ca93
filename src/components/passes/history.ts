/** The rows of a pass told as what happened to it, the newest first. */
import type { UnitSystem } from '@/lib/domain/display';
import type { PassView } from '@/lib/server/passes';
import { changesBetween } from './facts';
import type { SettingLabel } from './pass-text';

export interface HistoryEntry {
  id: string;
  what: string;
  who: string | null;
  at: string;
  reason: string | null;
  changes: string[];
}

const FIRST = { hand: 'Logged by hand', file: 'Imported from a file', service: 'Sent by a service' } as const;

export function historyOf(
  rows: readonly PassView[],
  labels: readonly SettingLabel[],
  units: UnitSystem,
): HistoryEntry[] {
  const entries = rows.map((row, i) => entry(row, rows[i - 1] ?? null, labels, units));
  return entries.reverse();
}

function entry(
  row: PassView,
  before: PassView | null,
  labels: readonly SettingLabel[],
  units: UnitSystem,
): HistoryEntry {
  return {
    id: row.id,
    what: before ? whatHappened(row, before) : FIRST[row.source],
    who: row.enteredByName,
    at: row.createdAt,
    reason: row.correctionReason,
    changes: before ? changesBetween(before, row, labels, units) : [],
  };
}

function whatHappened(row: PassView, before: PassView): string {
  if (row.excluded === before.excluded) return 'Corrected';
  return row.excluded ? 'Left out of the model' : 'Counts again';
}
