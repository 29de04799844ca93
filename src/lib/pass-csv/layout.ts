import type { Adjustable } from '@/lib/domain/types';
import { PASS_CSV_LIMITS } from './file-limits';
import { columnDictionary, columnName } from './header';
import { type Delimiter, type RawRow, tokenize } from './tokenize';

export const DELIMITER_NAME: Record<Delimiter, string> = { ',': 'comma', ';': 'semicolon', '\t': 'tab' };

export interface Layout {
  delimiter: Delimiter;
  header: RawRow;
  /** Records below the header that are not blank, the units row included. */
  body: RawRow[];
}

export type LayoutReading = { layout: Layout } | { fileError: string };

const NO_HEADER =
  'No header row was found. One row must name the columns: pass_no, event, track, date_time and the others, divided by commas, semicolons or tabs.';

/** Finds the delimiter and the header row by the column names they give, and splits the file. */
export function readLayout(text: string, adjustables: readonly Adjustable[]): LayoutReading {
  const best = bestHeader(text, new Set(columnDictionary(adjustables).keys()));
  if (!best) return { fileError: NO_HEADER };
  const { delimiter, header } = best;
  if (header.cells.length > PASS_CSV_LIMITS.columns) {
    return { fileError: `The file has ${header.cells.length} columns; at most ${PASS_CSV_LIMITS.columns} are read.` };
  }
  // More than the limit: lines above the header, a units row, and one to notice that there are too many.
  const maxRows = PASS_CSV_LIMITS.rows + PASS_CSV_LIMITS.headerSearchRows + 2;
  const body = tokenize(text, delimiter, maxRows).filter((row) => row.line > header.line);
  return { layout: { delimiter, header, body } };
}

interface Candidate {
  delimiter: Delimiter;
  header: RawRow;
  score: number;
}

function bestHeader(text: string, names: ReadonlySet<string>): Candidate | null {
  let best: Candidate | null = null;
  for (const delimiter of [',', ';', '\t'] as const) {
    for (const header of tokenize(text, delimiter, PASS_CSV_LIMITS.headerSearchRows)) {
      const score = header.cells.filter((cell) => names.has(columnName(cell))).length;
      if (score > (best?.score ?? 0)) best = { delimiter, header, score };
    }
  }
  return best;
}
