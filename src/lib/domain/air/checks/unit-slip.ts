/** What a number would have been, had it been typed in the other unit. */
import { formatQuantity, fromDisplay, toDisplay, toInputText, type UnitSystem, unitLabel } from '../../display';
import { fToC, hPaToPa, inHgToPa, kPaToPa } from '../../units';
import { HARD_LIMITS, type Limit } from '../limits';
import { within } from './check';

/** The temperature, degC, meant by a tuner who read the other scale than the team's: 30 typed as degF meant 30 degC. */
export function meantTempC(storedC: number, units: UnitSystem): number {
  const typed = toDisplay('airTemperature', storedC, units);
  return units === 'us' ? typed : fToC(typed);
}

/** "If the meter shows °C, enter 86.0 °F." when that would fit; null when it would not. */
export function temperatureHint(storedC: number, units: UnitSystem, fits: (meantC: number) => boolean): string | null {
  const meant = meantTempC(storedC, units);
  if (!fits(meant)) return null;
  const other = units === 'us' ? '°C' : '°F';
  return `If the meter shows ${other}, enter ${formatQuantity('airTemperature', meant, units)}.`;
}

interface PressureScale {
  unit: string;
  toPa: (value: number) => number;
}

const SCALES: readonly PressureScale[] = [
  { unit: 'hPa', toPa: hPaToPa },
  { unit: 'inHg', toPa: inHgToPa },
  { unit: 'kPa', toPa: kPaToPa },
];

/** "1013 looks like hPa: enter 29.91 inHg." when the typed number fits another pressure unit; null when none fits. */
export function pressureHint(storedPa: number, units: UnitSystem, limit: Limit): string | null {
  const typed = toDisplay('pressure', storedPa, units);
  const own = unitLabel('pressure', units);
  const asTyped = toInputText('pressure', storedPa, units);
  const scale = SCALES.find(({ unit, toPa }) => unit !== own && within(toPa(typed), limit));
  if (!scale) return null;
  const meant = formatQuantity('pressure', scale.toPa(typed), units);
  return `${asTyped} looks like ${scale.unit}: enter ${meant}.`;
}

/** Feet typed into a field of meters, or the reverse: "If that is meters, enter 5,807 ft." */
export function altitudeHint(storedM: number, units: UnitSystem, fits: (meantM: number) => boolean): string | null {
  const typed = toDisplay('altitude', storedM, units);
  const meant = units === 'us' ? typed : fromDisplay('altitude', typed, 'us');
  if (!fits(meant) || !within(meant, HARD_LIMITS.altitudeM)) return null;
  const other = units === 'us' ? 'meters' : 'feet';
  return `If that is ${other}, enter ${formatQuantity('altitude', meant, units)}.`;
}
