import type { SettingChange, Settings, Suggestion } from '@/lib/domain/types';
import { percentText } from '@/lib/domain/words';
import { minutesText, offerTitle, type SettingSpec } from './settings';

/** One way to decide, as a radio button. */
export interface Way {
  value: string;
  title: string;
  note: string;
}

/** Accept one of the offers, set it by hand, or decline. */
export function waysOf(suggestion: Suggestion, specs: readonly SettingSpec[]): Way[] {
  const accepts = suggestion.offers.map((offer, i) => ({
    value: `accept:${i}`,
    title: acceptTitle(offer.changes, specs),
    note: `${percentText(offer.forecast.pInBand)} in the band${offer.minutes > 0 ? `, ${minutesText(offer.minutes)}` : ''}`,
  }));
  const offered = accepts.length > 0;
  return [
    ...accepts,
    {
      value: 'adjust',
      title: offered ? 'Adjust: other settings' : 'Set it yourself',
      note: offered ? 'Move the settings and watch the odds. Needs a reason.' : 'Your own settings. Needs a reason.',
    },
    {
      value: 'decline',
      title: offered ? 'Decline: run it as it stands' : 'Run it as it stands',
      note: 'Nothing is changed on the car. Needs a reason.',
    },
  ];
}

const acceptTitle = (changes: readonly SettingChange[], specs: readonly SettingSpec[]): string =>
  `Accept: ${changes.length === 0 ? 'no change' : lowerFirst(offerTitle(changes, specs))}`;

const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);

/** What the adjust fields start from: the best offer, or the car as it stands when nothing is offered. */
export const startOf = (suggestion: Suggestion, current: Settings): Settings =>
  suggestion.offers[0]?.settings ?? current;

/** What the decision verb takes, from what the form posts: one radio says both the choice and the offer. */
export function decisionOf(raw: Record<string, unknown>): Record<string, unknown> {
  const { pick, adjustFrom, finalSettings, reason, notes, publish } = raw;
  const [choice, offer] = typeof pick === 'string' ? pick.split(':') : [];
  const common = { choice, notes, publish };
  if (choice === 'accept') return { ...common, offerIndex: offer };
  if (choice === 'adjust') return { ...common, reason, finalSettings, offerIndex: adjustFrom };
  return { ...common, reason };
}
