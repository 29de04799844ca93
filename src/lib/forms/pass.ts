import { z } from 'zod';
import { LANES, OUTCOMES } from '@/lib/domain/types';
import { MPS_PER_KMH, MPS_PER_MPH, mpsToKmh, mpsToMph } from '@/lib/domain/units';
import { TEXT_LIMITS, VALUE_LIMITS } from '@/lib/pass-csv/value-limits';
import {
  calendarDate,
  flag,
  idField,
  isoInstant,
  optionalChoice,
  optionalDecimal,
  optionalId,
  optionalText,
  text,
} from './fields';
import { firstSent } from './twins';

type TimeField = 'sixtyFtS' | 'threeThirtyFtS' | 'eighthS' | 'thousandFtS' | 'quarterS';
const seconds = (label: string, field: TimeField) => optionalDecimal({ label, unit: 's', ...VALUE_LIMITS[field] });

const inUnit = (label: string, unit: string, fromMps: (mps: number) => number) =>
  optionalDecimal({
    label,
    unit,
    low: Math.ceil(fromMps(VALUE_LIMITS.eighthMps.low)),
    high: Math.floor(fromMps(VALUE_LIMITS.eighthMps.high)),
  });
const mps = (label: string) => optionalDecimal({ label, unit: 'm/s', ...VALUE_LIMITS.eighthMps });

/** Speeds may come in m/s, mph or km/h; only m/s is stored. */
const speeds = {
  eighthMps: mps('660-ft speed'),
  eighthMph: inUnit('660-ft speed', 'mph', mpsToMph),
  eighthKmh: inUnit('660-ft speed', 'km/h', mpsToKmh),
  quarterMps: mps('1320-ft speed'),
  quarterMph: inUnit('1320-ft speed', 'mph', mpsToMph),
  quarterKmh: inUnit('1320-ft speed', 'km/h', mpsToKmh),
};

const lane = optionalChoice(LANES, 'Lane is left or right.');

/** Own unit of each adjustable. Null or blank: not recorded. */
const settings = z.record(
  z.string().max(40),
  optionalDecimal({ label: 'The setting', low: -1_000_000, high: 1_000_000 }),
  { error: 'Settings are a value per adjustable, such as {"launch_rpm": 7000}.' },
);

/** What may be corrected: a field that is not sent stays as it is. */
const correctable = {
  roundId: idField('Choose the round of the pass (roundId).'),
  readingId: optionalId('Choose a reading from the list (readingId), or leave it out.'),
  passNo: optionalDecimal({ label: 'The pass number', ...VALUE_LIMITS.passNo, integer: true }),
  runAt: isoInstant('The time of the pass'),
  lane,
  settings,
  runsOnDiscs: optionalDecimal({ label: 'Runs on the discs', ...VALUE_LIMITS.runsOnDiscs, integer: true }),
  discSetId: optionalId('Choose a disc set from the list (discSetId), or leave it out.'),
  slipPct: optionalDecimal({ label: 'Slip', unit: '% against ground speed', ...VALUE_LIMITS.slipPct }),
  slipSdPct: optionalDecimal({ label: 'The error of the slip', unit: 'slip points', low: 0, high: 50 }),
  sixtyFtS: seconds('60-ft time', 'sixtyFtS'),
  threeThirtyFtS: seconds('330-ft time', 'threeThirtyFtS'),
  eighthS: seconds('660-ft time', 'eighthS'),
  thousandFtS: seconds('1000-ft time', 'thousandFtS'),
  quarterS: seconds('1320-ft time', 'quarterS'),
  ...speeds,
  outcome: optionalChoice(OUTCOMES, 'The outcome is clean, shake, smoke or aborted.'),
  notes: optionalText('The notes', TEXT_LIMITS.notes),
};

const clientId = optionalId('The clientId is too long: use a UUID.');
const reason = (what: string) => text(`The reason ${what}`, TEXT_LIMITS.excluded_reason);

