import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { frequencyText, LIKELIHOOD_TERMS, likelihoodPhrase, likelihoodWord, percentText } from '@/lib/domain/words';

const probability = fc.double({ min: 0, max: 1, noNaN: true });

/** Mastrandrea et al., IPCC guidance note on uncertainties (2010), Table 1, retyped here: term, percent from, percent to. */
const PUBLISHED: readonly (readonly [string, number, number])[] = [
  ['virtually certain', 99, 100],
  ['very likely', 90, 100],
  ['likely', 66, 100],
  ['about as likely as not', 33, 66],
  ['unlikely', 0, 33],
  ['very unlikely', 0, 10],
  ['exceptionally unlikely', 0, 1],
];

describe('likelihood words', () => {
  test('are the published terms with the published ranges, none added or left out', () => {
    const ours = LIKELIHOOD_TERMS.map(({ word, low, high }) => [word, low * 100, high * 100]);
    expect(ours).toEqual(PUBLISHED.map((row) => [...row]));
  });

  test.each([
    [1, 'virtually certain'],
    [0.99, 'virtually certain'],
    [0.9899, 'very likely'],
    [0.9, 'very likely'],
    [0.8999, 'likely'],
    [0.66, 'likely'],
    [0.6599, 'about as likely as not'],
    [0.5, 'about as likely as not'],
    [0.3301, 'about as likely as not'],
    [0.33, 'unlikely'],
    [0.1001, 'unlikely'],
    [0.1, 'very unlikely'],
    [0.0101, 'very unlikely'],
    [0.01, 'exceptionally unlikely'],
    [0, 'exceptionally unlikely'],
  ] as const)('%f is "%s"', (p, word) => expect(likelihoodWord(p)).toBe(word));

  test('never say a word whose published range does not hold the probability', () => {
    fc.assert(
      fc.property(probability, (p) => {
        const row = PUBLISHED.find(([word]) => word === likelihoodWord(p));
        return row !== undefined && p * 100 >= row[1] - 1e-9 && p * 100 <= row[2] + 1e-9;
      }),
    );
  });

  test('take rounding noise around 0 and 1, and refuse what is not a number', () => {
    expect(likelihoodWord(1 + 1e-15)).toBe('virtually certain');
    expect(likelihoodWord(-1e-15)).toBe('exceptionally unlikely');
    expect(() => likelihoodWord(Number.NaN)).toThrow(RangeError);
  });
});

describe('numbers beside the words', () => {
  test.each([
    [0.68, 'about 7 in 10'],
    [0.5, 'about 5 in 10'],
    [0.08, 'about 1 in 10'],
    [0.65, 'about 13 in 20'],
    [0.34, 'about 7 in 20'],
    [0.33, 'about 3 in 10'],
    [0.77, 'about 8 in 10'],
    [0.05, 'about 1 in 20'],
    [0.95, 'about 19 in 20'],
    [0.02, 'about 2 in 100'],
    [0.975, 'about 98 in 100'],
    [0.004, 'fewer than 1 in 100'],
    [0.996, 'more than 99 in 100'],
  ])('%f is %s', (p, text) => expect(frequencyText(p)).toBe(text));

  test('stay within five points of the probability they stand for', () => {
    fc.assert(
      fc.property(probability, (p) => {
        const [, n, of] = /(\d+) in (\d+)/.exec(frequencyText(p)) ?? [];
        return Math.abs(Number(n) / Number(of) - p) <= 0.05 + 1e-9;
      }),
    );
  });

  test('never promise nor rule out: no 0 in anything, no everything in anything', () => {
    fc.assert(
      fc.property(probability, (p) => {
        const [, n, of] = /(\d+) in (\d+)/.exec(frequencyText(p)) ?? [];
        return Number(n) > 0 && Number(n) < Number(of) && !/^(0|100) %/.test(percentText(p));
      }),
    );
  });

  test('percent rounds to whole numbers', () => {
    expect([0.684, 0.686, 0.004, 0.996].map(percentText)).toEqual(['68 %', '69 %', 'under 1 %', 'over 99 %']);
  });

  test('the phrase has word, count and percent', () => {
    expect(likelihoodPhrase(0.68)).toBe('likely, about 7 in 10 (68 %)');
    expect(likelihoodPhrase(0.12)).toBe('unlikely, about 1 in 10 (12 %)');
  });
});
