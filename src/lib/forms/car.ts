import { z } from 'zod';
import { DEFAULT_BAND } from '@/lib/domain/types';
import { M_PER_IN, MPS_PER_KMH, MPS_PER_MPH } from '@/lib/domain/units';
import { choice, decimal, flag, optionalDecimal, optionalText, text } from './fields';
import { firstSent } from './twins';

const distance = z
  .union([z.number(), z.string()], { error: 'Choose the race distance: 660, 1000 or 1320 ft.' })
  .transform(Number)
  .refine((feet) => [660, 1000, 1320].includes(feet), 'Choose the race distance: 660, 1000 or 1320 ft.');

const ROLLOUT_M = { low: 0.5, high: 4 };
const rolloutM = (label: string) =>
  optionalDecimal({ label, unit: 'm', ...ROLLOUT_M, hint: 'It is the way rolled in one wheel turn, in meters.' });
const rolloutIn = (label: string) =>
  optionalDecimal({
    label,
    unit: 'in',
    low: 20,
    high: 157,
    hint: 'It is the way rolled in one wheel turn, in inches.',
  });
const growth = (unit: string) => optionalDecimal({ label: 'Tire growth', unit, low: 0, high: 100 });
const bandEdge = (label: string) => decimal({ label, unit: '% slip', low: 0.5, high: 80 });
const windowEdge = (label: string) => decimal({ label, unit: 's', low: 0, high: 6 });

/**
 * A car. Lengths may come in meters or in inches (`rolloutIn`), tire growth per m/s or as percent at 100 mph or 100 km/h; only
 * the SI value is stored.
 */
export const carShape = {
  name: text('The car name', 80),
  carClass: optionalText('The class', 80),
  distanceFt: distance,
  finalDriveRatio: optionalDecimal({ label: 'The final drive ratio', low: 0.5, high: 15 }),
  rolloutM: rolloutM('The tire rollout'),
  rolloutIn: rolloutIn('The tire rollout'),
  rolloutGrowthPerMps: optionalDecimal({ label: 'Tire growth', unit: 'per m/s', low: 0, high: 0.02 }),
  rolloutGrowthPctAt100Mph: growth('% at 100 mph'),
  rolloutGrowthPctAt100Kmh: growth('% at 100 km/h'),
  frontRolloutM: rolloutM('The front tire rollout'),
  frontRolloutIn: rolloutIn('The front tire rollout'),
  pulsesPerTurn: optionalDecimal({ label: 'Pulses per turn', low: 1, high: 500, integer: true }),
  bandLowPct: bandEdge('The low edge of the band'),
  bandHighPct: bandEdge('The high edge of the band'),
  slipWindowStartS: windowEdge('The start of the slip window'),
  slipWindowEndS: windowEdge('The end of the slip window'),
  sensorNote: optionalText('The sensor note', 1000),
};

export const carPatchShape = { ...carShape, archived: flag('Archived must be yes or no.') };

export const adjustableShape = {
  key: z
    .string({ error: 'The key is missing.' })
    .trim()
    .regex(/^[a-z][a-z0-9_]{0,39}$/, 'The key must be small letters, digits and _, such as counterweight_g.'),
  label: text('The label', 60),
  unit: optionalText('The unit', 16),
  step: decimal({ label: 'The step', low: 0.000001, high: 1_000_000 }),
  low: decimal({ label: 'The low limit', low: -1_000_000, high: 1_000_000 }),
  high: decimal({ label: 'The high limit', low: -1_000_000, high: 1_000_000 }),
  minutes: decimal({ label: 'Minutes to change', unit: 'min', low: 0, high: 600 }),
  group: choice(['clutch', 'launch'], 'Choose the group: clutch or launch.'),
  movable: flag('Say whether suggestions may move it: yes or no.'),
  beliefMeanPct: optionalDecimal({ label: 'The effect of one step', unit: 'slip points', low: -20, high: 20 }),
  beliefSdPct: optionalDecimal({
    label: 'The give or take of the effect',
    unit: 'slip points',
    low: 0.01,
    high: 20,
    hint: 'It cannot be zero: nobody knows an effect exactly.',
  }),
  position: decimal({ label: 'The position', low: 0, high: 1000, integer: true }),
};

export const adjustablePatchShape = { ...adjustableShape, archived: flag('Archived must be yes or no.') };

export const adjustableInput = z.object({
  ...adjustableShape,
  minutes: adjustableShape.minutes.default(0),
  movable: adjustableShape.movable.default(true),
  position: adjustableShape.position.optional(),
});

export const carInput = z.object({
  ...carShape,
  distanceFt: carShape.distanceFt.default(1000),
  bandLowPct: carShape.bandLowPct.default(DEFAULT_BAND.lowPct),
  bandHighPct: carShape.bandHighPct.default(DEFAULT_BAND.highPct),
  slipWindowStartS: carShape.slipWindowStartS.default(0.5),
  slipWindowEndS: carShape.slipWindowEndS.default(2.5),
  adjustables: z
    .array(adjustableInput, { error: 'Adjustables must be a list.' })
    .max(40, 'A car can have 40 adjustables at most.')
    .optional(),
});

type CarFields = z.output<typeof carInput>;
type LengthTwins = Pick<
  CarFields,
  | 'rolloutM'
  | 'rolloutIn'
  | 'rolloutGrowthPerMps'
  | 'rolloutGrowthPctAt100Mph'
  | 'rolloutGrowthPctAt100Kmh'
  | 'frontRolloutM'
  | 'frontRolloutIn'
>;
type SiLengths = Partial<Pick<CarFields, 'rolloutM' | 'rolloutGrowthPerMps' | 'frontRolloutM'>>;

const PCT_AT_100_MPH = 1 / (100 * 100 * MPS_PER_MPH);
const PCT_AT_100_KMH = 1 / (100 * 100 * MPS_PER_KMH);

/** The SI values of what was sent; a key is present only when one of its twins was sent, and a value given wins over a blank. */
export function siLengths(sent: Partial<LengthTwins>): SiLengths {
  return {
    ...firstSent('rolloutM', [sent.rolloutM, 1], [sent.rolloutIn, M_PER_IN]),
    ...firstSent('frontRolloutM', [sent.frontRolloutM, 1], [sent.frontRolloutIn, M_PER_IN]),
    ...firstSent(
      'rolloutGrowthPerMps',
      [sent.rolloutGrowthPerMps, 1],
      [sent.rolloutGrowthPctAt100Mph, PCT_AT_100_MPH],
      [sent.rolloutGrowthPctAt100Kmh, PCT_AT_100_KMH],
    ),
  };
}
