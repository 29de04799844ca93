/** Numbers in an adjustable's own unit: as precise as they are, never more. */

const MAX_DECIMALS = 4;
const MINUS = '\u2212';

/** "1,250", "0.05", "−3.5": up to four decimals, no trailing zeros, a true minus. */
export function plain(value: number): string {
  const [whole = '', fraction] = String(Number(Math.abs(value).toFixed(MAX_DECIMALS))).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return `${value < 0 ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`;
}

/** With its sign always shown, for changes and effects. Zero has none. */
export const signed = (value: number): string => (value > 0 ? `+${plain(value)}` : plain(value));

export const withUnit = (value: number, unit: string): string => (unit ? `${plain(value)} ${unit}` : plain(value));

/** "8 to 14 g". A dash between numbers could be read as a minus. */
export const span = (low: number, high: number, unit: string): string => `${plain(low)} to ${withUnit(high, unit)}`;

/** "1 car", "3 cars". */
export const counted = (n: number, one: string, many = `${one}s`): string => `${plain(n)} ${n === 1 ? one : many}`;
