/** The reading a row holds: which humidity and which pressure were read, and what cannot be true together. */

import { FRACTION_AS_PERCENT_MAX, KIND_TELLS_FROM_M, SEA_LEVEL_NEAR_PA } from '@/lib/domain/air/limits';
import { stationPressureOf } from '@/lib/domain/air/pressure';
import type { NumberField } from './columns';
import type { FileReading, RowCells } from './row-cells';
import type { PassReading } from './types';

const SEA_LEVEL_PA = 101_325;
/** Two good thermometers may differ by this much, degC. */
const THERMOMETER_SLACK_C = 0.3;

/** Reads the conditions of a row. Refuses a dew point or wet bulb above the air temperature. */
export function readReading(cells: RowCells, file: FileReading): PassReading {
  const number = (field: NumberField) => cells.numbers.get(field) ?? null;
  refuseAboveAir(cells, file, 'dewPointC', 'The dew point');
  refuseAboveAir(cells, file, 'wetBulbC', 'The wet bulb');
  return {
    airTempC: number('airTempC'),
    ...humidityOf(cells, file),
    ...pressureOf(cells, file),
    altitudeM: number('altitudeM'),
    trackTempC: number('trackTempC'),
    windMps: number('windMps'),
    windDirDeg: number('windDirDeg'),
  };
}

function refuseAboveAir(cells: RowCells, file: FileReading, field: 'dewPointC' | 'wetBulbC', title: string): void {
  const value = cells.numbers.get(field);
  const airTempC = cells.numbers.get('airTempC');
  if (value === undefined || airTempC === undefined || value <= airTempC + THERMOMETER_SLACK_C) return;
  cells.refuse(columnOf(file, field), `${title} cannot be above the air temperature. Check both and their units.`);
}

const columnOf = (file: FileReading, field: NumberField): string | null =>
  file.header.columns.find(({ meaning }) => meaning.kind === 'number' && meaning.column.field === field)?.name ?? null;

function humidityOf(
  cells: RowCells,
  file: FileReading,
): Pick<PassReading, 'relativeHumidity' | 'dewPointC' | 'wetBulbC'> {
  const none = { relativeHumidity: null, dewPointC: null, wetBulbC: null };
  const given = (['relativeHumidity', 'dewPointC', 'wetBulbC'] as const).filter((field) => cells.numbers.has(field));
  const [used, ...left] = given;
  if (used === undefined) return none;
  if ((cells.numbers.get('relativeHumidity') ?? 1) <= FRACTION_AS_PERCENT_MAX) {
    file.tally.add('the relative humidity is 1 % or less; if it was a fraction, write 45 for 0.45.', cells.row);
  }
  if (left.length > 0) {
    file.tally.add(`more than one humidity is given; ${columnOf(file, used)} was used, the rest ignored.`, cells.row);
  }
  return { ...none, [used]: cells.numbers.get(used) ?? null };
}

function pressureOf(cells: RowCells, file: FileReading): Pick<PassReading, 'pressurePa' | 'pressureKind'> {
  const station = cells.numbers.get('stationPressurePa');
  const altimeter = cells.numbers.get('altimeterPa');
  const altitudeM = cells.numbers.get('altitudeM') ?? null;
  if (station !== undefined) {
    if (altimeter !== undefined)
      file.tally.add('both pressures are given; the altimeter setting was ignored.', cells.row);
    if (looksSeaLevel(station, altitudeM)) {
      file.tally.add(
        'the station pressure looks sea-level corrected for this altitude; if it is, name the column altimeter_inhg or altimeter_hpa.',
        cells.row,
      );
    }
    return { pressurePa: station, pressureKind: 'station' };
  }
  if (altimeter === undefined) return { pressurePa: null, pressureKind: null };
  noteAltimeter(altimeter, altitudeM, cells, file);
  return { pressurePa: altimeter, pressureKind: 'altimeter' };
}

const looksSeaLevel = (pa: number, altitudeM: number | null): boolean =>
  altitudeM !== null && altitudeM > KIND_TELLS_FROM_M && Math.abs(pa - SEA_LEVEL_PA) < SEA_LEVEL_NEAR_PA;

function noteAltimeter(pa: number, altitudeM: number | null, cells: RowCells, file: FileReading): void {
  const known = stationPressureOf(pa, 'altimeter', altitudeM) !== null;
  const text = known
    ? 'the altimeter setting is converted to station pressure with the altitude of the row.'
    : 'an altimeter setting without an altitude cannot be converted: the pressure counts as not measured.';
  file.tally.add(text, cells.row);
}
