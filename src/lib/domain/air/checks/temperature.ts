import { formatQuantity, type UnitSystem } from '../../display';
import { isFiniteNumber } from '../../given';
import type { RawReading } from '../conditions';
import { HARD_LIMITS, TRACK_AGAINST_AIR, USUAL_LIMITS } from '../limits';
import { sunElevationDeg } from '../sun';
import { type CheckContext, impossible, type ReadingCheck, sentences, unlikely, within } from './check';
import { temperatureHint } from './unit-slip';

/** Air and track temperature: each by itself, then one against the other. */
export function temperatureChecks(reading: RawReading, context: CheckContext): ReadingCheck[] {
  const alone = [
    rangeCheck('airTempC', reading.airTempC, context.units),
    rangeCheck('trackTempC', reading.trackTempC, context.units),
  ].filter((check) => check !== null);
  // A doubtful air temperature makes the track look wrong as well: name the one slip, not two.
  if (alone.some((check) => check.level === 'impossible' || check.field === 'airTempC')) return alone;
  const together = trackAgainstAir(reading, context);
  // One doubt per field is enough; the comparison is the sharper one.
  return together ? [...alone.filter((check) => check.field !== together.field), together] : alone;
}

const NAMES = { airTempC: 'Air temperature', trackTempC: 'Track temperature' } as const;

function rangeCheck(field: keyof typeof NAMES, value: number | null, units: UnitSystem): ReadingCheck | null {
  if (!isFiniteNumber(value) || within(value, USUAL_LIMITS[field])) return null;
  const hint = temperatureHint(value, units, (meant) => within(meant, USUAL_LIMITS[field]));
  const shown = `${NAMES[field]} ${formatQuantity('airTemperature', value, units)}`;
  if (within(value, HARD_LIMITS[field]))
    return unlikely(field, sentences(`${shown} is unusual.`, hint ?? 'Read it again.'));
  const { low, high } = HARD_LIMITS[field];
  const range = `${formatQuantity('airTemperature', low, units)} to ${formatQuantity('airTemperature', high, units)}`;
  return impossible(field, sentences(`${shown} is not possible.`, hint ?? `Enter a value from ${range}.`));
}

function trackAgainstAir(reading: RawReading, context: CheckContext): ReadingCheck | null {
  const { airTempC: air, trackTempC: track } = reading;
  if (!isFiniteNumber(air) || !isFiniteNumber(track)) return null;
  if (track - air > TRACK_AGAINST_AIR.aboveC) return hotTrack(air, track, context.units);
  const sunDeg = sunElevationDeg(context.takenAt, context.latitudeDeg, context.longitudeDeg);
  const highSun = sunDeg !== null && sunDeg >= TRACK_AGAINST_AIR.highSunDeg;
  const limit = highSun ? TRACK_AGAINST_AIR.sunnyBelowC : TRACK_AGAINST_AIR.anyTimeBelowC;
  return air - track > limit ? coldTrack(air, track, context.units, highSun) : null;
}

function hotTrack(air: number, track: number, units: UnitSystem): ReadingCheck {
  const shown = `Track is ${formatQuantity('temperatureDifference', track - air, units)} above the air.`;
  return unlikely('trackTempC', sentences(shown, trackHint(air, track, units) ?? 'Check both temperatures.'));
}

function coldTrack(air: number, track: number, units: UnitSystem, highSun: boolean): ReadingCheck {
  const gap = formatQuantity('temperatureDifference', air - track, units);
  const shown = `Track is ${gap} below the air${highSun ? ' with the sun high' : ''}.`;
  return unlikely(
    'trackTempC',
    sentences(shown, trackHint(air, track, units) ?? 'Are air and track temperature swapped?'),
  );
}

const trackHint = (air: number, track: number, units: UnitSystem): string | null =>
  temperatureHint(track, units, (meant) => meant > air - TRACK_AGAINST_AIR.sunnyBelowC && meant - air <= 35);
