/**
 * Calibrated likelihood words, always with their number.
 * Source: M. D. Mastrandrea et al., Guidance Note for Lead Authors of the IPCC Fifth Assessment Report on Consistent Treatment of
 * Uncertainties, IPCC 2010, Table 1. The optional terms of its footnote ("more likely than not" and the two "extremely") are left out.
 */
export interface LikelihoodTerm {
  word: string;
  /** The published range of probability, both ends included. */
  low: number;
  high: number;
}

export const LIKELIHOOD_TERMS = [
  { word: 'virtually certain', low: 0.99, high: 1 },
  { word: 'very likely', low: 0.9, high: 1 },
  { word: 'likely', low: 0.66, high: 1 },
  { word: 'about as likely as not', low: 0.33, high: 0.66 },
  { word: 'unlikely', low: 0, high: 0.33 },
  { word: 'very unlikely', low: 0, high: 0.1 },
  { word: 'exceptionally unlikely', low: 0, high: 0.01 },
] as const satisfies readonly LikelihoodTerm[];

export type LikelihoodWord = (typeof LIKELIHOOD_TERMS)[number]['word'];

const offEven = (term: LikelihoodTerm): number => Math.abs((term.low + term.high) / 2 - 0.5);
const FARTHEST_FROM_EVEN_FIRST = [...LIKELIHOOD_TERMS].sort((a, b) => offEven(b) - offEven(a));

/** The term farthest from even odds whose published range holds `p` (0-1). Throws RangeError when `p` is not a number. */
export function likelihoodWord(p: number): LikelihoodWord {
  const clamped = Math.min(1, Math.max(0, p));
  const term = FARTHEST_FROM_EVEN_FIRST.find(({ low, high }) => clamped >= low && clamped <= high);
  if (!term) throw new RangeError('A likelihood needs a number from 0 to 1.');
  return term.word;
}

/** "68 %"; never 0 or 100, which a forecast cannot promise. */
export function percentText(p: number): string {
  const whole = Math.round(p * 100);
  if (whole < 1) return 'under 1 %';
  return whole > 99 ? 'over 99 %' : `${whole} %`;
}

/** "about 7 in 10": tenths, or twentieths halfway between them and where tenths would belong to another word; finer near the ends. */
export function frequencyText(p: number): string {
  const hundredths = Math.round(p * 100);
  if (hundredths < 1) return 'fewer than 1 in 100';
  if (hundredths > 99) return 'more than 99 in 100';
  // From the percentage that is shown, so that two odds that read alike are counted alike.
  const shown = hundredths / 100;
  return `about ${Math.round(shown * denominator(shown))} in ${denominator(shown)}`;
}

function denominator(p: number): number {
  const fromEnd = Math.min(p, 1 - p);
  if (fromEnd < 0.03) return 100;
  if (fromEnd < 0.075) return 20;
  const halfway = Math.round(p * 100) % 10 === 5;
  return (halfway || !sameWord(p, 10)) && sameWord(p, 20) ? 20 : 10;
}

// 65 % is "about as likely as not", but 7 in 10 would be "likely": then 13 in 20 says it without a contradiction.
const sameWord = (p: number, of: number): boolean => likelihoodWord(Math.round(p * of) / of) === likelihoodWord(p);

/** Word and number together: "likely, about 7 in 10 (68 %)". */
export const likelihoodPhrase = (p: number): string => `${likelihoodWord(p)}, ${frequencyText(p)} (${percentText(p)})`;
