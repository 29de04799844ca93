import type { Conditions } from '@/lib/domain/types';
import type { Random } from './random';

/** A day's weather at an invented track: mean air temperature, relative humidity at that temperature, cloud 0-1. */
export interface DayWeather {
  meanC: number;
  humidity: number;
  cloud: number;
}

/** What the surface's grip depends on. */
export interface SurfaceState {
  trackTempC: number;
  densityKgM3: number;
  /** Track temperature minus dew point, degC. */
  dewMarginC: number;
}

export interface Climate extends SurfaceState {
  conditions: Conditions;
}

const vapourPa = (c: number): number => 611.2 * Math.exp((17.62 * c) / (243.12 + c));

/** Plausible conditions at an hour of the day. Simple formulas on purpose: independent of the product's own air code. */
export function conditionsFromClimate(day: DayWeather, hour: number, altitudeM: number, random: Random): Climate {
  const sun = Math.max(0, Math.sin((Math.PI * (hour - 6)) / 13));
  const airTempC = day.meanC + 6 * (sun - 0.5) + random.normal(0, 0.8);
  const relativeHumidity = Math.min(0.98, (day.humidity * vapourPa(day.meanC)) / vapourPa(airTempC));
  const stationPressurePa = 101_325 * (1 - 2.25577e-5 * altitudeM) ** 5.25588 + random.normal(0, 300);
  const trackTempC = airTempC + 20 * sun * (1 - 0.7 * day.cloud) + random.normal(0, 1.5);
  const round = (v: number, d: number): number => Number(v.toFixed(d));
  const conditions = {
    airTempC: round(airTempC, 2),
    relativeHumidity: round(relativeHumidity, 4),
    stationPressurePa: Math.round(stationPressurePa),
    trackTempC: round(trackTempC, 2),
  };
  return { conditions, ...surfaceState(conditions) };
}

/** The surface under conditions of which all four are known; a missing one is a mistake of the caller. */
export function surfaceState({ airTempC, relativeHumidity, stationPressurePa, trackTempC }: Conditions): SurfaceState {
  const e = relativeHumidity! * vapourPa(airTempC!);
  const ln = Math.log(e / 611.2);
  return {
    trackTempC: trackTempC!,
    densityKgM3: (stationPressurePa! - 0.378 * e) / (287.05 * (airTempC! + 273.15)),
    dewMarginC: trackTempC! - (243.12 * ln) / (17.62 - ln),
  };
}
