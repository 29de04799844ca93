import { formatNumber, formatPercent, formatQuantity, type UnitSystem } from '../../display';
import { isFiniteNumber } from '../../given';
import type { RawReading } from '../conditions';
import { humidityFromDewPoint, humidityFromWetBulb, wetBulbC } from '../humidity';
import { FRACTION_AS_PERCENT_MAX, HARD_LIMITS, HUMIDITY_DISAGREES, USUAL_LIMITS } from '../limits';
import { stationPressureOf } from '../pressure';
import { type CheckContext, impossible, type ReadingCheck, sentences, unlikely, within } from './check';
import { temperatureHint } from './unit-slip';

/** Relative humidity, dew point and wet bulb: each by itself, against the air temperature, and against each other. */
export function humidityChecks(reading: RawReading, { units }: CheckContext): ReadingCheck[] {
  return [
    relativeHumidityCheck(reading.relativeHumidity),
    dewPointCheck(reading, units),
    wetBulbCheck(reading, units),
    disagreement(reading),
    notUsable(reading),
  ].filter((check) => check !== null);
}

function relativeHumidityCheck(rh: number | null): ReadingCheck | null {
  if (!isFiniteNumber(rh)) return null;
  if (!within(rh, HARD_LIMITS.relativeHumidity)) return humidityOutOfRange(rh);
  if (rh > 0 && rh <= FRACTION_AS_PERCENT_MAX) return fractionAsPercent(rh);
  if (within(rh, USUAL_LIMITS.relativeHumidity)) return null;
  return unlikely('relativeHumidity', `Humidity ${formatPercent(rh, 1)} is drier than desert air. Read it again.`);
}

function humidityOutOfRange(rh: number): ReadingCheck {
  const shown = `Humidity ${formatPercent(rh, 1)} is not possible.`;
  const twice = rh > 1.5 && rh <= 100;
  const fix = twice ? `If the meter shows ${formatNumber(rh, 1)} %, enter that.` : 'Enter 0 to 100 %.';
  return impossible('relativeHumidity', sentences(shown, fix));
}

function fractionAsPercent(rh: number): ReadingCheck {
  const typed = formatNumber(rh * 100, 2);
  const fix = `That looks like a fraction: ${typed} means ${formatNumber(rh * 10_000, 0)} %.`;
  return unlikely('relativeHumidity', `Humidity ${typed} % is drier than desert air. ${fix}`);
}

function dewPointCheck(reading: RawReading, units: UnitSystem): ReadingCheck | null {
  const { airTempC: air, dewPointC: dew } = reading;
  if (!isFiniteNumber(dew)) return null;
  const shown = `Dew point ${formatQuantity('airTemperature', dew, units)}`;
  const hint = temperatureHint(dew, units, (meant) => meant <= (air ?? 40) && within(meant, USUAL_LIMITS.dewPointC));
  if (!within(dew, HARD_LIMITS.dewPointC))
    return impossible('dewPointC', sentences(`${shown} is not possible.`, hint ?? 'Read it again.'));
  if (isFiniteNumber(air) && dew > air) return dewAboveAir(shown, air, hint, units);
  const dry = isFiniteNumber(air) && (humidityFromDewPoint(air, dew) ?? 1) < USUAL_LIMITS.relativeHumidity.low;
  if (within(dew, USUAL_LIMITS.dewPointC) && !dry) return null;
  return unlikely('dewPointC', sentences(`${shown} is unusual${dry ? 'ly dry' : ''}.`, hint ?? 'Read it again.'));
}

function dewAboveAir(shown: string, air: number, hint: string | null, units: UnitSystem): ReadingCheck {
  const problem = `${shown} is above the air temperature (${formatQuantity('airTemperature', air, units)}), which cannot be.`;
  return impossible('dewPointC', sentences(problem, hint ?? 'Are the two swapped, or is one an old value?'));
}

