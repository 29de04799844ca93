/** One-tap fixes: what the typed number was probably meant to be. Offered only when it would settle the question. */
import { meantTempC } from '@/lib/domain/air/checks/unit-slip';
import type { ReadingCheck } from '@/lib/domain/air/plausibility';
import { formatNumber, formatQuantity, toDisplay, type UnitSystem } from '@/lib/domain/display';
import { hPaToPa, inHgToPa, kPaToPa } from '@/lib/domain/units';
import { type FormReading, type FormValues, measureOf, readForm } from './reading-form';

export interface Fix {
  label: string;
  /** Input values to set. */
  set: Record<string, string>;
}

/** Tells what would be wrong about a form; `alone` leaves the reading before out of it. */
export type Recheck = (values: FormValues, alone: boolean) => readonly ReadingCheck[];

/**
 * The first candidate that settles a question without making anything else impossible; null when none helps. What is odd about a
 * value by itself is settled by itself: the reading before may have been the wrong one.
 */
export function fixFor(check: ReadingCheck, values: FormValues, units: UnitSystem, recheck: Recheck): Fix | null {
  const { reading } = readForm(values, units);
  const asks = (checks: readonly ReadingCheck[]): boolean => checks.some(({ field }) => field === check.field);
  const alone = asks(recheck(values, true));
  const before = impossibleFields(recheck(values, alone));
  const settles = ({ set }: Fix): boolean => {
    const left = recheck({ ...values, ...set }, alone);
    return !asks(left) && [...impossibleFields(left)].every((field) => before.has(field));
  };
  return candidates(check.field, reading, units).find(settles) ?? null;
}

function impossibleFields(checks: readonly ReadingCheck[]): Set<string> {
  return new Set(checks.filter(({ level }) => level === 'impossible').map(({ field }) => field));
}

function candidates(field: ReadingCheck['field'], reading: FormReading, units: UnitSystem): Fix[] {
  if (field === 'pressurePa' || field === 'pressureKind')
    return [otherKind(reading), ...otherPressureUnits(reading, units)];
  if (field === 'relativeHumidity') return percentOfFraction(reading, units);
  if (field === 'altitudeM') return [];
  const swap = field === 'trackTempC' ? swapped(reading, units) : [];
  return [...otherScale(field, reading, units), ...swap];
}

function otherKind({ pressureKind }: FormReading): Fix {
  return pressureKind === 'altimeter'
    ? { label: 'It is station pressure', set: { pressureKind: 'station' } }
    : { label: 'It is an altimeter setting', set: { pressureKind: 'altimeter' } };
}

const PRESSURE_SCALES = [inHgToPa, hPaToPa, kPaToPa] as const;

function otherPressureUnits({ pressurePa }: FormReading, units: UnitSystem): Fix[] {
  if (pressurePa === null) return [];
  const typed = toDisplay('pressure', pressurePa, units);
  return PRESSURE_SCALES.map((toPa) =>
    setTo('pressurePa', toPa(typed), formatQuantity('pressure', toPa(typed), units), units),
  );
}

function percentOfFraction({ relativeHumidity: rh }: FormReading, units: UnitSystem): Fix[] {
  return rh === null ? [] : [setTo('relativeHumidity', rh * 100, `${formatNumber(rh * 10_000, 0)} %`, units)];
}

type TemperatureKey = 'airTempC' | 'trackTempC' | 'dewPointC' | 'wetBulbC';

/** The number was read off the other temperature scale. */
function otherScale(field: TemperatureKey, reading: FormReading, units: UnitSystem): Fix[] {
  const stored = reading[field];
  if (stored === null) return [];
  const meant = meantTempC(stored, units);
  return [setTo(field, meant, formatQuantity('airTemperature', meant, units), units)];
}

function swapped({ airTempC, trackTempC }: FormReading, units: UnitSystem): Fix[] {
  if (airTempC === null || trackTempC === null) return [];
  const [air, track] = [measureOf('airTempC', units), measureOf('trackTempC', units)];
  const set = { [air.name]: track.toText(trackTempC), [track.name]: air.toText(airTempC) };
  return [{ label: 'Swap air and track', set }];
}

function setTo(
  key: TemperatureKey | 'pressurePa' | 'relativeHumidity',
  si: number,
  shown: string,
  units: UnitSystem,
): Fix {
  const { name, toText } = measureOf(key, units);
  return { label: `Make it ${shown}`, set: { [name]: toText(si) } };
}
