/** The conditions file of `suggest`: the condition columns of a pass row as JSON, plus `current` and `minutes_left`. */
import type { Adjustable, RunContext, Settings } from '@/lib/domain/types';
import { parsePassCsv, toPassRecord } from '@/lib/pass-csv';
import { CommandError } from './lib-command';

export interface RunRequest {
  context: RunContext;
  current: Settings;
  minutesLeft: number | null;
}

type Json = Readonly<Record<string, unknown>>;

const NEEDED = ['event', 'track', 'date_time'] as const;

/** Reads and checks the conditions file. Throws CommandError naming the field and the fix. */
export function readRunRequest(json: unknown, adjustables: readonly Adjustable[]): RunRequest {
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    throw new CommandError('The conditions must be a JSON object.');
  const fields = json as Json;
  const absent = NEEDED.filter((name) => fields[name] === undefined || fields[name] === '');
  if (absent.length > 0) throw new CommandError(`The conditions lack ${absent.join(', ')}.`);
  return {
    context: contextOf(fields),
    current: currentOf(fields.current, adjustables),
    minutesLeft: minutesOf(fields.minutes_left),
  };
}

// The same reader as for a pass file, so that units, limits and messages are the same.
function contextOf(fields: Json): RunContext {
  const names = Object.keys(fields).filter((n) => n !== 'current' && n !== 'minutes_left' && n !== 'pass_no');
  const header = ['pass_no', ...names].map(quoted).join(',');
  const row = ['1', ...names.map((n) => cellText(n, fields[n]))].map(quoted).join(',');
  const parsed = parsePassCsv(`${header}\n${row}\n`, []);
  if (parsed.fileError) throw new CommandError(`The conditions were not understood: ${parsed.fileError}`);
  if (parsed.refused.length > 0)
    throw new CommandError(parsed.refused.map((r) => `${r.column ?? 'conditions'}: ${r.reason}`).join('\n'));
  const { event, track, time, round, lane, conditions, runsOnDiscs } = toPassRecord(parsed.rows[0]!);
  return { event, track, time, round, lane, conditions, runsOnDiscs };
}

function cellText(name: string, value: unknown): string {
  if (value === null) return '';
  if (typeof value === 'string' || typeof value === 'number') return String(value);
  throw new CommandError(`${name} must be a number, a text or null.`);
}

const quoted = (text: string): string => `"${text.replaceAll('"', '""')}"`;

function currentOf(value: unknown, adjustables: readonly Adjustable[]): Settings {
  if (typeof value !== 'object' || value === null)
    throw new CommandError('The conditions need "current": one value per adjustable, the settings as they stand.');
  const given = value as Json;
  return Object.fromEntries(adjustables.map((a) => [a.key, settingOf(given, a)]));
}

function settingOf(given: Json, a: Adjustable): number {
  const value = Object.hasOwn(given, a.key) ? given[a.key] : undefined;
  if (typeof value === 'number' && Number.isFinite(value)) return value;
  throw new CommandError(`"current" needs a number for ${a.key} (${a.label}${a.unit ? `, in ${a.unit}` : ''}).`);
}

function minutesOf(value: unknown): number | null {
  if (value === undefined || value === null) return null;
  if (typeof value === 'number' && Number.isFinite(value) && value >= 0) return value;
  throw new CommandError('minutes_left must be a number of minutes, 0 or more.');
}
