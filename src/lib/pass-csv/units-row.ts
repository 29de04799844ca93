import type { BoundColumn, Header } from './header';
import type { RawRow } from './tokenize';

/** Ways a units row writes the units of our columns, by the suffix they stand for. */
const UNIT_WORDS: Readonly<Record<string, readonly string[]>> = {
  f: ['f', 'degf', 'fahrenheit'],
  c: ['c', 'degc', 'celsius'],
  inhg: ['inhg', 'in.hg'],
  hpa: ['hpa', 'mbar', 'mb'],
  kpa: ['kpa'],
  ft: ['ft', 'feet'],
  m: ['m', 'meters', 'metres'],
  mph: ['mph', 'mi/h'],
  kmh: ['km/h', 'kmh', 'kph'],
  lb: ['lb', 'lbs', 'lbf'],
  kg: ['kg', 'kgf'],
  psi: ['psi'],
};

/** Units whose columns have no twin: they only show that the row is one of units. */
const OTHER_UNIT_WORDS: readonly string[] = [
  '%',
  'pct',
  'percent',
  's',
  'sec',
  'seconds',
  'g',
  'rpm',
  'deg',
  'degrees',
];

/** Whether the row under the header names units: a unit in at least one number column, and no digit in any of them or in the time. */
export function isUnitsRow(row: RawRow, header: Header): boolean {
  if (row.fault !== null) return false;
  const cells = header.columns
    .filter(({ meaning }) => meaning.kind !== 'text' || meaning.field === 'date_time')
    .map(({ index }) => row.cells[index] ?? '');
  return cells.every((cell) => !/\d/.test(cell)) && cells.some(isUnitWord);
}

const isUnitWord = (cell: string): boolean => suffixOf(cell) !== null || OTHER_UNIT_WORDS.includes(bareWord(cell));

/** A message when the units row says another unit than the column's name; null when they agree or it cannot be told. */
export function unitsRowProblem(row: RawRow, header: Header): string | null {
  for (const column of header.columns) {
    const said = suffixOf(row.cells[column.index] ?? '');
    const named = namedSuffix(column);
    if (said && named && said !== named) {
      return `The units row says "${row.cells[column.index]}" for the column ${column.name}. Rename the column to end in _${said}, or correct the units row.`;
    }
  }
  return null;
}

function suffixOf(cell: string): string | null {
  return Object.entries(UNIT_WORDS).find(([, words]) => words.includes(bareWord(cell)))?.[0] ?? null;
}

const bareWord = (cell: string): string => cell.toLowerCase().replace(/[\s()[\]°_]/g, '');

function namedSuffix({ name, meaning }: BoundColumn): string | null {
  if (meaning.kind === 'text') return null;
  const suffix = name.slice(name.lastIndexOf('_') + 1);
  return Object.hasOwn(UNIT_WORDS, suffix) ? suffix : null;
}
