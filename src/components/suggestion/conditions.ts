import { formatPercent, formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';
import type { ReadingView } from '@/lib/server/readings';

export interface StampLine {
  label: string;
  value: string;
}

/** The conditions a result rests on, in the team's units; what was not read is left out. */
export function conditionLines(reading: ReadingView, units: UnitSystem): StampLine[] {
  const { conditions, air } = reading;
  const lines = [
    { label: 'Track', value: formatQuantity('trackTemperature', conditions.trackTempC, units) },
    { label: 'Air', value: formatQuantity('airTemperature', conditions.airTempC, units) },
    { label: 'Humidity', value: formatPercent(conditions.relativeHumidity) },
    { label: 'Station pressure', value: formatQuantity('pressure', conditions.stationPressurePa, units) },
    { label: 'Density altitude', value: formatQuantity('altitude', air.densityAltitudeM, units) },
    { label: 'Air density', value: formatQuantity('density', air.densityKgM3, units) },
  ];
  return lines.filter((line) => line.value !== NO_VALUE);
}

/** A reading older than this when it is used is said loudly. The track surface can move by several degrees in that time. */
export const OLD_READING_MS = 30 * 60_000;

export const isOld = (takenAt: string, at: string | Date): boolean =>
  new Date(at).getTime() - Date.parse(takenAt) > OLD_READING_MS;