export const passInput = z.strictObject({
  ...correctable,
  carId: idField('Choose the car (carId).'),
  settings: settings.optional(),
  clientId,
});

export const passPatchShape = correctable;
export const passCorrection = z.object({ reason: reason('of the correction') });
export const passExclusion = z.object({ reason: reason('why the pass is left out') });
export const passRestoration = z.object({ reason: reason('why the pass counts again') });

export const PASS_SORTS = [
  'runAt',
  'passNo',
  'event',
  'track',
  'round',
  'lane',
  'slipPct',
  'sixtyFtS',
  'eighthS',
  'outcome',
  'runsOnDiscs',
  'airTempC',
  'trackTempC',
  'densityAltitude',
  'thousandFtS',
  'quarterS',
] as const;
export type PassSort = (typeof PASS_SORTS)[number];

const DAY = /^\d{4}-\d{2}-\d{2}$/;

/** An end of a span of time: a UTC day or an instant. */
function moment(label: string) {
  return z
    .union([z.string(), z.null()], { error: `${label} must be a date such as 2026-05-03.` })
    .optional()
    .transform((value, ctx) => {
      if (value == null || value.trim() === '') return null;
      const schema = DAY.test(value.trim()) ? calendarDate(label) : isoInstant(label);
      const read = schema.safeParse(value);
      if (read.success) return read.data;
      ctx.addIssue({
        code: 'custom',
        message: `${label} must be a date such as 2026-05-03, or an instant with its offset.`,
      });
      return z.NEVER;
    })
    .pipe(z.string().nullable());
}

export const passFilter = z.object({
  carId: idField('Choose the car (carId).'),
  eventId: optionalId('eventId is the id of an event.'),
  trackId: optionalId('trackId is the id of a track.'),
  roundId: optionalId('roundId is the id of a round.'),
  outcome: optionalChoice(OUTCOMES, 'The outcome is clean, shake, smoke or aborted.'),
  excluded: optionalChoice(['true', 'false'], 'excluded is true or false.'),
  from: moment('from'),
  to: moment('to'),
  sort: optionalChoice(PASS_SORTS, `sort is one of ${PASS_SORTS.join(', ')}.`),
  dir: optionalChoice(['asc', 'desc'], 'dir is asc or desc.'),
  limit: optionalDecimal({ label: 'limit', low: 1, high: 1000, integer: true }),
  offset: optionalDecimal({ label: 'offset', low: 0, high: 1_000_000, integer: true }),
});

export const passImport = z.object({
  carId: idField('Choose the car the file belongs to (carId).'),
  dryRun: flag('dryRun is true or false.').optional(),
  confirmPartial: flag('confirmPartial is true or false.').optional(),
});

export const passExport = z.object({
  carId: idField('Choose the car (carId).'),
  units: optionalChoice(['us', 'metric'], 'units is us or metric.'),
});

type Speeds = { [K in keyof typeof speeds]?: z.output<(typeof speeds)[K]> };

/** m/s from whichever unit was sent; nothing where none was. */
export function siSpeeds(sent: Speeds): { eighthMps?: number | null; quarterMps?: number | null } {
  const { eighthMps, eighthMph, eighthKmh, quarterMps, quarterMph, quarterKmh } = sent;
  return {
    ...firstSent('eighthMps', [eighthMps, 1], [eighthMph, MPS_PER_MPH], [eighthKmh, MPS_PER_KMH]),
    ...firstSent('quarterMps', [quarterMps, 1], [quarterMph, MPS_PER_MPH], [quarterKmh, MPS_PER_KMH]),
  };
}

/** The fields without the speeds that only exist on the way in. */
export function withoutTwins<T extends Speeds>(sent: T): Omit<T, keyof Speeds> {
  const { eighthMps: _a, eighthMph: _b, eighthKmh: _c, quarterMps: _d, quarterMph: _e, quarterKmh: _f, ...rest } = sent;
  return rest;
}

export type PassFilter = z.output<typeof passFilter>;
export type PassInput = z.output<typeof passInput>;
