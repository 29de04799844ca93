/** From one record of the file to a pass, or to the reasons why not. */
import { LANES, type Lane, OUTCOMES, type Outcome } from '@/lib/domain/types';
import type { NumberField, TextField } from './columns';
import { type FileReading, type RowCells, readCells } from './row-cells';
import { readReading } from './row-reading';
import { hasControlCharacters, manyLines, oneLine, unguardText } from './text-cells';
import { readTime } from './time';
import type { RawRow } from './tokenize';
import type { PassCsvRow, Refusal } from './types';
import { TEXT_LIMITS } from './value-limits';

/** Columns that may be missing at the end of a row: some spreadsheets leave out blank last cells. */
const MAY_BE_CUT_OFF: readonly TextField[] = ['notes', 'excluded_reason'];

/** Reads a record. Null when it was refused; then `refusals` has got at least one entry. */
export function readRow(raw: RawRow, file: FileReading, refusals: Refusal[]): PassCsvRow | null {
  const before = refusals.length;
  const problem = raw.fault ?? widthProblem(raw, file);
  if (problem) {
    refusals.push({ row: raw.line, column: null, reason: problem });
    return null;
  }
  const cells = readCells(raw, file, refusals);
  const row = passOf(cells, file);
  return refusals.length === before ? row : null;
}

function widthProblem(raw: RawRow, { header }: FileReading): string | null {
  if (raw.cells.slice(header.width).some((cell) => cell !== '')) {
    return `The row has ${raw.cells.length} cells and the header ${header.width}. Put quotation marks around text with the delimiter in it.`;
  }
  const cutOff = header.columns.filter(({ index }) => index >= raw.cells.length);
  const harmless = cutOff.every(({ meaning }) => meaning.kind === 'text' && MAY_BE_CUT_OFF.includes(meaning.field));
  if (harmless) return null;
  return `The row has ${raw.cells.length} cells and the header ${header.width}: it may be cut off. Add the missing cells, blank where nothing was measured.`;
}

function passOf(cells: RowCells, file: FileReading): PassCsvRow {
  const { time, utcOffset } = timeOf(cells);
  const number = (field: NumberField) => cells.numbers.get(field) ?? null;
  checkTimesInOrder(cells);
  return {
    rowNumber: cells.row,
    passNo: requiredNumber(cells, file),
    event: requiredText(cells, 'event'),
    track: requiredText(cells, 'track'),
    time,
    utcOffset,
    round: lineOf(cells, 'round'),
    lane: choiceOf<Lane>(cells, 'lane', LANES),
    ...readReading(cells, file),
    settings: Object.fromEntries(cells.settings),
    runsOnDiscs: number('runsOnDiscs'),
    slipPct: number('slipPct'),
    sixtyFtS: number('sixtyFtS'),
    threeThirtyFtS: number('threeThirtyFtS'),
    eighthS: number('eighthS'),
    eighthMps: number('eighthMps'),
    thousandFtS: number('thousandFtS'),
    quarterS: number('quarterS'),
    quarterMps: number('quarterMps'),
    outcome: choiceOf<Outcome>(cells, 'outcome', OUTCOMES),
    excluded: flagOf(cells),
    excludedReason: lineOf(cells, 'excluded_reason'),
    notes: textOf(cells, 'notes', manyLines),
  };
}

function timeOf(cells: RowCells): { time: string; utcOffset: string } {
  const cell = cells.texts.get('date_time');
  const reading = cell ? readTime(cell) : { reason: 'The date and time is blank. A pass needs one.' };
  if ('time' in reading) return reading;
  cells.refuse('date_time', reading.reason);
  return { time: '', utcOffset: '' };
}

function requiredNumber(cells: RowCells, file: FileReading): number {
  const passNo = cells.numbers.get('passNo');
  const index = file.header.columns.find(({ name }) => name === 'pass_no')?.index ?? -1;
  // A cell that was not understood has its refusal already.
  if (passNo === undefined && !cells.filled.has(index))
    cells.refuse('pass_no', 'The pass number is blank. A pass needs one.');
  return passNo ?? 0;
}

function requiredText(cells: RowCells, field: 'event' | 'track'): string {
  const text = lineOf(cells, field);
  if (text === '') cells.refuse(field, `The ${field} is blank. A pass needs one.`);
  return text;
}

type LimitedText = keyof typeof TEXT_LIMITS;
const lineOf = (cells: RowCells, field: LimitedText): string => textOf(cells, field, oneLine);

function textOf(cells: RowCells, field: LimitedText, tidy: (text: string) => string): string {
  const text = tidy(unguardText(tidy(cells.texts.get(field) ?? '')));
  if (hasControlCharacters(text)) cells.refuse(field, 'The text holds characters that cannot be shown. Retype it.');
  if (text.length > TEXT_LIMITS[field]) {
    cells.refuse(field, `The text has ${text.length} characters; keep it to ${TEXT_LIMITS[field]}.`);
  }
  return text;
}

function choiceOf<T extends string>(cells: RowCells, field: 'lane' | 'outcome', choices: readonly T[]): T | null {
  const cell = cells.texts.get(field);
  if (cell === undefined) return null;
  const choice = choices.find((entry) => entry === cell.toLowerCase());
  if (!choice) cells.refuse(field, `"${cell.slice(0, 40)}" is not one of ${choices.join(', ')}.`);
  return choice ?? null;
}

const FLAGS: ReadonlyMap<string, boolean> = new Map([
  ['true', true],
  ['yes', true],
  ['1', true],
  ['false', false],
  ['no', false],
  ['0', false],
]);

function flagOf(cells: RowCells): boolean {
  const cell = cells.texts.get('excluded');
  if (cell === undefined) return false;
  const flag = FLAGS.get(cell.toLowerCase());
  if (flag === undefined) cells.refuse('excluded', `"${cell.slice(0, 40)}" is not yes or no.`);
  return flag ?? false;
}

const TIMES_IN_ORDER = [
  ['sixtyFtS', 'sixty_ft_s'],
  ['threeThirtyFtS', 'three_thirty_ft_s'],
  ['eighthS', 'eighth_s'],
  ['thousandFtS', 'thousand_ft_s'],
  ['quarterS', 'quarter_s'],
] as const;

function checkTimesInOrder(cells: RowCells): void {
  let earlier: { column: string; value: number } | null = null;
  for (const [field, column] of TIMES_IN_ORDER) {
    const value = cells.numbers.get(field);
    if (value === undefined) continue;
    if (earlier && value <= earlier.value)
      cells.refuse(column, `${value} s is not after ${earlier.column} (${earlier.value} s).`);
    earlier = { column, value };
  }
}
