import type { Random } from '@/evaluate/random';
import { altimeterSettingPa } from '@/lib/domain/air/pressure';
import { cToF, fToC, inHgToPa, mphToMps, mpsToMph, paToInHg } from '@/lib/domain/units';
import type { PassReading } from '@/lib/pass-csv';
import { toNineDecimals } from '@/lib/pass-csv/numbers';
import type { PlannedTrack, ReadingHabit } from './calendar';

/** What one day is like before the hour is known. */
export interface DayWeather {
  meanC: number;
  dewPointC: number;
  /** 0-1. */
  cloud: number;
  pressurePa: number;
  windMps: number;
  windDirDeg: number;
}

/** The air and the track at a moment, as they are and not as they were read. */
export interface TrueWeather {
  airTempC: number;
  dewPointC: number;
  trackTempC: number;
  pressurePa: number;
  densityKgM3: number;
  windMps: number;
  windDirDeg: number;
  cloud: number;
}

const clamp = (value: number, low: number, high: number): number => Math.min(high, Math.max(low, value));

/** Draws a day: season, then the weather of the week. Simple shapes, not a climate model. */
export function dayWeather(track: PlannedTrack, date: string, random: Random): DayWeather {
  const { yearMeanC, julyAboveC, dewBelowC, cloudiness } = track.climate;
  const month = Number(date.slice(5, 7)) + Number(date.slice(8, 10)) / 31;
  const meanC = yearMeanC + julyAboveC * Math.cos((2 * Math.PI * (month - 7.6)) / 12) + random.normal(0, 2.5);
  return {
    meanC,
    dewPointC: meanC - Math.max(2, dewBelowC + random.normal(0, 2.5)),
    cloud: random.uniform(0, 1) < cloudiness ? random.uniform(0.5, 1) : random.uniform(0, 0.4),
    pressurePa: standardPressurePa(track.altitudeM) + random.normal(0, 320),
    windMps: Math.abs(random.normal(2.5, 1.5)),
    windDirDeg: 10 * random.integer(0, 35),
  };
}

/** Standard atmosphere, U.S. Standard Atmosphere 1976. */
const standardPressurePa = (altitudeM: number): number => 101_325 * (1 - 2.25577e-5 * altitudeM) ** 5.25588;

export function weatherAt(day: DayWeather, hour: number, random: Random): TrueWeather {
  const sun = Math.max(0, Math.sin((Math.PI * (hour - 6.5)) / 12.5));
  const airTempC = day.meanC + 7 * Math.sin((Math.PI * (hour - 9)) / 13) + random.normal(0, 0.6);
  const dewPointC = Math.min(day.dewPointC + random.normal(0, 0.5), airTempC - 0.5);
  const pressurePa = day.pressurePa - 8 * (hour - 13) + random.normal(0, 20);
  return {
    airTempC,
    dewPointC,
    trackTempC: airTempC + 19 * sun * (1 - 0.65 * day.cloud) + random.normal(0, 1.2),
    pressurePa,
    densityKgM3: (pressurePa - 0.378 * vapourPa(dewPointC)) / (287.05 * (airTempC + 273.15)),
    windMps: Math.max(0, day.windMps + random.normal(0, 0.8)),
    windDirDeg: (day.windDirDeg + 10 * random.integer(-2, 2) + 360) % 360,
    cloud: clamp(day.cloud + random.normal(0, 0.08), 0, 1),
  };
}

/** Magnus form with the constants of WMO-No. 8, Annex 4.B. */
const vapourPa = (c: number): number => 611.2 * Math.exp((17.62 * c) / (243.12 + c));

const toStep = (value: number, step: number): number => Math.round(value / step) * step;
/** A temperature as a thermometer in half degF shows it. */
const readTemperature = (c: number, sd: number, random: Random): number =>
  toNineDecimals(fToC(toStep(cToF(c + random.normal(0, sd)), 0.5)));
const readPressure = (pa: number): number => toNineDecimals(inHgToPa(Number(paToInHg(pa).toFixed(2))));

export interface Tuner {
  habit: ReadingHabit;
  /** Forgets nothing. */
  careful: boolean;
}

/** What the tuner reads and writes down: instrument error, instrument steps, and now and then nothing at all. */
export function readingOf(
  weather: TrueWeather,
  track: PlannedTrack,
  { habit, careful }: Tuner,
  random: Random,
): PassReading {
  const forgotten = careful ? 0.5 : random.uniform(0, 1);
  return {
    airTempC: readTemperature(weather.airTempC, 0.3, random),
    ...humidityRead(weather, forgotten < 0.02 ? null : habit, random),
    ...pressureRead(weather, track, habit),
    altitudeM: track.altitudeM,
    trackTempC: forgotten > 0.96 ? null : readTemperature(weather.trackTempC, 0.8, random),
    windMps: toNineDecimals(mphToMps(Math.round(mpsToMph(weather.windMps)))),
    windDirDeg: weather.windDirDeg,
  };
}

type HumidityRead = Pick<PassReading, 'relativeHumidity' | 'dewPointC' | 'wetBulbC'>;

function humidityRead(weather: TrueWeather, habit: ReadingHabit | null, random: Random): HumidityRead {
  const none = { relativeHumidity: null, dewPointC: null, wetBulbC: null };
  if (habit === null) return none;
  if (habit === 'dew-point') return { ...none, dewPointC: readTemperature(weather.dewPointC, 0.2, random) };
  const truePct = (100 * vapourPa(weather.dewPointC)) / vapourPa(weather.airTempC);
  return { ...none, relativeHumidity: clamp(Math.round(truePct + random.normal(0, 1)), 2, 98) / 100 };
}

function pressureRead(
  weather: TrueWeather,
  track: PlannedTrack,
  habit: ReadingHabit,
): Pick<PassReading, 'pressurePa' | 'pressureKind'> {
  if (habit !== 'altimeter') return { pressurePa: readPressure(weather.pressurePa), pressureKind: 'station' };
  const setting = altimeterSettingPa(weather.pressurePa, track.altitudeM) ?? weather.pressurePa;
  return { pressurePa: readPressure(setting), pressureKind: 'altimeter' };
}
