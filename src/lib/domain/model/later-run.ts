import { dewPointC, humidityFromDewPoint } from '../air/humidity';
import { normalQuantile } from '../stats/special';
import type { Conditions, Forecast } from '../types';
import { runFeatures } from './features';
import { forecastLog } from './forecast';
import { mixtureForecast } from './mixture';
import type { PlannedRun } from './sensitivity';
import type { TrackTempForecast } from './track-temperature';
import type { TrainedModel } from './train';

/** Equally likely track temperatures that stand for the whole distribution. */
export const TRACK_TEMP_POINTS = 15;

/**
 * `count` equally likely values of a standard normal (middles of equal shares), stretched so that their sd is exactly 1: plain middles
 * would lose some of the tails.
 */
export function normalPoints(count: number): number[] {
  const middles = Array.from({ length: count }, (_, i) => normalQuantile((i + 0.5) / count));
  const sd = Math.sqrt(middles.reduce((s, z) => s + z * z, 0) / count);
  return sd > 0 ? middles.map((z) => z / sd) : middles;
}

/** Conditions at the planned time: track and air as expected, moisture in the air and pressure as they are now. */
export function laterConditions(now: Conditions, later: TrackTempForecast, trackTempC = later.meanC): Conditions {
  const dewPoint = dewPointC(now.airTempC, now.relativeHumidity);
  const humidity = humidityFromDewPoint(later.airMeanC, dewPoint);
  return {
    airTempC: later.airMeanC,
    // Air that has cooled below its dew point is saturated.
    relativeHumidity: dewPoint === null ? null : (humidity ?? 1),
    stationPressurePa: now.stationPressurePa,
    trackTempC,
  };
}

/**
 * The forecast of slip for a later run time: today's conditions carried forward, and the forecast averaged over what the track temperature
 * may then be, so that not knowing it widens the answer. `run` holds the conditions as they are now.
 */
export function forecastLater(
  model: TrainedModel,
  run: PlannedRun,
  later: TrackTempForecast,
  points: number = TRACK_TEMP_POINTS,
): Forecast {
  const spread = later.sdC > 0 ? normalPoints(points) : [0];
  const parts = spread.map((z) => forecastAt(model, run, later, later.meanC + z * later.sdC));
  return mixtureForecast(parts, model.band);
}

function forecastAt(model: TrainedModel, run: PlannedRun, later: TrackTempForecast, trackTempC: number) {
  const conditions = laterConditions(run.context.conditions, later, trackTempC);
  const features = runFeatures({ ...run.context, conditions, settings: run.settings }, run.roundInEvent);
  return forecastLog(model, features).forecast;
}
