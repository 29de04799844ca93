/**
 * The conditions form: its input names carry the team's unit ("airTempF"), the verb takes SI. Plain functions that run on the
 * server for a form without script and in the browser for the live numbers, so both understand a typed number the same way.
 */
import type { RawReading } from '@/lib/domain/air/conditions';
import type { PressureKind } from '@/lib/domain/air/pressure';
import { parseDecimal } from '@/lib/domain/decimal';
import { type Quantity, toInputText, type UnitSystem, unitView } from '@/lib/domain/display';

export const HUMIDITY_KEYS = ['relativeHumidity', 'dewPointC', 'wetBulbC'] as const;
export type HumidityKey = (typeof HUMIDITY_KEYS)[number];
export type MeasureKey = 'airTempC' | HumidityKey | 'pressurePa' | 'trackTempC' | 'windMps' | 'windDirDeg' | 'cloudPct';

/** One number of the form in the team's units. */
export interface Measure {
  key: MeasureKey;
  /** Of the input; ends in the unit. */
  name: string;
  label: string;
  unit: string;
  toSi(typed: number): number;
  /** As the input shows it; empty for none. */
  toText(si: number | null | undefined): string;
}

const quantity = (
  key: MeasureKey,
  label: string,
  of: Quantity,
  names: Record<UnitSystem, string>,
  units: UnitSystem,
) => ({
  key,
  name: names[units],
  label,
  unit: unitView(of, units).unit,
  toSi: unitView(of, units).fromDisplay,
  toText: (si: number | null | undefined) => toInputText(of, si, units),
});

const scaled = (key: MeasureKey, name: string, label: string, unit: string, perSi: number) => ({
  key,
  name,
  label,
  unit,
  toSi: (typed: number) => typed / perSi,
  toText: (si: number | null | undefined) => (si == null ? '' : String(Number((si * perSi).toFixed(2)))),
});

const temperature = (stem: string) => ({ us: `${stem}F`, metric: `${stem}C` });

/** Every number of the form, in the order it is read at the fence. */
export function measuresOf(units: UnitSystem): Measure[] {
  return [
    quantity('airTempC', 'Air temperature', 'airTemperature', temperature('airTemp'), units),
    scaled('relativeHumidity', 'relativeHumidityPct', 'Relative humidity', '%', 100),
    quantity('dewPointC', 'Dew point', 'airTemperature', temperature('dewPoint'), units),
    quantity('wetBulbC', 'Wet bulb', 'airTemperature', temperature('wetBulb'), units),
    quantity('pressurePa', 'Pressure', 'pressure', { us: 'pressureInHg', metric: 'pressureHPa' }, units),
    quantity('trackTempC', 'Track temperature', 'trackTemperature', temperature('trackTemp'), units),
    quantity('windMps', 'Wind speed', 'windSpeed', { us: 'windMph', metric: 'windKmh' }, units),
    scaled('windDirDeg', 'windDirDeg', 'Wind from', '°', 1),
    scaled('cloudPct', 'cloudPct', 'Cloud', '%', 1),
  ];
}

/** The measure of a key. */
export function measureOf(key: MeasureKey, units: UnitSystem): Measure {
  const found = measuresOf(units).find((measure) => measure.key === key);
  if (!found) throw new Error(`The form has no ${key}.`);
  return found;
}

export type FormValues = Readonly<Record<string, string | undefined>>;

/** What the form says, SI. Only the chosen humidity counts; what cannot be read is null and named in `errors`. */
export interface FormReading extends Omit<RawReading, 'altitudeM'> {
  windMps: number | null;
  windDirDeg: number | null;
  cloudPct: number | null;
  trackTempPlace: string;
}

export function readForm(
  values: FormValues,
  units: UnitSystem,
): { reading: FormReading; errors: Record<string, string> } {
  const errors: Record<string, string> = {};
  const numbers = new Map<MeasureKey, number | null>();
  for (const measure of measuresOf(units)) {
    const typed = isLeftOut(measure.key, values) ? '' : (values[measure.name] ?? '').trim();
    const value = typed === '' ? null : parseDecimal(typed);
    if (typed !== '' && value === null) errors[measure.name] = `Enter a plain number such as ${example(measure)}.`;
    numbers.set(measure.key, value === null ? null : measure.toSi(value));
  }
  return { reading: toReading(numbers, values), errors };
}

const isLeftOut = (key: MeasureKey, values: FormValues): boolean =>
  (HUMIDITY_KEYS as readonly string[]).includes(key) && key !== humidityKindOf(values);

const EXAMPLES: Partial<Record<MeasureKey, number>> = { pressurePa: 98_500, airTempC: 28.5, trackTempC: 43.5 };

const example = ({ key, toText }: Measure): string => toText(EXAMPLES[key]) || '12.5';

function toReading(numbers: ReadonlyMap<MeasureKey, number | null>, values: FormValues): FormReading {
  const get = (key: MeasureKey) => numbers.get(key) ?? null;
  return {
    airTempC: get('airTempC'),
    relativeHumidity: get('relativeHumidity'),
    dewPointC: get('dewPointC'),
    wetBulbC: get('wetBulbC'),
    pressurePa: get('pressurePa'),
    pressureKind: get('pressurePa') === null ? null : pressureKindOf(values),
    trackTempC: get('trackTempC'),
    trackTempPlace: (values.trackTempPlace ?? '').trim(),
    windMps: get('windMps'),
    windDirDeg: get('windDirDeg'),
    cloudPct: get('cloudPct'),
  };
}

export const humidityKindOf = (values: FormValues): HumidityKey =>
  HUMIDITY_KEYS.find((key) => key === values.humidityKind) ?? 'relativeHumidity';

export const pressureKindOf = (values: FormValues): PressureKind =>
  values.pressureKind === 'altimeter' ? 'altimeter' : 'station';

type Stored = { [K in MeasureKey]: number | null } & { pressureKind: PressureKind | null; trackTempPlace: string };

/** A stored reading as the form shows it. */
export function formOfReading(reading: Stored, units: UnitSystem): Record<string, string> {
  const numbers = measuresOf(units).map((measure) => [measure.name, measure.toText(reading[measure.key])]);
  return { ...Object.fromEntries(numbers), ...kindsOf(reading), trackTempPlace: reading.trackTempPlace };
}

/** How the last reading was taken: the same meter is in the same hand. */
export function kindsOf(reading: Stored | null): { humidityKind: HumidityKey; pressureKind: PressureKind } {
  const humidityKind = HUMIDITY_KEYS.find((key) => reading?.[key] != null) ?? 'relativeHumidity';
  return { humidityKind, pressureKind: reading?.pressureKind ?? 'station' };
}

/** Field messages of the verb (SI names) under the names of the inputs. */
export function namedAsInputs(fields: Readonly<Record<string, string>>, units: UnitSystem): Record<string, string> {
  const byKey = new Map<string, string>(measuresOf(units).map(({ key, name }) => [key, name]));
  const pressure = measureOf('pressurePa', units).name;
  const aliases: Record<string, string> = { pressureKind: pressure, altitudeM: pressure, takenAt: 'takenAtLocal' };
  return Object.fromEntries(
    Object.entries(fields).map(([field, message]) => [byKey.get(field) ?? aliases[field] ?? field, message]),
  );
}
