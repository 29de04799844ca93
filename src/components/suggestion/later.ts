import { formatAbout, toDisplay, type UnitSystem } from '@/lib/domain/display';
import type { TrackTempForecast } from '@/lib/domain/model/track-temperature';
import type { Forecast } from '@/lib/domain/types';
import { intervalsOf, intervalText, likelihoodPhrase, medianOf, percentText, slipText } from '@/lib/domain/words';

/** Half the width, in sds, of what holds 8 times in 10 of a normal. */
const EIGHT_IN_TEN_SD = 1.2816;

/** "If the track cools until the run": by what is shown, not by a hair. */
export function laterTitle(nowC: number, thenC: number, units: UnitSystem): string {
  const degrees = (c: number): number => Math.round(toDisplay('trackTemperature', c, units));
  const change = degrees(thenC) - degrees(nowC);
  if (change === 0) return 'If the run is as late as planned';
  return `If the track ${change < 0 ? 'cools' : 'warms'} until the run`;
}

/** "96 °F, 8 times in 10 between 90 °F and 102 °F" */
export function trackThenText({ meanC, sdC }: TrackTempForecast, units: UnitSystem): string {
  const text = (c: number): string => formatAbout('trackTemperature', c, units);
  const [low, high] = [-1, 1].map((side) => text(meanC + side * EIGHT_IN_TEN_SD * sdC));
  return `${text(meanC)}, 8 times in 10 between ${low} and ${high}`;
}

/** The odds then beside the odds as read, and where slip would land. */
export function oddsThenText(then: Forecast, asRead: Forecast): string {
  const middle = `${slipText(medianOf(then))}, 8 times in 10 between ${intervalText(intervalsOf(then)[1]).replace(' to ', ' and ')}`;
  const before = `${percentText(asRead.pInBand)} as read`;
  return `As the car stands, slip in the band is then ${likelihoodPhrase(then.pInBand)}, against ${before}. Middle ${middle}.`;
}
