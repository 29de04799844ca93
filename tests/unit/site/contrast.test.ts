import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Relative luminance and contrast ratio: W3C, Web Content Accessibility Guidelines 2.2, "relative luminance", "contrast ratio". */
function luminance(hex: string): number {
  const [r = 0, g = 0, b = 0] = [1, 3, 5].map((i) => {
    const channel = Number.parseInt(hex.slice(i, i + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

function contrast(one: string, other: string): number {
  const [low = 0, high = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (high + 0.05) / (low + 0.05);
}

const css = readFileSync(new URL('../../../src/styles/global.css', import.meta.url), 'utf8');
const pairs = [...css.matchAll(/--([\w-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\);/g)];
const themes = {
  day: new Map(pairs.map(([, name = '', day = '']) => [name, day])),
  night: new Map(pairs.map(([, name = '', , night = '']) => [name, night])),
};
type Theme = keyof typeof themes;

const color = (theme: Theme, name: string): string => {
  const value = themes[theme].get(name);
  if (!value) throw new Error(`There is no token --${name}.`);
  return value;
};
const ratio = (theme: Theme, one: string, other: string) => contrast(color(theme, one), color(theme, other));

const GROUNDS = ['page', 'paper', 'paper-2'];
const TEXTS = ['ink', 'ink-2', 'below-ink', 'band-ink', 'above-ink', 'danger', 'warn', 'ok', 'info'];

describe.each(['day', 'night'] as const)('the %s theme', (theme) => {
  it.each(TEXTS)('writes --%s at 7:1 or better on every ground', (text) => {
    for (const ground of GROUNDS) expect(ratio(theme, text, ground), ground).toBeGreaterThanOrEqual(7);
  });

  it('writes at 7:1 or better on asphalt', () => {
    for (const text of ['on-asphalt', 'on-asphalt-2'])
      expect(Math.min(ratio(theme, text, 'asphalt'), ratio(theme, text, 'groove'))).toBeGreaterThanOrEqual(7);
  });

  it('draws control borders, and the marks outside the band, at 3:1 or better', () => {
    for (const mark of ['rule', 'below', 'above'])
      for (const ground of GROUNDS)
        expect(ratio(theme, mark, ground), `${mark} on ${ground}`).toBeGreaterThanOrEqual(3);
  });

  it('keeps the three marks apart in lightness, for eyes that do not tell their hues', () => {
    expect(ratio(theme, 'band', 'below')).toBeGreaterThan(1.5);
    expect(ratio(theme, 'band', 'above')).toBeGreaterThan(1.5);
  });
});

it('knows the contrast of black on white', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
});
