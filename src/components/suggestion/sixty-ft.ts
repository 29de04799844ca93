import type { SixtyFtOutlook } from '@/lib/domain/types';

/** "60 ft about 0.862 s, 8 times in 10 between 0.848 and 0.876 s"; null without a forecast, or in a suggestion made before there was one. */
export function sixtyFtText(outlook: SixtyFtOutlook | null | undefined): string | null {
  if (!outlook) return null;
  const { medianS, low80S, high80S } = outlook;
  return `60 ft about ${medianS.toFixed(3)} s, 8 times in 10 between ${low80S.toFixed(3)} and ${high80S.toFixed(3)} s.`;
}