function wetBulbCheck(reading: RawReading, units: UnitSystem): ReadingCheck | null {
  const { airTempC: air, wetBulbC: wet } = reading;
  if (!isFiniteNumber(wet)) return null;
  const shown = `Wet bulb ${formatQuantity('airTemperature', wet, units)}`;
  const hint = temperatureHint(wet, units, (meant) => meant <= (air ?? 45) && within(meant, USUAL_LIMITS.wetBulbC));
  if (!within(wet, HARD_LIMITS.wetBulbC))
    return impossible('wetBulbC', sentences(`${shown} is not possible.`, hint ?? 'Read it again.'));
  if (!isFiniteNumber(air)) return null;
  if (wet > air) return wetAboveAir(shown, air, hint, units);
  return wetBulbAgainstAir(reading, air, wet, shown, hint, units);
}

function wetAboveAir(shown: string, air: number, hint: string | null, units: UnitSystem): ReadingCheck {
  const problem = `${shown} is above the air temperature (${formatQuantity('airTemperature', air, units)}), which cannot be.`;
  return impossible('wetBulbC', sentences(problem, hint ?? 'Are wet and dry bulb swapped?'));
}

const DRY_WICK_HUMIDITY = 0.99;

function wetBulbAgainstAir(
  reading: RawReading,
  air: number,
  wet: number,
  shown: string,
  hint: string | null,
  units: UnitSystem,
): ReadingCheck | null {
  const pressure = stationPressureOf(reading.pressurePa, reading.pressureKind, reading.altitudeM);
  const driest = wetBulbC(air, 0, pressure);
  if (driest !== null && wet < driest) {
    const lowest = `even bone-dry air would show ${formatQuantity('airTemperature', driest, units)}.`;
    return impossible('wetBulbC', sentences(`${shown} is too low: ${lowest}`, hint ?? 'Read it again.'));
  }
  const rh = humidityFromWetBulb(air, wet, pressure);
  if (rh !== null && rh >= DRY_WICK_HUMIDITY)
    return unlikely('wetBulbC', `${shown} is the air temperature. Is the wick wet and in moving air?`);
  return null;
}

function disagreement(reading: RawReading): ReadingCheck | null {
  const { airTempC, relativeHumidity, dewPointC, wetBulbC: wet } = reading;
  const pressure = stationPressureOf(reading.pressurePa, reading.pressureKind, reading.altitudeM);
  const values = [
    { field: 'relativeHumidity' as const, rh: relativeHumidity },
    { field: 'dewPointC' as const, rh: humidityFromDewPoint(airTempC, dewPointC) },
    { field: 'wetBulbC' as const, rh: humidityFromWetBulb(airTempC, wet, pressure) },
  ].filter((value) => isFiniteNumber(value.rh)) as { field: keyof typeof HUMIDITY_NAMES; rh: number }[];
  const [used, ...others] = values;
  const odd = others.find((other) => used && Math.abs(other.rh - used.rh) > HUMIDITY_DISAGREES);
  if (!used || !odd) return null;
  const names = `${HUMIDITY_NAMES[used.field]} gives ${formatPercent(used.rh)}, ${HUMIDITY_NAMES[odd.field]} ${formatPercent(odd.rh)}.`;
  return unlikely(odd.field, `${names} Clear the one that is not from this meter.`);
}

/** A dew point or wet bulb that gives no humidity, because what it needs beside it is missing. */
function notUsable({
  airTempC,
  relativeHumidity,
  dewPointC,
  wetBulbC: wet,
  pressurePa,
}: RawReading): ReadingCheck | null {
  if (relativeHumidity !== null) return null;
  if (dewPointC !== null && airTempC === null)
    return unlikely('dewPointC', 'A dew point gives no humidity without the air temperature. Enter both.');
  if (wet !== null && (airTempC === null || pressurePa === null))
    return unlikely('wetBulbC', 'A wet bulb gives no humidity without air temperature and pressure. Enter all three.');
  return null;
}

const HUMIDITY_NAMES = { relativeHumidity: 'Relative humidity', dewPointC: 'dew point', wetBulbC: 'wet bulb' } as const;
