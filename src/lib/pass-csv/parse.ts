import type { Adjustable } from '@/lib/domain/types';
import { NOT_TEXT } from './decode';
import { PASS_CSV_LIMITS, tooLargeMessage } from './file-limits';
import { type Header, readHeader } from './header';
import { DELIMITER_NAME, type Layout, readLayout } from './layout';
import { NoteTally } from './note-tally';
import { type DecimalSign, decimalSignOf } from './numbers';
import { readRow } from './row';
import type { FileReading } from './row-cells';
import type { RawRow } from './tokenize';
import type { ParsedPassFile, PassCsvRow, Refusal } from './types';
import { isUnitsRow, unitsRowProblem } from './units-row';

const refuseFile = (fileError: string): ParsedPassFile => ({
  rows: [],
  refused: [],
  unknownColumns: [],
  missingColumns: [],
  notes: [],
  fileError,
});

/**
 * Reads a pass file. Never throws on bad input: what cannot be read at all is `fileError`, what cannot be a pass is in `refused`, and what was
 * understood in more than one possible way is said in `notes`.
 */
export function parsePassCsv(text: string, adjustables: readonly Adjustable[]): ParsedPassFile {
  const problem = textProblem(text);
  if (problem) return refuseFile(problem);
  const found = readLayout(text.replace(/^\uFEFF/, ''), adjustables);
  if ('fileError' in found) return refuseFile(found.fileError);
  const reading = readHeader(found.layout.header.cells, adjustables);
  if ('fileError' in reading) return refuseFile(reading.fileError);
  return readBody(found.layout, reading.header);
}

function textProblem(text: string): string | null {
  // UTF-8 has at least as many bytes as a text has UTF-16 units.
  if (text.length > PASS_CSV_LIMITS.bytes) return tooLargeMessage();
  if (text.includes('\0')) return NOT_TEXT;
  return text.trim() === '' ? 'The file is empty. It needs a header row and one row for each pass.' : null;
}

function readBody(layout: Layout, header: Header): ParsedPassFile {
  const [first, ...rest] = layout.body;
  const unitsRow = first && isUnitsRow(first, header) ? first : null;
  const units = unitsRow && unitsRowProblem(unitsRow, header);
  if (units) return refuseFile(units);
  const body = unitsRow ? rest : layout.body;
  if (body.length === 0) return refuseFile('There is no pass below the header row.');
  if (body.length > PASS_CSV_LIMITS.rows) {
    return refuseFile(`The file has more than ${PASS_CSV_LIMITS.rows} rows. Split it by season or event.`);
  }
  const sign = layout.delimiter === ',' ? 'point' : decimalSignOf(numberCells(body, header));
  const file: FileReading = { header, sign, tally: new NoteTally() };
  const { rows, refused } = readRows(body, file);
  return {
    rows,
    refused,
    unknownColumns: header.unknownColumns,
    missingColumns: header.missingColumns,
    notes: [...layoutNotes(layout, sign, unitsRow), ...file.tally.sentences()],
    fileError: null,
  };
}

function* numberCells(body: readonly RawRow[], header: Header): Generator<string> {
  const columns = header.columns.filter(({ meaning }) => meaning.kind !== 'text');
  for (const row of body) {
    for (const { index } of columns) yield row.cells[index] ?? '';
  }
}

function readRows(body: readonly RawRow[], file: FileReading): { rows: PassCsvRow[]; refused: Refusal[] } {
  const rows: PassCsvRow[] = [];
  const refused: Refusal[] = [];
  const rowOfPass = new Map<string, number>();
  for (const raw of body) {
    const row = readRow(raw, file, refused);
    if (!row) continue;
    const key = `${row.passNo} ${row.time}`;
    const earlier = rowOfPass.get(key);
    if (earlier === undefined) {
      rowOfPass.set(key, row.rowNumber);
      rows.push(row);
    } else {
      refused.push({ row: raw.line, column: 'pass_no', reason: `This is the same pass as row ${earlier}.` });
    }
  }
  return { rows, refused };
}

function layoutNotes(layout: Layout, sign: DecimalSign, unitsRow: RawRow | null): string[] {
  const { delimiter, header } = layout;
  const notes: string[] = [];
  if (delimiter !== ',') notes.push(`The cells are divided by a ${DELIMITER_NAME[delimiter]}.`);
  if (sign === 'comma') notes.push('A comma is the decimal sign: 1,5 is one and a half.');
  if (header.line > 1) notes.push(`The header row is line ${header.line}; the lines above it were skipped.`);
  if (unitsRow) notes.push(`Line ${unitsRow.line} names units and was skipped.`);
  return notes;
}
