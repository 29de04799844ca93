/** Big changes since the reading before, in short time. Weather does jump, so these only ask. */
import { formatNumber, formatPercent, formatQuantity, type UnitSystem } from '../../display';
import { isFiniteNumber } from '../../given';
import { conditionsFromReading, type RawReading } from '../conditions';
import { minutesBetween } from '../instant';
import { JUMP } from '../limits';
import { type PressureKind, stationPressureOf } from '../pressure';
import { type CheckContext, type ReadingCheck, sentences, unlikely } from './check';
import { temperatureHint } from './unit-slip';

/** Compares derived values, so a change of the kind of pressure or humidity does not count as a change of the air. */
export function jumpChecks(reading: RawReading, context: CheckContext): ReadingCheck[] {
  const { previous, takenAt, units } = context;
  const minutes = previous ? minutesBetween(previous.takenAt, takenAt) : null;
  if (!previous || minutes === null || minutes > JUMP.withinMinutes) return [];
  const now = conditionsFromReading(reading);
  const before = conditionsFromReading({ ...previous, altitudeM: previous.altitudeM ?? context.altitudeM });
  const since = `in ${formatNumber(minutes, 0)} minutes`;
  return [
    temperatureJump('airTempC', now.airTempC, before.airTempC, since, units),
    temperatureJump('trackTempC', now.trackTempC, before.trackTempC, since, units),
    humidityJump(reading, now.relativeHumidity, before.relativeHumidity, since),
    pressureJump(reading, now.stationPressurePa, before.stationPressurePa, since, units),
  ].filter((check) => check !== null);
}

const TEMPERATURES = { airTempC: 'Air temperature', trackTempC: 'Track temperature' } as const;

const READ_AGAIN = {
  airTempC: 'Read it again, with the meter in shade and moving air.',
  trackTempC: 'Read it again at the usual place on the track.',
} as const;

function temperatureJump(
  field: keyof typeof TEMPERATURES,
  now: number | null,
  before: number | null,
  since: string,
  units: UnitSystem,
): ReadingCheck | null {
  if (now === null || before === null || Math.abs(now - before) <= JUMP[field]) return null;
  const moved = `${TEMPERATURES[field]} ${direction(now - before)} ${formatQuantity('temperatureDifference', Math.abs(now - before), units)} ${since}.`;
  const hint = temperatureHint(now, units, (meant) => Math.abs(meant - before) <= JUMP[field]);
  return unlikely(field, sentences(moved, hint ?? READ_AGAIN[field]));
}

const direction = (change: number): string => (change > 0 ? 'rose' : 'fell');

function humidityJump(
  reading: RawReading,
  now: number | null,
  before: number | null,
  since: string,
): ReadingCheck | null {
  if (now === null || before === null || Math.abs(now - before) <= JUMP.relativeHumidity) return null;
  const moved = `Humidity ${direction(now - before)} from ${formatPercent(before)} to ${formatPercent(now)} ${since}.`;
  return unlikely(humidityField(reading), `${moved} Read it again.`);
}

function humidityField(reading: RawReading): 'relativeHumidity' | 'dewPointC' | 'wetBulbC' {
  if (reading.relativeHumidity !== null) return 'relativeHumidity';
  return reading.dewPointC !== null ? 'dewPointC' : 'wetBulbC';
}

function pressureJump(
  reading: RawReading,
  now: number | null,
  before: number | null,
  since: string,
  units: UnitSystem,
): ReadingCheck | null {
  if (now === null || before === null || Math.abs(now - before) <= JUMP.stationPressurePa) return null;
  const moved = `Station pressure ${direction(now - before)} ${formatQuantity('pressure', Math.abs(now - before), units)} ${since}.`;
  return unlikely('pressurePa', sentences(moved, otherKindFits(reading, before) ?? 'Read it again.'));
}

const KIND_LABEL: Record<PressureKind, string> = { station: 'station pressure', altimeter: 'altimeter setting' };

function otherKindFits({ pressurePa, pressureKind, altitudeM }: RawReading, before: number): string | null {
  const other = pressureKind === 'station' ? 'altimeter' : 'station';
  const asOther = stationPressureOf(pressurePa, other, altitudeM);
  if (!isFiniteNumber(asOther) || Math.abs(asOther - before) > JUMP.stationPressurePa) return null;
  return `It fits the last reading as ${KIND_LABEL[other]}: check which of the two it is.`;
}
