/** An import in words, shared by the page and its island. */
import type { ImportPlan } from '@/lib/server/passes';

const passes = (n: number): string => (n === 1 ? '1 pass' : `${n} passes`);
const rows = (n: number): string => (n === 1 ? '1 row' : `${n} rows`);

/** "168 passes will be added. 3 rows are refused. 12 passes are in your log already." */
export function planSummary({ added, refused, duplicates }: ImportPlan['counts']): string[] {
  return [
    added > 0 ? `${passes(added)} will be added.` : 'Nothing will be added.',
    refused > 0 ? `${rows(refused)} ${refused === 1 ? 'is' : 'are'} refused.` : '',
    duplicates > 0
      ? `${passes(duplicates)} ${duplicates === 1 ? 'is' : 'are'} in your log already and stay as they are.`
      : '',
  ].filter(Boolean);
}

export const addLabel = (added: number): string => `Add ${passes(added)}`;

export const keepGoodLabel = ({ added, refused }: ImportPlan['counts']): string =>
  `Add the ${passes(added)} that can be read and leave out the ${rows(refused)} that cannot`;

export const addedText = (added: number, there: number): string =>
  [`${passes(added)} added.`, there > 0 ? `${passes(there)} were in your log already.` : ''].filter(Boolean).join(' ');
