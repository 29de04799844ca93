/** Numbers as they stand in a file: which decimal sign, and what a cell says. */

/** `comma`: 12,5 and 1.234,5 as many European spreadsheets write them. */
export type DecimalSign = 'point' | 'comma';

export type NumberReading = { value: number; grouped: boolean } | { reason: string };

const POINT_NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d{1,3})?$/i;
const COMMA_NUMBER = /^[+-]?(\d+,?\d*|,\d+)(e[+-]?\d{1,3})?$/i;
const GROUPED_BY_POINTS = /^[+-]?[1-9]\d{0,2}(\.\d{3})+(,\d+)?$/;
const GROUPED_BY_COMMAS = /^[+-]?[1-9]\d{0,2}(,\d{3})+(\.\d+)?$/;
const MAX_NUMBER_LENGTH = 40;
const DECIMALS_KEPT = 1e9;

/**
 * The value to nine decimals, the precision a pass file is read to: finer than any instrument, and coarse enough that a change of
 * units and back gives the same number.
 */
export function toNineDecimals(value: number): number {
  const scaled = Math.round(value * DECIMALS_KEPT);
  return Number.isSafeInteger(scaled) ? scaled / DECIMALS_KEPT + 0 : value;
}

/**
 * The decimal sign of a file whose cells are not divided by commas: what its number cells show most clearly. A cell such as 9,350 or 1.234 is no
 * clear sign either way; a comma counts when nothing is clear.
 */
export function decimalSignOf(cells: Iterable<string>): DecimalSign {
  let clear = 0;
  let anyComma = false;
  for (const cell of cells) {
    const evidence = commaEvidence(cell);
    clear += evidence;
    anyComma ||= evidence === 0 && GROUPED_BY_COMMAS.test(cell);
  }
  if (clear !== 0) return clear > 0 ? 'comma' : 'point';
  return anyComma ? 'comma' : 'point';
}

/** 1 when the cell clearly has a decimal comma, -1 when clearly a decimal point, 0 when it shows neither. */
function commaEvidence(cell: string): number {
  if (!/[.,]/.test(cell)) return 0;
  if (GROUPED_BY_POINTS.test(cell)) return cell.includes(',') ? 1 : 0;
  if (POINT_NUMBER.test(cell)) return -1;
  if (GROUPED_BY_COMMAS.test(cell)) return cell.includes('.') ? -1 : 0;
  return COMMA_NUMBER.test(cell) ? 1 : 0;
}

/** Reads one cell. `grouped` tells that points were taken as thousands separators, which the reader has to be told. */
export function readNumber(cell: string, sign: DecimalSign): NumberReading {
  // The typographic minus is what some spreadsheets write.
  const text = cell.replace('\u2212', '-');
  if (text.length > MAX_NUMBER_LENGTH) return { reason: `"${shorten(cell)}" is not a number.` };
  const reading = sign === 'comma' ? readWithComma(text) : readWithPoint(text);
  if ('value' in reading && !Number.isFinite(reading.value)) return { reason: `"${shorten(cell)}" is too large.` };
  return reading;
}

function readWithPoint(text: string): NumberReading {
  if (POINT_NUMBER.test(text)) return { value: Number(text), grouped: false };
  if (GROUPED_BY_COMMAS.test(text)) {
    return { reason: `"${text}" can be read in two ways. Write it without a comma, with a point as the decimal sign.` };
  }
  if (COMMA_NUMBER.test(text)) {
    return {
      reason: `"${text}" has a decimal comma. Use a point, or decimal commas throughout with ";" between cells.`,
    };
  }
  return notANumber(text);
}

function readWithComma(text: string): NumberReading {
  if (GROUPED_BY_POINTS.test(text)) {
    return { value: Number(text.replaceAll('.', '').replace(',', '.')), grouped: true };
  }
  if (COMMA_NUMBER.test(text)) return { value: Number(text.replace(',', '.')), grouped: false };
  if (POINT_NUMBER.test(text))
    return { reason: `"${text}" has a decimal point in a file of decimal commas. Use one sign.` };
  return notANumber(text);
}

const notANumber = (text: string): NumberReading => ({
  reason: `"${shorten(text)}" is not a number. Write digits only, or leave the cell blank when it was not measured.`,
});

export const shorten = (text: string): string => (text.length > 40 ? `${text.slice(0, 39)}…` : text);
