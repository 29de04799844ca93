import type { UnitSystem } from '@/lib/domain/display';
import type { Adjustable } from '@/lib/domain/types';
import { adjustableForms, type ColumnForm, NUMBER_COLUMNS, type NumberField, type TextField } from './columns';
import { toNineDecimals } from './numbers';
import { guardText, manyLines, oneLine, withoutControlCharacters } from './text-cells';
import { writeTime } from './time';
import type { Delimiter } from './tokenize';
import type { PassCsvData } from './types';

/** How cells and decimals are written. A comma as decimal sign needs another delimiter. */
export type ExportLayout = { delimiter: Delimiter; decimal: '.' } | { delimiter: ';' | '\t'; decimal: ',' };

const PLAIN_LAYOUT: ExportLayout = { delimiter: ',', decimal: '.' };
const LINE_END = '\r\n';
const FEWEST_DIGITS = 4;
const MOST_DIGITS = 17;

interface OutColumn {
  name: string;
  write(row: PassCsvData, layout: ExportLayout): string;
}

/**
 * Writes passes as CSV (RFC 4180, CRLF) so that parsePassCsv gives the same passes back: numbers to nine decimals of the stored unit, in as few
 * digits as say that. Text a spreadsheet would run as a formula is guarded.
 */
export function exportPassCsv(
  rows: readonly PassCsvData[],
  adjustables: readonly Adjustable[],
  units: UnitSystem,
  layout: ExportLayout = PLAIN_LAYOUT,
): string {
  const columns = outColumns(adjustables, units);
  const lines = rows.map((row) => columns.map((column) => quoted(column.write(row, layout), layout.delimiter)));
  return [columns.map(({ name }) => name), ...lines].map((cells) => cells.join(layout.delimiter) + LINE_END).join('');
}

function outColumns(adjustables: readonly Adjustable[], units: UnitSystem): OutColumn[] {
  const number = (field: NumberField) => numberColumn(field, units);
  return [
    number('passNo'),
    textColumn('event', (row) => oneLine(row.event)),
    textColumn('track', (row) => oneLine(row.track)),
    plainColumn('date_time', (row) => writeTime(row.time, row.utcOffset)),
    textColumn('round', (row) => oneLine(row.round)),
    plainColumn('lane', (row) => row.lane ?? ''),
    ...(['airTempC', 'relativeHumidity', 'stationPressurePa', 'altitudeM'] as const).map(number),
    ...(['trackTempC', 'windMps', 'windDirDeg'] as const).map(number),
    ...adjustables.map((adjustable) => settingColumn(adjustable, units)),
    ...(['runsOnDiscs', 'slipPct', 'sixtyFtS', 'threeThirtyFtS', 'eighthS', 'eighthMps'] as const).map(number),
    plainColumn('outcome', (row) => row.outcome ?? ''),
    textColumn('notes', (row) => manyLines(row.notes)),
    ...(['dewPointC', 'wetBulbC', 'altimeterPa', 'thousandFtS', 'quarterS', 'quarterMps'] as const).map(number),
    plainColumn('excluded', (row) => String(row.excluded)),
    textColumn('excluded_reason', (row) => oneLine(row.excludedReason)),
  ];
}

const plainColumn = (name: TextField, write: (row: PassCsvData) => string): OutColumn => ({ name, write });

function textColumn(name: TextField, write: (row: PassCsvData) => string): OutColumn {
  return { name, write: (row) => guardText(withoutControlCharacters(write(row)).trim()) };
}

function numberColumn(field: NumberField, units: UnitSystem): OutColumn {
  const column = NUMBER_COLUMNS.find((entry) => entry.field === field);
  const form = column?.forms.find(({ system }) => system === null || system === units);
  if (!form) throw new Error(`There is no column for ${field} in ${units} units.`);
  return { name: form.name, write: (row, layout) => writeNumber(numberOf(row, field), form, layout) };
}

function settingColumn(adjustable: Adjustable, units: UnitSystem): OutColumn {
  const [own, twin] = adjustableForms(adjustable) as [ColumnForm, ColumnForm?];
  const form = units === 'metric' && twin?.system === 'metric' ? twin : own;
  const value = (row: PassCsvData) =>
    Object.hasOwn(row.settings, adjustable.key) ? row.settings[adjustable.key] : null;
  return { name: form.name, write: (row, layout) => writeNumber(value(row) ?? null, form, layout) };
}

function numberOf(row: PassCsvData, field: NumberField): number | null {
  if (field === 'stationPressurePa') return row.pressureKind === 'station' ? row.pressurePa : null;
  if (field === 'altimeterPa') return row.pressureKind === 'altimeter' ? row.pressurePa : null;
  return row[field];
}

function writeNumber(stored: number | null, form: ColumnForm, layout: ExportLayout): string {
  if (stored === null || !Number.isFinite(stored)) return '';
  return shortest(toNineDecimals(stored), form).replace('.', layout.decimal);
}

/** The fewest digits in the column's unit that are read back as the same stored number. */
function shortest(stored: number, { unit }: ColumnForm): string {
  const value = unit.fromStored(stored);
  for (let digits = FEWEST_DIGITS; digits < MOST_DIGITS; digits += 1) {
    const rounded = Number(value.toPrecision(digits));
    if (toNineDecimals(unit.toStored(rounded)) === stored) return String(rounded);
  }
  return String(value);
}

function quoted(cell: string, delimiter: Delimiter): string {
  return cell.includes(delimiter) || /["\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
