/** What stands quietly beside each field: the last value at this track, in the way it is read now, and its age. */
import { fromNow } from '@/components/site/times';
import { altimeterSettingPa } from '@/lib/domain/air/pressure';
import { formatPercent, formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';
import type { ReadingView } from '@/lib/server/readings';

/** By field; a pressure is given in both kinds. */
export type PreviousHints = Readonly<Record<string, string>>;

export function previousHints(reading: ReadingView | null, units: UnitSystem, now: Date): PreviousHints {
  if (!reading) return {};
  const { conditions, air } = reading;
  const temperature = (celsius: number | null) => formatQuantity('airTemperature', celsius, units);
  const pressure = (pascal: number | null) => formatQuantity('pressure', pascal, units);
  const values = {
    airTempC: temperature(conditions.airTempC),
    relativeHumidity: formatPercent(conditions.relativeHumidity),
    dewPointC: temperature(air.dewPointC),
    wetBulbC: temperature(air.wetBulbC),
    station: pressure(conditions.stationPressurePa),
    altimeter: pressure(altimeterSettingPa(conditions.stationPressurePa, reading.altitudeM)),
    trackTempC: temperature(conditions.trackTempC),
  };
  const age = fromNow(reading.takenAt, now);
  const known = Object.entries(values).filter(([, text]) => text !== NO_VALUE);
  return Object.fromEntries(known.map(([key, text]) => [key, `${text}, ${age}`]));
}
