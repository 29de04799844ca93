import type { suggestion } from '@/db/schema';
import type { Offer, Settings } from '@/lib/domain/types';
import type { DecisionInput } from '@/lib/forms/decision';
import { validationError } from '../errors';
import { gridWarnings, limitWarnings, refuseMissingKeys, refuseUnknownKeys } from '../settings';

type SuggestionRow = typeof suggestion.$inferSelect;

export interface FinalSettings {
  settings: Settings;
  offerIndex: number | null;
  /** Plain sentences: values outside the limits or between the steps. They do not stop the chief. */
  warnings: string[];
}

/** The settings a decision comes to. Throws VALIDATION naming what is missing. */
export function finalSettings(made: SuggestionRow, input: DecisionInput): FinalSettings {
  if (input.choice === 'accept') return accepted(made, input);
  if (input.reason === '') throw reasonMissing(input.choice);
  return input.choice === 'decline' ? declined(made, input) : adjusted(made, input);
}

function accepted(made: SuggestionRow, input: DecisionInput): FinalSettings {
  const { settings } = offerOf(made, input.offerIndex);
  refuseOtherSettings(input, settings);
  return { settings, offerIndex: input.offerIndex, warnings: warningsOf(made, settings) };
}

function declined(made: SuggestionRow, input: DecisionInput): FinalSettings {
  const settings = made.inputs.current;
  refuseOtherSettings(input, settings);
  return { settings, offerIndex: null, warnings: warningsOf(made, settings) };
}

function adjusted(made: SuggestionRow, input: DecisionInput): FinalSettings {
  const { adjustables } = made.inputs;
  const settings = input.finalSettings ?? {};
  refuseUnknownKeys(settings, adjustables, 'finalSettings');
  refuseMissingKeys(settings, adjustables, 'finalSettings');
  if (input.offerIndex !== null) offerOf(made, input.offerIndex);
  return { settings, offerIndex: input.offerIndex, warnings: warningsOf(made, settings) };
}

function warningsOf({ inputs }: SuggestionRow, settings: Settings): string[] {
  const { adjustables, current } = inputs;
  return [...limitWarnings(settings, adjustables), ...gridWarnings(settings, current, adjustables)];
}

function offerOf({ result }: SuggestionRow, index: number | null): Offer {
  const offer = index === null ? undefined : result.offers[index];
  if (offer) return offer;
  const message = result.offers.length
    ? `Choose the offer: offerIndex 0 to ${result.offers.length - 1}.`
    : 'This suggestion has no offer to accept. Adjust or decline it.';
  throw validationError(message, { offerIndex: message });
}

// Settings that were typed must never be dropped in silence.
function refuseOtherSettings({ choice, finalSettings: sent }: DecisionInput, settings: Settings): void {
  const other = Object.entries(sent ?? {}).some(([key, value]) => settings[key] !== value);
  if (!other) return;
  const message = `To ${choice} takes the settings as they are in the suggestion. Choose adjust to set other values.`;
  throw validationError(message, { finalSettings: message });
}

function reasonMissing(choice: 'adjust' | 'decline') {
  const message = `Give the reason to ${choice}: a few words are enough.`;
  return validationError(message, { reason: message });
}
