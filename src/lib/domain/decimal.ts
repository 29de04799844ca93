/** Reading a typed number. Apart from the schemas and without zod, so that an entry page can use it in the browser too. */

const PLAIN_NUMBER = /^[+-]?(\d+[.,]?\d*|[.,]\d+)$/;
const MAX_NUMBER_LENGTH = 32;

/** Reads a number as people type it: "0,5", " 12.25 ", "−3" (also with the typographic minus). Null when it is not a number. */
export function parseDecimal(text: string): number | null {
  const plain = text.trim().replace('\u2212', '-');
  if (plain.length > MAX_NUMBER_LENGTH || !PLAIN_NUMBER.test(plain)) return null;
  return Number(plain.replace(',', '.'));
}
