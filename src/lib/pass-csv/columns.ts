/** Every column of a pass file: names, units, and what is possible. Limits are in the stored unit (SI). */
import type { Limit } from '@/lib/domain/air/limits';
import type { UnitSystem } from '@/lib/domain/display';
import type { Adjustable } from '@/lib/domain/types';
import { type ColumnUnit, twinOf, UNIT } from './column-units';
import { VALUE_LIMITS } from './value-limits';

/** One name a quantity may be given under, with the unit it is in. `system` null: the same in both systems. */
export interface ColumnForm {
  name: string;
  unit: ColumnUnit;
  system: UnitSystem | null;
}

export interface NumberColumn {
  field: NumberField;
  /** How messages name the quantity. */
  title: string;
  range: Limit;
  whole: boolean;
  optional: boolean;
  forms: readonly ColumnForm[];
}

export type NumberField =
  | 'passNo'
  | 'airTempC'
  | 'relativeHumidity'
  | 'dewPointC'
  | 'wetBulbC'
  | 'stationPressurePa'
  | 'altimeterPa'
  | 'altitudeM'
  | 'trackTempC'
  | 'windMps'
  | 'windDirDeg'
  | 'runsOnDiscs'
  | 'slipPct'
  | 'sixtyFtS'
  | 'threeThirtyFtS'
  | 'eighthS'
  | 'eighthMps'
  | 'thousandFtS'
  | 'quarterS'
  | 'quarterMps';

export type TextField =
  | 'event'
  | 'track'
  | 'date_time'
  | 'round'
  | 'lane'
  | 'outcome'
  | 'excluded'
  | 'excluded_reason'
  | 'notes';

type Forms = readonly ColumnForm[];
const us = (name: string, unit: ColumnUnit): ColumnForm => ({ name, unit, system: 'us' });
const metric = (name: string, unit: ColumnUnit): ColumnForm => ({ name, unit, system: 'metric' });
const plain = (name: string, unit: ColumnUnit): Forms => [{ name, unit, system: null }];
const temperature = (stem: string): Forms => [us(`${stem}_f`, UNIT.f), metric(`${stem}_c`, UNIT.c)];
const speed = (stem: string): Forms => [us(`${stem}_mph`, UNIT.mph), metric(`${stem}_kmh`, UNIT.kmh)];
const pressure = (stem: string): Forms => [
  us(`${stem}_inhg`, UNIT.inhg),
  metric(`${stem}_hpa`, UNIT.hpa),
  metric(`${stem}_kpa`, UNIT.kpa),
];

function column(field: NumberField, title: string, forms: Forms, more: Partial<NumberColumn> = {}): NumberColumn {
  return { field, title, forms, range: VALUE_LIMITS[field], whole: false, optional: false, ...more };
}

/** In the order they are written. */
export const NUMBER_COLUMNS: readonly NumberColumn[] = [
  column('passNo', 'Pass number', plain('pass_no', UNIT.count), { whole: true }),
  column('airTempC', 'Air temperature', temperature('air_temp')),
  column('relativeHumidity', 'Relative humidity', plain('relative_humidity_pct', UNIT.pct)),
  column('dewPointC', 'Dew point', temperature('dew_point'), { optional: true }),
  column('wetBulbC', 'Wet bulb', temperature('wet_bulb'), { optional: true }),
  column('stationPressurePa', 'Station pressure', pressure('station_pressure')),
  column('altimeterPa', 'Altimeter setting', pressure('altimeter'), { optional: true }),
  column('altitudeM', 'Altitude', [us('altitude_ft', UNIT.ft), metric('altitude_m', UNIT.m)]),
  column('trackTempC', 'Track temperature', temperature('track_temp')),
  column('windMps', 'Wind speed', speed('wind')),
  column('windDirDeg', 'Wind direction', plain('wind_dir_deg', UNIT.deg)),
  column('runsOnDiscs', 'Runs on discs', plain('runs_on_discs', UNIT.count), { whole: true }),
  column('slipPct', 'Slip', plain('slip_pct', UNIT.percent)),
  column('sixtyFtS', '60-ft time', plain('sixty_ft_s', UNIT.s)),
  column('threeThirtyFtS', '330-ft time', plain('three_thirty_ft_s', UNIT.s)),
  column('eighthS', '660-ft time', plain('eighth_s', UNIT.s)),
  column('eighthMps', '660-ft speed', speed('eighth')),
  column('thousandFtS', '1000-ft time', plain('thousand_ft_s', UNIT.s), { optional: true }),
  column('quarterS', '1320-ft time', plain('quarter_s', UNIT.s), { optional: true }),
  column('quarterMps', '1320-ft speed', speed('quarter'), { optional: true }),
];

export const TEXT_COLUMNS: readonly TextField[] = [
  'event',
  'track',
  'date_time',
  'round',
  'lane',
  'outcome',
  'excluded',
  'excluded_reason',
  'notes',
];

/** Without one of these a row cannot be told from another. */
export const REQUIRED_COLUMNS = ['pass_no', 'date_time', 'event', 'track'] as const;
export const OPTIONAL_TEXT_COLUMNS: readonly TextField[] = ['excluded', 'excluded_reason'];

/** Names a pass file uses itself: an adjustable cannot have one of them as its key. */
export const RESERVED_COLUMNS: ReadonlySet<string> = new Set([
  ...TEXT_COLUMNS,
  ...NUMBER_COLUMNS.flatMap((entry) => entry.forms.map((form) => form.name)),
]);

/** The names an adjustable may be given under: its key, and its twin in the other system of units. */
export function adjustableForms(adjustable: Adjustable): ColumnForm[] {
  const own = { name: adjustable.key, unit: { ...UNIT.count, label: adjustable.unit }, system: null };
  const twin = twinOf(adjustable.key);
  return twin ? [own, twin] : [own];
}
