import { formatNumber } from '../display';
import type { Band, Forecast } from '../types';
import { frequencyText, likelihoodPhrase, percentText } from './likelihood';

export type Zone = 'below' | 'band' | 'above';
export const ZONES = ['below', 'band', 'above'] as const satisfies readonly Zone[];

/** Where a slip lies; the edges belong to the band. */
export function zoneOf(slipPct: number, band: Band): Zone {
  if (slipPct < band.lowPct) return 'below';
  return slipPct > band.highPct ? 'above' : 'band';
}

/** "15.2 %" */
export const slipText = (pct: number): string => `${slipNumber(pct)} %`;
const slipNumber = (pct: number): string => formatNumber(pct, 1);

/** "13 to 17 %": no more decimals than the team gave. */
export const bandText = (band: Band): string => `${edge(band.lowPct)} to ${edge(band.highPct)} %`;
const edge = (pct: number): string => String(Number(pct.toFixed(2)));

export const zoneOdds = (forecast: Forecast, zone: Zone): number =>
  ({ below: forecast.pBelow, band: forecast.pInBand, above: forecast.pAbove })[zone];

/** "Below 13 %", "In the band, 13 to 17 %", "Above 17 %" */
export function zoneLabel(zone: Zone, band: Band): string {
  if (zone === 'band') return `In the band, ${bandText(band)}`;
  return zone === 'below' ? `Below ${edge(band.lowPct)} %` : `Above ${edge(band.highPct)} %`;
}

/** Where the slip should land and which way a miss goes, as one would say it in the pit. */
export function oddsSentence(forecast: Forecast, band: Band): string {
  const { pBelow, pInBand, pAbove } = forecast;
  return `In the band of ${bandText(band)}: ${likelihoodPhrase(pInBand)}. ${missSentence(pBelow, pAbove)}`;
}

/** Misses closer than this to each other are called even. */
const EVEN_WITHIN = 0.05;

function missSentence(pBelow: number, pAbove: number): string {
  if (Math.abs(pBelow - pAbove) < EVEN_WITHIN) {
    return `A miss is as good as even: under it ${percentText(pBelow)}, over it ${percentText(pAbove)}.`;
  }
  const [more, less] = pAbove > pBelow ? ['over', 'under'] : ['under', 'over'];
  const [high, low] = [Math.max(pBelow, pAbove), Math.min(pBelow, pAbove)];
  return `A miss is more often ${more} it (${percentText(high)}) than ${less} it (${percentText(low)}).`;
}

export interface Interval {
  /** Share of outcomes inside, 0-1. */
  share: number;
  lowPct: number;
  highPct: number;
}

const INTERVAL_ENDS = [
  { share: 0.5, low: '0.25', high: '0.75' },
  { share: 0.8, low: '0.1', high: '0.9' },
  { share: 0.95, low: '0.025', high: '0.975' },
] as const;

export type Intervals = readonly [Interval, Interval, Interval];

/** The 50, 80 and 95 % intervals of a forecast, in that order. Throws when a quantile is not there. */
export function intervalsOf(forecast: Forecast): Intervals {
  return INTERVAL_ENDS.map(({ share, low, high }) => ({
    share,
    lowPct: quantile(forecast, low),
    highPct: quantile(forecast, high),
  })) as unknown as Intervals;
}

/** The middle of a forecast: half the outcomes lie on either side. */
export const medianOf = (forecast: Forecast): number => quantile(forecast, '0.5');

function quantile(forecast: Forecast, key: string): number {
  const value = forecast.quantiles[key];
  if (value === undefined) throw new Error(`The forecast has no quantile ${key}.`);
  return value;
}

/** "13.1 to 18.0 %" */
export const intervalText = ({ lowPct, highPct }: Interval): string => `${slipNumber(lowPct)} to ${slipText(highPct)}`;

/** "8 times in 10" for the 80 % interval: how often slip should land inside. */
export const intervalName = ({ share }: Interval): string =>
  share === 0.5 ? 'Half the time' : capital(frequencyText(share).replace('about ', '').replace(' in ', ' times in '));

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** The dotplot in words: "20 equally likely outcomes: 3 below 13 %, 12 in the band, 5 above 17 %; middle 15.2 %." */
export function dotplotText(forecast: Forecast, band: Band): string {
  const count = (zone: Zone): number => forecast.dots.filter((dot) => zoneOf(dot, band) === zone).length;
  const parts = [
    `${count('below')} below ${edge(band.lowPct)} %`,
    `${count('band')} in the band`,
    `${count('above')} above ${edge(band.highPct)} %`,
  ];
  return `${forecast.dots.length} equally likely outcomes: ${parts.join(', ')}; middle ${slipText(medianOf(forecast))}.`;
}
