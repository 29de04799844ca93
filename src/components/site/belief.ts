import { plain, signed } from './numbers';

export interface BeliefNumbers {
  beliefMeanPct: number | null;
  beliefSdPct: number | null;
}

/** Below this share of its mean a belief is tighter than the model-method default of 60 to 100 %. */
const TIGHT_SHARE = 0.6;

/** "−1.2 ± 0.8 points", or "left open". */
export function beliefText({ beliefMeanPct, beliefSdPct }: BeliefNumbers): string {
  if (beliefMeanPct === null || beliefSdPct === null) return 'left open';
  return `${signed(beliefMeanPct)} \u00b1 ${plain(beliefSdPct)} points`;
}

/** The belief in one plain sentence, with the range that holds about two times in three. */
export function beliefSentence({ beliefMeanPct, beliefSdPct }: BeliefNumbers, step: string): string {
  if (beliefMeanPct === null || beliefSdPct === null)
    return `Left open: what one step (${step}) does is learned from your passes alone. That takes more of them.`;
  const low = signed(round(beliefMeanPct - beliefSdPct));
  const high = signed(round(beliefMeanPct + beliefSdPct));
  return `One step up (${step}) moves slip by about ${signed(beliefMeanPct)} points; about two times in three between ${low} and ${high}.`;
}

/** A warning when the belief is so sure that passes could hardly correct it; null otherwise. */
export function tightBelief({ beliefMeanPct, beliefSdPct }: BeliefNumbers): string | null {
  if (beliefMeanPct === null || beliefSdPct === null) return null;
  if (beliefSdPct >= TIGHT_SHARE * Math.abs(beliefMeanPct)) return null;
  return 'That is a tight belief: suggestions will rest on it more than on your passes for a long time. Widen the give or take unless you have measured this effect.';
}

const round = (value: number): number => Math.round(value * 100) / 100;
