/** What the typed numbers mean, as they are typed: derived air, station pressure, and questions about likely slips. */
import { airSummary, conditionsFromReading, type RawReading, sunElevationDeg } from '@/lib/domain/air/conditions';
import { type ReadingCheck, readingChecks } from '@/lib/domain/air/plausibility';
import { formatNumber, formatPercent, formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';

/** What is known around the reading that is being entered. */
export interface Place {
  name: string;
  altitudeM: number | null;
  latitudeDeg: number | null;
  longitudeDeg: number | null;
  /** The reading before this one at the same track. */
  previous: (RawReading & { takenAt: string }) | null;
}

export interface AirLine {
  key: string;
  label: string;
  value: string;
}

type Measured = Omit<RawReading, 'altitudeM'>;

const at = (reading: Measured, place: Pick<Place, 'altitudeM'>): RawReading => ({
  ...reading,
  altitudeM: place.altitudeM,
});

/** The derived numbers in the team's units; a dash where the reading does not give one. */
export function airLines(reading: Measured, place: Place, takenAt: string, units: UnitSystem): AirLine[] {
  const conditions = conditionsFromReading(at(reading, place));
  const air = airSummary(conditions);
  const sun = sunElevationDeg(takenAt, place.latitudeDeg, place.longitudeDeg);
  const line = (key: string, label: string, value: string): AirLine => ({ key, label, value });
  return [
    line('densityAltitude', 'Density altitude', formatQuantity('altitude', air.densityAltitudeM, units)),
    line('density', 'Air density', formatQuantity('density', air.densityKgM3, units)),
    line('grains', units === 'us' ? 'Grains of water' : 'Water in the air', waterText(air.humidityRatio, units)),
    line('vapor', 'Vapor pressure', formatQuantity('vapourPressure', air.vapourPressurePa, units)),
    line('dewPoint', 'Dew point', formatQuantity('airTemperature', air.dewPointC, units)),
    line('humidity', 'Relative humidity', formatPercent(conditions.relativeHumidity)),
    line('sun', 'Sun above horizon', sunText(sun)),
  ];
}

const waterText = (ratio: number | null, units: UnitSystem): string => formatQuantity('grains', ratio, units);

function sunText(elevationDeg: number | null): string {
  if (elevationDeg === null) return NO_VALUE;
  return elevationDeg < 0 ? 'below it' : `${formatNumber(elevationDeg, 0)}°`;
}

/** What an altimeter setting is at the track. Empty for a station pressure, none, or a track whose altitude is not known: that is asked. */
export function stationNote(reading: Measured, place: Place, units: UnitSystem): string {
  if (reading.pressureKind !== 'altimeter' || reading.pressurePa === null || place.altitudeM === null) return '';
  const { stationPressurePa } = conditionsFromReading(at(reading, place));
  const altitude = formatQuantity('altitude', place.altitudeM, units);
  return `= ${formatQuantity('pressure', stationPressurePa, units)} at the station, from the track's altitude ${altitude}.`;
}

/** Likely slips of a reading at its place and time. */
export function checksOf(reading: Measured, place: Place, takenAt: string, units: UnitSystem): ReadingCheck[] {
  return readingChecks(at(reading, place), { ...place, takenAt, units });
}
