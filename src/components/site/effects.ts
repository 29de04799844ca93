import { formatNumber } from '@/lib/domain/display';
import type { BeliefView, Effect } from '@/lib/domain/model/belief-view';
import { percentText } from '@/lib/domain/words';
import { counted } from './numbers';

/** Beyond this many sds of the difference, belief and passes are too far apart to be called luck. */
const APART_SD = 2;

/** "+0.91 ± 0.10": slip points a step. */
export function effectText({ meanPct, sdPct }: Pick<Effect, 'meanPct' | 'sdPct'>): string {
  const size = formatNumber(Math.abs(meanPct), 2);
  const sign = meanPct < 0 ? '−' : '+';
  return `${Number(size) === 0 ? '' : sign}${size} ± ${formatNumber(sdPct, 2)}`;
}

/** What was believed and what it is now, in plain sentences: the drawing of the two curves in words. */
export function effectSentences(view: BeliefView, passesUsed: number): string[] {
  const before = view.given
    ? `You believed ${effectText(view.belief)} points a step`
    : `The belief was left open, so ${effectText(view.belief)} points a step stood in`;
  const passes = `your ${counted(passesUsed, 'pass', 'passes')}`;
  if (!view.inModel) return [`${before}; too few of ${passes} record this setting, so that is all there is.`];
  if (!view.passes) return [`${before}; ${passes} hardly say anything about it yet.`, raisesText(view)];
  const now = `with ${passes} it is ${effectText(view.now)}; ${percentText(view.shareOnBelief)} rests on the belief.`;
  return [`${before}; ${now}`, raisesText(view), ...apartText(view)];
}

const raisesText = ({ belief, now }: BeliefView): string =>
  `That one step up raises slip: ${percentText(belief.pRaises)} then, ${percentText(now.pRaises)} now.`;

function apartText({ passes, disagreement }: BeliefView): string[] {
  if (!passes || disagreement === null || Math.abs(disagreement) < APART_SD) return [];
  return [
    `The passes alone say ${effectText(passes)}, far from the belief: look at it again, or at how the setting was logged.`,
  ];
}

/** The lines of a table cell: "+0.91 ± 0.10" and "2 % on belief". */
export function effectCell(view: BeliefView | undefined): string[] {
  if (!view?.inModel) return ['too few', 'record it'];
  return [effectText(view.now), `${percentText(view.shareOnBelief)} on belief`];
}
