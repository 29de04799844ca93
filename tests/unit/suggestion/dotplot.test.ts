import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { layoutDotplot, sharedScale } from '@/components/suggestion/dotplot';
import type { Band, Forecast } from '@/lib/domain/types';
import { zoneOf } from '@/lib/domain/words';
import { BAND, spread } from './fixture';

const drawn = (forecast: Forecast, band: Band = BAND) => layoutDotplot(forecast, band, sharedScale([forecast], band));

const anyBand = fc
  .tuple(fc.integer({ min: 5, max: 25 }), fc.constantFrom(1, 1.5, 2, 4, 5.5, 8))
  .map(([lowPct, wide]) => ({ lowPct, highPct: lowPct + wide }));
const anyForecast = fc
  .tuple(fc.double({ min: 1, max: 60, noNaN: true }), fc.double({ min: 0.2, max: 80, noNaN: true }))
  .map(([from, wide]) => spread(from, from + wide));

describe('dotplot', () => {
  test('draws every outcome once, inside the frame, on the side of the band it belongs to', () => {
    fc.assert(
      fc.property(anyForecast, anyBand, (forecast, band) => {
        const plot = drawn(forecast, band);
        const right = plot.band.x + plot.band.width;
        const zones = plot.dots.map((dot) => {
          if (dot.x + plot.radius <= plot.band.x) return 'below';
          return dot.x - plot.radius >= right ? 'above' : 'band';
        });
        expect(zones).toEqual(forecast.dots.map((dot) => zoneOf(dot, band)));
        for (const dot of plot.dots) {
          expect(dot.x - plot.radius).toBeGreaterThanOrEqual(0);
          expect(dot.x + plot.radius).toBeLessThanOrEqual(plot.width);
          expect(dot.y - plot.radius).toBeGreaterThanOrEqual(0);
          expect(dot.y + plot.radius).toBeLessThanOrEqual(plot.axisY);
        }
      }),
    );
  });

  test('no two dots lie on each other', () => {
    fc.assert(
      fc.property(anyForecast, anyBand, (forecast, band) => {
        const { dots, radius } = drawn(forecast, band);
        dots.forEach((dot, i) => {
          for (const other of dots.slice(i + 1)) {
            expect(Math.hypot(dot.x - other.x, dot.y - other.y)).toBeGreaterThanOrEqual(2 * radius);
          }
        });
      }),
    );
  });

  test('both edges of the band are named under the axis, and no labels run into each other', () => {
    fc.assert(
      fc.property(anyForecast, anyBand, (forecast, band) => {
        const { ticks } = drawn(forecast, band);
        expect(ticks.filter((tick) => tick.edge)).toHaveLength(2);
        const others = ticks.filter((tick) => !tick.edge);
        for (const tick of others) {
          for (const other of ticks) if (other !== tick) expect(Math.abs(other.x - tick.x)).toBeGreaterThan(16);
        }
      }),
    );
  });

  test('forecasts on one scale share the place of the band', () => {
    const forecasts = [spread(11, 16), spread(14, 26)];
    const scale = sharedScale(forecasts, BAND);
    const [one, two] = forecasts.map((forecast) => layoutDotplot(forecast, BAND, scale));
    expect(one?.band).toEqual(two?.band);
  });

  test('a far tail is drawn at the end of the axis and counted', () => {
    const plot = drawn(spread(20, 90));
    expect(plot.beyond).toBeGreaterThan(0);
    expect(plot.dots).toHaveLength(20);
  });

  test('the 50, 80 and 95 % bars lie inside each other with the middle in them', () => {
    const { bars, medianX } = drawn(spread(11, 19));
    expect(bars.map((bar) => bar.share)).toEqual([0.95, 0.8, 0.5]);
    bars.forEach((bar, i) => {
      const outer = bars[i - 1];
      if (outer) expect(bar.x).toBeGreaterThan(outer.x);
      if (outer) expect(bar.x + bar.width).toBeLessThan(outer.x + outer.width);
      expect(medianX).toBeGreaterThan(bar.x);
      expect(medianX).toBeLessThan(bar.x + bar.width);
    });
  });

  test('a band without width is refused', () => {
    expect(() => sharedScale([spread(11, 16)], { lowPct: 15, highPct: 15 })).toThrow(RangeError);
  });
});
