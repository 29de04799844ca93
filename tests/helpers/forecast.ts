/** Reads a forecast off the page as a person does: odds, intervals and the dotplot in words. */
import { expect, type Locator } from '@playwright/test';

export interface ShownForecast {
  oddsPct: number[];
  dots: { below: number; band: number; above: number };
  middlePct: number;
  /** 50, 80 and 95 %, each low and high. */
  intervals: [number, number][];
  passesUsed: number;
}

export async function readForecast(card: Locator): Promise<ShownForecast> {
  const text = ((await card.textContent()) ?? '').replaceAll(/\s+/g, ' ');
  const numbers = (pattern: RegExp): number[] => (pattern.exec(text) ?? []).slice(1).map(Number);
  const [below = Number.NaN, band = Number.NaN, above = Number.NaN] = numbers(
    /20 equally likely outcomes: (\d+) below [\d.]+ %, (\d+) in the band, (\d+) above/,
  );
  expect(below, `the dotplot in words is missing in: ${text}`).not.toBeNaN();
  return {
    oddsPct: [...text.matchAll(/(?:about|than) \d+ in \d+ \((?:under |over )?(\d+) %\)/g)].map(([, pct]) =>
      Number(pct),
    ),
    dots: { below, band, above },
    middlePct: numbers(/; middle ([\d.]+) %/)[0] ?? Number.NaN,
    intervals: [50, 80, 95].map((share) => {
      const [low = Number.NaN, high = Number.NaN] = numbers(new RegExp(`\\(${share} %\\) ?([\\d.]+) to ([\\d.]+) %`));
      return [low, high];
    }),
    passesUsed: numbers(/From (\d+) passes of your own/)[0] ?? Number.NaN,
  };
}

/** Everything a forecast must carry, and that its parts say the same. */
export async function expectWholeForecast(card: Locator): Promise<ShownForecast> {
  const shown = await readForecast(card);
  const { oddsPct, dots, middlePct, intervals } = shown;
  expect(oddsPct, 'odds below, in and above the band').toHaveLength(3);
  expect(Math.abs(oddsPct.reduce((sum, pct) => sum + pct, 0) - 100)).toBeLessThanOrEqual(2);
  const drawn = [dots.below, dots.band, dots.above];
  expect(drawn.reduce((sum, count) => sum + count, 0)).toBe(20);
  for (const [i, count] of drawn.entries()) expect(Math.abs(count * 5 - (oddsPct[i] ?? -100))).toBeLessThanOrEqual(6);
  const edges = [...intervals.map(([low]) => low).reverse(), middlePct, ...intervals.map(([, high]) => high)];
  expect(edges, '95, 80, 50 % around the middle').toEqual([...edges].sort((a, b) => a - b));
  await expectDrawn(card, dots);
  return shown;
}

// The picture and its words must be of the same outcomes.
async function expectDrawn(card: Locator, dots: ShownForecast['dots']): Promise<void> {
  const picture = card.getByRole('img', { name: 'Dotplot of slip over the band, in words below' });
  await expect(picture).toBeVisible();
  for (const [zone, count] of Object.entries(dots)) await expect(picture.locator(`.dot-${zone}`)).toHaveCount(count);
}
