import type { Adjustable } from '@/lib/domain/types';
import {
  adjustableForms,
  type ColumnForm,
  NUMBER_COLUMNS,
  type NumberColumn,
  OPTIONAL_TEXT_COLUMNS,
  REQUIRED_COLUMNS,
  RESERVED_COLUMNS,
  TEXT_COLUMNS,
  type TextField,
} from './columns';

/** What a column of the file is read as. */
export type Meaning =
  | { kind: 'text'; field: TextField }
  | { kind: 'number'; column: NumberColumn; form: ColumnForm }
  | { kind: 'setting'; adjustable: Adjustable; form: ColumnForm };

export interface BoundColumn {
  index: number;
  /** The column's name, as refusals give it. */
  name: string;
  meaning: Meaning;
}

export interface Header {
  columns: BoundColumn[];
  /** Cells in the header row. */
  width: number;
  unknownColumns: string[];
  missingColumns: string[];
}

export type HeaderReading = { header: Header } | { fileError: string };

/** Every name the file may use, with its meaning. */
export function columnDictionary(adjustables: readonly Adjustable[]): Map<string, Meaning> {
  const dictionary = new Map<string, Meaning>();
  for (const adjustable of [...adjustables].reverse()) {
    // An adjustable's own key comes before the twin of another.
    for (const form of adjustableForms(adjustable).slice(1))
      dictionary.set(form.name, { kind: 'setting', adjustable, form });
  }
  for (const adjustable of adjustables) {
    const [form] = adjustableForms(adjustable);
    if (form) dictionary.set(form.name, { kind: 'setting', adjustable, form });
  }
  for (const column of NUMBER_COLUMNS) {
    for (const form of column.forms) dictionary.set(form.name, { kind: 'number', column, form });
  }
  for (const field of TEXT_COLUMNS) dictionary.set(field, { kind: 'text', field });
  return dictionary;
}

/** A header cell as names are compared: lower case, spaces and hyphens as underscores. */
export const columnName = (cell: string): string =>
  cell
    .trim()
    .toLowerCase()
    .replace(/[\s-]+/g, '_');

/** Maps the header row to meanings. Refuses repeated names, two columns for one quantity, and missing required ones. */
export function readHeader(cells: readonly string[], adjustables: readonly Adjustable[]): HeaderReading {
  const clash = adjustables.find(({ key }) => RESERVED_COLUMNS.has(key));
  if (clash) return { fileError: `The adjustable "${clash.key}" has the name of a pass column. Give it another key.` };
  const repeated = firstRepeated(cells.map(columnName));
  if (repeated !== null)
    return { fileError: `The column "${repeated}" is there twice. Rename or delete one of the two.` };
  const dictionary = columnDictionary(adjustables);
  const columns = cells.flatMap((cell, index): BoundColumn[] => {
    const name = columnName(cell);
    const meaning = dictionary.get(name);
    return meaning ? [{ index, name, meaning }] : [];
  });
  const twins = twinProblem(columns) ?? missingRequired(columns);
  if (twins) return { fileError: twins };
  const known = new Set(columns.map(({ index }) => index));
  const unknownColumns = cells.filter((cell, index) => cell.trim() !== '' && !known.has(index));
  return {
    header: { columns, width: cells.length, unknownColumns, missingColumns: missingColumns(columns, adjustables) },
  };
}

function firstRepeated(names: readonly string[]): string | null {
  const seen = new Set<string>();
  for (const name of names) {
    if (name !== '' && seen.has(name)) return name;
    seen.add(name);
  }
  return null;
}

/** What a column gives, whatever its unit: two columns of one quantity contradict each other sooner or later. */
export function quantityOf(meaning: Meaning): string {
  if (meaning.kind === 'text') return `text ${meaning.field}`;
  return meaning.kind === 'number' ? `number ${meaning.column.field}` : `setting ${meaning.adjustable.key}`;
}

function twinProblem(columns: readonly BoundColumn[]): string | null {
  const first = new Map<string, string>();
  for (const { name, meaning } of columns) {
    const earlier = first.get(quantityOf(meaning));
    if (earlier) return `The columns "${earlier}" and "${name}" give the same thing in two units. Keep one of them.`;
    first.set(quantityOf(meaning), name);
  }
  return null;
}

function missingRequired(columns: readonly BoundColumn[]): string | null {
  const names = new Set(columns.map(({ name }) => name));
  const missing = REQUIRED_COLUMNS.filter((name) => !names.has(name));
  if (missing.length === 0) return null;
  return `The header row has no column ${missing.join(', ')}. Needed are ${REQUIRED_COLUMNS.join(', ')}.`;
}

const HUMIDITIES = ['relativeHumidity', 'dewPointC', 'wetBulbC'].map((field) => `number ${field}`);
const PRESSURES = ['stationPressurePa', 'altimeterPa'].map((field) => `number ${field}`);

function missingColumns(columns: readonly BoundColumn[], adjustables: readonly Adjustable[]): string[] {
  const given = new Set(columns.map(({ meaning }) => quantityOf(meaning)));
  const has = (quantity: string) =>
    given.has(quantity) ||
    [HUMIDITIES, PRESSURES].some((group) => group.includes(quantity) && group.some((q) => given.has(q)));
  const numbers = NUMBER_COLUMNS.filter((column) => !column.optional && !has(`number ${column.field}`));
  const settings = adjustables.filter(({ key }) => !has(`setting ${key}`));
  const texts = TEXT_COLUMNS.filter((field) => !OPTIONAL_TEXT_COLUMNS.includes(field) && !has(`text ${field}`));
  return [
    ...texts,
    ...numbers.map((column) => column.forms[0]?.name ?? column.field),
    ...settings.map(({ key }) => key),
  ];
}
