import { z } from 'zod';
import { HARD_LIMITS } from '@/lib/domain/air/limits';
import { idField, optionalChoice, optionalDecimal, optionalId, optionalInstant, optionalText, text } from './fields';

/**
 * A reading in SI under the names of the schema; no other names are taken, so that a value in the wrong unit cannot slip in.
 * The ranges here only keep nonsense out of the arithmetic; what is possible and what is likely is asked of the domain.
 */
const measurements = {
  airTempC: optionalDecimal({ label: 'Air temperature', unit: '°C', low: -100, high: 200 }),
  relativeHumidity: optionalDecimal({
    label: 'Relative humidity',
    low: 0,
    high: 1,
    hint: 'Send a fraction: 0.45 for 45 %.',
  }),
  dewPointC: optionalDecimal({ label: 'Dew point', unit: '°C', low: -150, high: 200 }),
  wetBulbC: optionalDecimal({ label: 'Wet bulb', unit: '°C', low: -150, high: 200 }),
  pressurePa: optionalDecimal({
    label: 'Pressure',
    unit: 'Pa',
    low: 10_000,
    high: 200_000,
    hint: 'One inHg is 3386.389 Pa, one hPa is 100 Pa.',
  }),
  pressureKind: optionalChoice(
    ['station', 'altimeter'],
    'Say what the pressure is: "station" as read at the track, or "altimeter" for a sea-level corrected setting.',
  ),
  trackTempC: optionalDecimal({ label: 'Track temperature', unit: '°C', low: -100, high: 200 }),
  trackTempPlace: optionalText('The place of the track temperature', 80),
  windMps: optionalDecimal({ label: 'Wind speed', unit: 'm/s', ...HARD_LIMITS.windMps }),
  windDirDeg: optionalDecimal({ label: 'Wind direction', unit: 'degrees from north', ...HARD_LIMITS.windDirDeg }),
  cloudPct: optionalDecimal({ label: 'Cloud cover', unit: '%', ...HARD_LIMITS.cloudPct }),
};

const common = {
  ...measurements,
  source: optionalChoice(['hand', 'service'], 'The source of a reading is "hand" or "service".'),
  clientId: optionalId('The clientId is too long: use a UUID.'),
};

const unknownField = (issue: { code: string; keys?: unknown }): string | undefined =>
  issue.code === 'unrecognized_keys'
    ? `A reading has no field ${(issue.keys as string[]).join(', ')}. Use the SI names such as airTempC and pressurePa.`
    : undefined;

type Measured = { [K in keyof typeof measurements]: z.output<(typeof measurements)[K]> };

const HUMIDITY = ['relativeHumidity', 'dewPointC', 'wetBulbC'] as const;
const MEASURED = ['airTempC', ...HUMIDITY, 'pressurePa', 'trackTempC', 'windMps', 'cloudPct'] as const;

function wholeReading(input: Measured, ctx: z.RefinementCtx): void {
  const issue = (field: string, message: string) => ctx.addIssue({ code: 'custom', path: [field], message });
  const humidities = HUMIDITY.filter((name) => input[name] !== null);
  if (humidities.length > 1)
    issue(humidities[1] ?? '', 'Send one of relativeHumidity, dewPointC and wetBulbC: what was read.');
  if (input.pressurePa !== null && !input.pressureKind)
    issue('pressureKind', 'Say what the pressure is: "station" or "altimeter".');
  if (input.windDirDeg !== null && input.windMps === null) issue('windMps', 'A wind direction needs a wind speed.');
  if (MEASURED.every((name) => input[name] === null))
    issue('airTempC', 'Nothing was measured: enter at least one value.');
}

export const readingInput = z
  .strictObject(
    {
      ...common,
      trackId: idField('Choose the track of the reading (trackId).'),
      roundId: optionalId('Choose a round from the list (roundId), or leave it out.'),
      takenAt: optionalInstant('The time of the reading'),
    },
    { error: unknownField },
  )
  .superRefine(wholeReading);

/** The reading as it should have been: every measurement again; track, round and time stay when left out. */
export const readingCorrection = z
  .strictObject(
    {
      ...common,
      trackId: optionalId('Choose the track of the reading (trackId).'),
      roundId: optionalId('Choose a round from the list (roundId), or leave it out.'),
      takenAt: optionalInstant('The time of the reading'),
      reason: text('The reason of the correction', 300),
    },
    { error: unknownField },
  )
  .superRefine(wholeReading);

export const readingFilter = z.object({
  trackId: optionalId('trackId is the id of a track.'),
  roundId: optionalId('roundId is the id of a round.'),
  limit: optionalDecimal({ label: 'limit', low: 1, high: 1000, integer: true }),
  all: optionalChoice(['true', 'false'], 'all is true or false.'),
});

export type ReadingInput = z.output<typeof readingInput>;
export type ReadingCorrection = z.output<typeof readingCorrection>;
