import type { Suggestion } from '@/lib/domain/types';
import { likelihoodPhrase, likelihoodWord, percentText } from '@/lib/domain/words';
import { offerTitle, type SettingSpec } from './settings';

/** The result in one line and one or two sentences. Never an order: what it is, how likely, against what. */
export interface Headline {
  title: string;
  lead: string;
}

export function headlineOf(suggestion: Suggestion, specs: readonly SettingSpec[]): Headline {
  const best = suggestion.offers[0];
  if (!best) return refusalHeadline(suggestion);
  const odds = best.forecast.pInBand;
  const title = `${offerTitle(best.changes, specs)}: ${likelihoodWord(odds)} in the band`;
  if (best.changes.length === 0) return { title, lead: holdLead(suggestion, odds) };
  const asItStands = suggestion.noChange ? `; as the car stands, ${percentText(suggestion.noChange.pInBand)}` : '';
  return { title, lead: `With this change slip in the band is ${likelihoodPhrase(odds)}${asItStands}.` };
}

const holdLead = (suggestion: Suggestion, odds: number): string =>
  `As the car stands, slip in the band is ${likelihoodPhrase(odds)}. ${suggestion.reasons[0] ?? ''}`.trimEnd();

function refusalHeadline(suggestion: Suggestion): Headline {
  return { title: `No change offered: ${refusalWhy(suggestion)}`, lead: suggestion.reasons.join(' ') };
}

function refusalWhy({ status, passesUsed, passesNeeded, outsideVariables }: Suggestion): string {
  if (status === 'too_few_passes') return `${morePasses(passesUsed, passesNeeded)} needed`;
  if (status === 'outside_experience') return `${listed(outsideVariables) || 'conditions'} outside your passes`;
  if (status === 'missing_input') return 'something is not known';
  return 'the model has nothing to go on';
}

export function morePasses(used: number, needed: number): string {
  const more = Math.max(1, needed - used);
  return `${more} more ${more === 1 ? 'pass' : 'passes'}`;
}

/** "a, b and c" */
export function listed(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
