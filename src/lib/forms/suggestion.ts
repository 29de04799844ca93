import { z } from 'zod';
import { VALUE_LIMITS } from '@/lib/pass-csv/value-limits';
import { decimal, flag, idField, optionalDecimal } from './fields';

/** A value per adjustable key, in the adjustable's own unit; which keys must be there is the car's matter. */
export const settingsInput = z.record(
  z.string().max(40),
  decimal({ label: 'The setting', low: -1_000_000, high: 1_000_000 }),
  { error: 'Settings are a value per adjustable, such as {"launch_rpm": 7000}.' },
);

export const suggestionInput = z.object({
  carId: idField('Choose the car (carId).'),
  roundId: idField('Choose the round (roundId).'),
  readingId: idField('Choose the reading of the conditions (readingId).'),
  /** Settings as they stand in the car; when left out they are taken from the newest launch sheet or pass. */
  current: settingsInput.optional(),
  /** Working minutes until the run; null or left out: time does not limit the change. */
  minutesLeft: optionalDecimal({ label: 'Minutes left', unit: 'min', low: 0, high: 1440 }),
  runsOnDiscs: optionalDecimal({ label: 'Runs on the discs', ...VALUE_LIMITS.runsOnDiscs, integer: true }),
});

export const suggestionFilter = z.object({
  carId: idField('Choose the car (carId).'),
  limit: optionalDecimal({ label: 'limit', low: 1, high: 500, integer: true }),
});

export const forecastInput = z.object({ settings: settingsInput });

const slip = (label: string) => optionalDecimal({ label, unit: '% slip', low: 0, high: 200 });

export const ownEstimateInput = z
  .object({
    carId: idField('Choose the car (carId).'),
    roundId: idField('Choose the round (roundId).'),
    skipped: flag('skipped is true or false.').optional(),
    slipPct: slip('Your estimate of the slip'),
    lowPct: slip('The low end of your estimate'),
    highPct: slip('The high end of your estimate'),
  })
  .superRefine((input, ctx) => {
    const issue = (field: string, message: string) => ctx.addIssue({ code: 'custom', path: [field], message });
    const { slipPct, lowPct, highPct } = input;
    if (input.skipped) {
      if (slipPct !== null) issue('skipped', 'Either enter an estimate or skip it, not both.');
      return;
    }
    if (slipPct === null) return issue('slipPct', 'Enter the slip you expect, or skip the estimate.');
    if (lowPct !== null && lowPct > slipPct) issue('lowPct', 'The low end must not be above your estimate.');
    if (highPct !== null && highPct < slipPct) issue('highPct', 'The high end must not be below your estimate.');
  });

export const ownEstimateFilter = z.object({
  carId: idField('Choose the car (carId).'),
  roundId: idField('Choose the round (roundId).'),
});

export type SuggestionInput = z.output<typeof suggestionInput>;
