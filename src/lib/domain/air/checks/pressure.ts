/** Pressure: its size, its unit, and whether its kind fits the altitude. The costliest slip of all: 4 % of density at 335 m, 24 % at 1770 m. */
import { formatAbout, formatQuantity, toInputText, type UnitSystem, unitLabel } from '../../display';
import { isFiniteNumber } from '../../given';
import type { RawReading } from '../conditions';
import {
  ALTIMETER_SPREAD_PA,
  ALTITUDE_MISMATCH_M,
  HARD_LIMITS,
  KIND_TELLS_FROM_M,
  SEA_LEVEL_NEAR_PA,
  USUAL_LIMITS,
} from '../limits';
import { altimeterSettingPa } from '../pressure';
import { ISA, isaPressurePa } from '../standard-atmosphere';
import { type CheckContext, impossible, type ReadingCheck, sentences, unlikely, within } from './check';
import { altitudeHint, pressureHint } from './unit-slip';

/** Altitude first: without it an altimeter setting cannot be used. */
export function pressureChecks(reading: RawReading, context: CheckContext): ReadingCheck[] {
  return [altitudeCheck(reading, context), pressureCheck(reading, context.units)].filter((check) => check !== null);
}

function altitudeCheck(reading: RawReading, { altitudeM: trackM, units }: CheckContext): ReadingCheck | null {
  const own = reading.altitudeM;
  if (!isFiniteNumber(own)) return null;
  const shown = `Altitude ${formatQuantity('altitude', own, units)}`;
  if (!within(own, HARD_LIMITS.altitudeM)) {
    const hint = altitudeHint(own, units, () => true);
    return impossible('altitudeM', sentences(`${shown} is not possible.`, hint ?? 'Enter the altitude of the track.'));
  }
  if (!isFiniteNumber(trackM) || Math.abs(own - trackM) <= ALTITUDE_MISMATCH_M) return null;
  const hint = altitudeHint(own, units, (meant) => Math.abs(meant - trackM) <= ALTITUDE_MISMATCH_M);
  const problem = `${shown} does not match the track's ${formatQuantity('altitude', trackM, units)}.`;
  return unlikely('altitudeM', sentences(problem, hint ?? 'Check which is right.'));
}

function pressureCheck(reading: RawReading, units: UnitSystem): ReadingCheck | null {
  const { pressurePa: pressure, pressureKind: kind, altitudeM: altitude } = reading;
  if (!isFiniteNumber(pressure)) return null;
  if (kind === null)
    return impossible('pressureKind', "Say which pressure it is: 'station pressure' or 'altimeter setting'.");
  return kind === 'station' ? stationCheck(pressure, altitude, units) : altimeterCheck(pressure, altitude, units);
}

const show = (pa: number, units: UnitSystem): string => formatQuantity('pressure', pa, units);

function outOfRange(name: string, pa: number, limit: { low: number; high: number }, units: UnitSystem): ReadingCheck {
  const hint = pressureHint(pa, units, limit) ?? `Enter ${show(limit.low, units)} to ${show(limit.high, units)}.`;
  const typed = `${toInputText('pressure', pa, units)} ${unitLabel('pressure', units)}`;
  return impossible('pressurePa', `${name} ${typed} is not possible. ${hint}`);
}

function stationCheck(pa: number, altitude: number | null, units: UnitSystem): ReadingCheck | null {
  if (!within(pa, HARD_LIMITS.stationPressurePa))
    return outOfRange('Station pressure', pa, HARD_LIMITS.stationPressurePa, units);
  const implied = altimeterSettingPa(pa, altitude);
  const expected = isaPressurePa(altitude);
  if (implied === null || expected === null || altitude === null) return null;
  const about = `at ${formatQuantity('altitude', altitude, units)} a station barometer reads about ${formatAbout('pressure', expected, units)}`;
  if (looksSeaLevel(pa, implied, altitude))
    return unlikely(
      'pressurePa',
      `That looks sea-level corrected: ${about}. Choose 'altimeter setting' or read the station value.`,
    );
  if (within(implied, USUAL_LIMITS.altimeterPa)) return null;
  return unlikely(
    'pressurePa',
    `${show(pa, units)} does not fit the track: ${about}. Check the reading and the altitude.`,
  );
}

function looksSeaLevel(pa: number, implied: number, altitude: number): boolean {
  if (altitude < KIND_TELLS_FROM_M) return false;
  const asSeaLevel = Math.abs(pa - ISA.seaLevelPressurePa);
  if (asSeaLevel <= SEA_LEVEL_NEAR_PA) return true;
  return fitsOtherKind(Math.abs(implied - ISA.seaLevelPressurePa), asSeaLevel);
}

/** As read it would be an odd day; as the other kind an ordinary one. */
const fitsOtherKind = (asRead: number, asOther: number): boolean =>
  asRead > ALTIMETER_SPREAD_PA && asOther < asRead / 2;

function altimeterCheck(pa: number, altitude: number | null, units: UnitSystem): ReadingCheck | null {
  const station = stationTakenForAltimeter(pa, altitude, units);
  if (station) return station;
  if (!within(pa, HARD_LIMITS.altimeterPa)) return outOfRange('Altimeter setting', pa, HARD_LIMITS.altimeterPa, units);
  if (!isFiniteNumber(altitude))
    return impossible(
      'altitudeM',
      "An altimeter setting needs the track's altitude. Enter it on the track, or read station pressure.",
    );
  if (within(pa, USUAL_LIMITS.altimeterPa)) return null;
  return unlikely('pressurePa', `Altimeter setting ${show(pa, units)} is unusual. Read it again.`);
}

function stationTakenForAltimeter(pa: number, altitude: number | null, units: UnitSystem): ReadingCheck | null {
  if (altitude === null || altitude < KIND_TELLS_FROM_M || !within(pa, HARD_LIMITS.stationPressurePa)) return null;
  const asStation = altimeterSettingPa(pa, altitude);
  if (asStation === null) return null;
  const seaLevel = ISA.seaLevelPressurePa;
  if (!fitsOtherKind(Math.abs(pa - seaLevel), Math.abs(asStation - seaLevel))) return null;
  const level = within(pa, HARD_LIMITS.altimeterPa) ? unlikely : impossible;
  const place = `an altimeter setting is near ${show(seaLevel, units)} anywhere; ${show(pa, units)} is what a barometer shows at ${formatQuantity('altitude', altitude, units)}`;
  return level('pressurePa', `That looks like station pressure: ${place}. Choose 'station pressure'.`);
}
