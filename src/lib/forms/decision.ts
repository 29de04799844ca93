import { z } from 'zod';
import { choice, flag, optionalDecimal, optionalText } from './fields';
import { settingsInput } from './suggestion';

export const decisionInput = z.object({
  choice: choice(['accept', 'adjust', 'decline'], 'Choose accept, adjust or decline.'),
  /** Position of the offer that is accepted or adjusted from, counted from 0. */
  offerIndex: optionalDecimal({ label: 'The offer', low: 0, high: 20, integer: true }),
  finalSettings: settingsInput.optional(),
  reason: optionalText('The reason', 1000),
  /** For the launch sheet: what the driver and the crew should know. */
  notes: optionalText('The notes', 2000),
  publish: flag('publish is true or false.').optional(),
});

export type DecisionInput = z.output<typeof decisionInput>;
