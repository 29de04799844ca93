/** Reads the cells of one row by meaning, collecting a refusal per column. */
import { MAX_SETTING_MAGNITUDE } from '@/lib/domain/adjustables-json';
import type { Limit } from '@/lib/domain/air/limits';
import type { Adjustable } from '@/lib/domain/types';
import type { ColumnForm, NumberColumn, NumberField, TextField } from './columns';
import type { BoundColumn, Header } from './header';
import type { NoteTally } from './note-tally';
import { type DecimalSign, readNumber, toNineDecimals } from './numbers';
import type { RawRow } from './tokenize';
import type { Refusal } from './types';

/** What holds for every row of a file. */
export interface FileReading {
  header: Header;
  sign: DecimalSign;
  tally: NoteTally;
}

/** One row's values by meaning; what was blank or not understood is absent. */
export interface RowCells {
  row: number;
  texts: ReadonlyMap<TextField, string>;
  numbers: ReadonlyMap<NumberField, number>;
  /** [key, value in the adjustable's own unit]. */
  settings: readonly (readonly [string, number])[];
  /** Positions of the cells that are not blank, understood or not. */
  filled: ReadonlySet<number>;
  refuse(column: string | null, reason: string): void;
}

export function readCells(raw: RawRow, file: FileReading, refusals: Refusal[]): RowCells {
  const refuse = (column: string | null, reason: string) => void refusals.push({ row: raw.line, column, reason });
  const texts = new Map<TextField, string>();
  const numbers = new Map<NumberField, number>();
  const settings: [string, number][] = [];
  const filled = new Set<number>();
  for (const bound of file.header.columns) {
    const cell = raw.cells[bound.index] ?? '';
    if (cell === '') continue;
    filled.add(bound.index);
    const { meaning } = bound;
    if (meaning.kind === 'text') texts.set(meaning.field, cell);
    const value = meaning.kind === 'text' ? null : numberIn(cell, bound, raw.line, file, refuse);
    if (value === null) continue;
    if (meaning.kind === 'number') numbers.set(meaning.column.field, value);
    if (meaning.kind === 'setting') settings.push([meaning.adjustable.key, value]);
  }
  return { row: raw.line, texts, numbers, settings, filled, refuse };
}

function numberIn(
  cell: string,
  { name, meaning }: BoundColumn,
  row: number,
  { sign, tally }: FileReading,
  refuse: RowCells['refuse'],
): number | null {
  if (meaning.kind === 'text') return null;
  const reading = readNumber(cell, sign);
  if ('reason' in reading) return refuseCell(refuse, name, reading.reason);
  if (reading.grouped)
    tally.add(`${name} "${cell}" was read as ${reading.value}: in this file a comma is the decimal sign.`, row);
  const value = toNineDecimals(meaning.form.unit.toStored(reading.value));
  const problem =
    meaning.kind === 'number'
      ? numberProblem(value, cell, meaning.column, meaning.form, reading.value)
      : settingProblem(value, cell);
  if (problem) return refuseCell(refuse, name, problem);
  if (meaning.kind === 'setting') noteOutsideLimits(value, meaning.adjustable, row, tally);
  return value;
}

function refuseCell(refuse: RowCells['refuse'], column: string, reason: string): null {
  refuse(column, reason);
  return null;
}

function numberProblem(
  value: number,
  cell: string,
  column: NumberColumn,
  form: ColumnForm,
  asWritten: number,
): string | null {
  if (column.whole && !Number.isInteger(value))
    return `"${cell}" is not a whole number. ${column.title} counts whole ones.`;
  if (within(value, column.range)) return null;
  const [low, high] = [column.range.low, column.range.high].map((limit) => brief(form.unit.fromStored(limit)));
  const unit = form.unit.label ? ` ${form.unit.label}` : '';
  return `${column.title} of ${cell}${unit} is not possible: it must be ${low} to ${high}${unit}.${likelySlip(column, form, asWritten)}`;
}

const within = (value: number, { low, high }: Limit): boolean => value >= low && value <= high;
const brief = (value: number): string => String(Number(value.toPrecision(4)));

// A value that would be fine in another unit was most likely read in that unit.
function likelySlip(column: NumberColumn, form: ColumnForm, asWritten: number): string {
  const other = column.forms.find(
    (candidate) => candidate !== form && within(candidate.unit.toStored(asWritten), column.range),
  );
  return other ? ` It looks like ${other.unit.label}: then name the column ${other.name}.` : '';
}

function settingProblem(value: number, cell: string): string | null {
  return Math.abs(value) <= MAX_SETTING_MAGNITUDE ? null : `"${cell}" is too large for a setting.`;
}

function noteOutsideLimits(value: number, adjustable: Adjustable, row: number, tally: NoteTally): void {
  const { key, low, high } = adjustable;
  if (value < low || value > high)
    tally.add(`${key} is outside its limits of ${low} to ${high}; kept as history.`, row);
}
