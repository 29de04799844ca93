/** A stored reading in words: what was read, and what follows from it. */
import { formatNumber, formatPercent, formatQuantity, NO_VALUE, type UnitSystem } from '@/lib/domain/display';
import type { ReadingView } from '@/lib/server/readings';
import { airLines } from './live';

interface Line {
  label: string;
  value: string;
}

export function storedLines(reading: ReadingView, units: UnitSystem): { read: Line[]; derived: Line[] } {
  return {
    read: readLines(reading, units).filter(({ value }) => value !== NO_VALUE),
    derived: derivedLines(reading, units),
  };
}

function readLines(reading: ReadingView, units: UnitSystem): Line[] {
  const temperature = (celsius: number | null) => formatQuantity('airTemperature', celsius, units);
  const kind = reading.pressureKind === 'altimeter' ? 'Altimeter setting' : 'Station pressure';
  const place = reading.trackTempPlace ? ` (${reading.trackTempPlace})` : '';
  return [
    { label: 'Air temperature', value: temperature(reading.airTempC) },
    { label: 'Relative humidity', value: formatPercent(reading.relativeHumidity) },
    { label: 'Dew point', value: temperature(reading.dewPointC) },
    { label: 'Wet bulb', value: temperature(reading.wetBulbC) },
    { label: kind, value: formatQuantity('pressure', reading.pressurePa, units) },
    { label: `Track temperature${place}`, value: temperature(reading.trackTempC) },
    { label: 'Wind', value: windText(reading, units) },
    { label: 'Cloud', value: formatPercent(reading.cloudPct === null ? null : reading.cloudPct / 100) },
  ];
}

function windText({ windMps, windDirDeg }: ReadingView, units: UnitSystem): string {
  const speed = formatQuantity('windSpeed', windMps, units);
  return windDirDeg === null || speed === NO_VALUE ? speed : `${speed} from ${formatNumber(windDirDeg, 0)}°`;
}

function derivedLines(reading: ReadingView, units: UnitSystem): Line[] {
  const place = {
    name: reading.trackName,
    altitudeM: reading.altitudeM,
    latitudeDeg: null,
    longitudeDeg: null,
    previous: null,
  };
  const lines = airLines(reading, place, reading.takenAt, units).filter(
    ({ key }) => !readAlready(reading).includes(key),
  );
  const station = {
    label: 'Pressure at the station',
    value: formatQuantity('pressure', reading.conditions.stationPressurePa, units),
  };
  const converted = reading.pressureKind === 'altimeter' ? [station] : [];
  const sun = reading.sunElevationDeg;
  const sunLine =
    sun === null ? [] : [{ label: 'Sun above horizon', value: sun < 0 ? 'below it' : `${formatNumber(sun, 0)}°` }];
  return [...converted, ...lines, ...sunLine];
}

// The sun needs the position of the track, which the reading does not carry; what was read is not derived.
const readAlready = ({ relativeHumidity, dewPointC }: ReadingView): string[] => [
  'sun',
  ...(relativeHumidity === null ? [] : ['humidity']),
  ...(dewPointC === null ? [] : ['dewPoint']),
];

/** One line for a list: "84.2 °F · 45 % · 24.19 inHg · track 118.0 °F · DA 8,240 ft". */
export function shortText({ conditions, air }: ReadingView, units: UnitSystem): string {
  const parts = [
    formatQuantity('airTemperature', conditions.airTempC, units),
    formatPercent(conditions.relativeHumidity),
    formatQuantity('pressure', conditions.stationPressurePa, units),
    prefixed('track', formatQuantity('trackTemperature', conditions.trackTempC, units)),
    prefixed('density altitude', formatQuantity('altitude', air.densityAltitudeM, units)),
  ];
  return parts.filter((part) => part !== NO_VALUE).join(' · ') || 'nothing that gives the air';
}

const prefixed = (word: string, text: string): string => (text === NO_VALUE ? text : `${word} ${text}`);
