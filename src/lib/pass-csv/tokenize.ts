import { PASS_CSV_LIMITS } from './file-limits';

export type Delimiter = ',' | ';' | '\t';

/** One record of the file: its cells trimmed, or the fault that made it unreadable. */
export interface RawRow {
  /** Line where the record begins; the first line of the text is 1. */
  line: number;
  cells: string[];
  fault: string | null;
}

const STRAY_QUOTE =
  'A quotation mark is not closed, or stands inside a quoted cell without being doubled. Close it or write it twice.';
const LONG_CELL = `A cell is longer than ${PASS_CSV_LIMITS.cellLength} characters. Shorten it, or close the quotation mark that was left open.`;

interface Cursor {
  readonly text: string;
  readonly delimiter: Delimiter;
  at: number;
}

/**
 * Splits CSV text (RFC 4180; CRLF, LF or CR) into at most `maxRows` records; blank ones are left out. A record with a broken quotation mark ends at the end of its first
 * line, so that the records after it are still read.
 */
// Written here because the package on the stack, told to skip a faulty record, also drops the sound records after it.
export function tokenize(text: string, delimiter: Delimiter, maxRows: number): RawRow[] {
  const rows: RawRow[] = [];
  const cursor: Cursor = { text, delimiter, at: 0 };
  let line = 1;
  while (cursor.at < text.length && rows.length < maxRows) {
    const start = cursor.at;
    const row = readRecord(cursor, line);
    if (row.fault !== null || row.cells.some((cell) => cell !== '')) rows.push(row);
    line += countLineEnds(text, start, cursor.at);
  }
  return rows;
}

function readRecord(cursor: Cursor, line: number): RawRow {
  const start = cursor.at;
  const cells: string[] = [];
  while (true) {
    const cell = readCell(cursor);
    if ('fault' in cell) return faultyRecord(cursor, start, line, cell.fault);
    cells.push(cell.value);
    if (cursor.text[cursor.at] !== cursor.delimiter) break;
    cursor.at += 1;
  }
  skipLineEnd(cursor);
  return { line, cells, fault: null };
}

function faultyRecord(cursor: Cursor, start: number, line: number, fault: string): RawRow {
  cursor.at = endOfLine(cursor.text, start);
  skipLineEnd(cursor);
  return { line, cells: [], fault };
}

type Cell = { value: string } | { fault: string };

function readCell(cursor: Cursor): Cell {
  const { text } = cursor;
  let begin = cursor.at;
  while (text[begin] === ' ') begin += 1;
  return text[begin] === '"' ? readQuoted(cursor, begin + 1) : readPlain(cursor);
}

function readPlain(cursor: Cursor): Cell {
  const end = endOfCell(cursor, cursor.at);
  const value = cursor.text.slice(cursor.at, end).trim();
  cursor.at = end;
  return value.length > PASS_CSV_LIMITS.cellLength ? { fault: LONG_CELL } : { value };
}

function readQuoted(cursor: Cursor, begin: number): Cell {
  const close = closingQuote(cursor.text, begin);
  if (close === 'too-long') return { fault: LONG_CELL };
  if (close === null) return { fault: STRAY_QUOTE };
  const end = endOfCell(cursor, close + 1);
  if (cursor.text.slice(close + 1, end).trim() !== '') return { fault: STRAY_QUOTE };
  cursor.at = end;
  return { value: cursor.text.slice(begin, close).replaceAll('""', '"').trim() };
}

function closingQuote(text: string, begin: number): number | null | 'too-long' {
  let from = begin;
  while (true) {
    const quote = text.indexOf('"', from);
    // Twice the limit, since every quotation mark inside is written twice.
    if ((quote < 0 ? text.length : quote) - begin > PASS_CSV_LIMITS.cellLength * 2) return 'too-long';
    if (quote < 0) return null;
    if (text[quote + 1] !== '"') return quote;
    from = quote + 2;
  }
}

function endOfCell(cursor: Cursor, from: number): number {
  let at = from;
  while (at < cursor.text.length && cursor.text[at] !== cursor.delimiter && !isLineEnd(cursor.text, at)) at += 1;
  return at;
}

function endOfLine(text: string, from: number): number {
  let at = from;
  while (at < text.length && !isLineEnd(text, at)) at += 1;
  return at;
}

const isLineEnd = (text: string, at: number): boolean => text[at] === '\n' || text[at] === '\r';

function skipLineEnd(cursor: Cursor): void {
  if (cursor.text[cursor.at] === '\r' && cursor.text[cursor.at + 1] === '\n') cursor.at += 2;
  else if (isLineEnd(cursor.text, cursor.at)) cursor.at += 1;
}

function countLineEnds(text: string, from: number, to: number): number {
  let count = 0;
  for (let at = from; at < to; at += 1) {
    if (text[at] === '\n' || (text[at] === '\r' && text[at + 1] !== '\n')) count += 1;
  }
  return count;
}
