import { seededRandom } from '@/evaluate/random';
import { sunElevationDeg } from '@/lib/domain/air/sun';
import type { TrackReading } from '@/lib/domain/model/track-temperature';

const PLACES = [
  { track: 'Low', latitudeDeg: 33.5, longitudeDeg: -86.2, warmthC: 3, gainC: 26 },
  { track: 'North', latitudeDeg: 42.1, longitudeDeg: -88.0, warmthC: -2, gainC: 20 },
  { track: 'West', latitudeDeg: 39.6, longitudeDeg: -105.1, warmthC: -1, gainC: 23 },
] as const;

const STEP_HOURS = 0.25;
const round = (v: number): number => Number(v.toFixed(1));

/** Hours of daylight: cos H = -tan(latitude) tan(declination), the plain formula without refraction. */
function daylightHours(latitudeDeg: number, dayOfYear: number): number {
  const declination = ((23.44 * Math.PI) / 180) * Math.sin((2 * Math.PI * (dayOfYear - 81)) / 365);
  return (24 / Math.PI) * Math.acos(-Math.tan((latitudeDeg * Math.PI) / 180) * Math.tan(declination));
}

/**
 * Share of the day's range reached at an hour of solar time. Source of the form: Parton & Logan, Agricultural Meteorology 23 (1981)
 * 205-216, with the warmest hour `lag` after noon (1.86 h there, 2.59 h in Wann et al., Agr. Forest Meteorol. 34 (1985) 121-128).
 */
function warmthAt(hour: number, daylight: number, lag: number): number {
  const rise = 12 - daylight / 2;
  const byDay = (h: number): number => Math.sin((Math.PI * (h - rise)) / (daylight + 2 * lag));
  const set = 12 + daylight / 2;
  return hour <= set ? byDay(hour) : byDay(set) * Math.exp((-2.2 * (hour - set)) / (24 - daylight));
}

/**
 * Readings of an invented season of track days. The surface warms by a heat balance stepped through the day (sun in, loss in
 * proportion to how far it stands above the air), cloud wanders, air follows its own clock: not the form of the forecast under test.
 */
export function diurnalSeason(seed: number, days = 24, cloudKnown = true): TrackReading[] {
  const random = seededRandom(seed);
  const readings: TrackReading[] = [];
  for (let d = 0; d < days; d++) {
    const place = PLACES[random.integer(0, PLACES.length - 1)]!;
    const season = Math.sin((Math.PI * d) / Math.max(1, days - 1));
    const midnight = Date.UTC(2026, 2, 1) + d * 9 * 86_400_000 - Math.round(place.longitudeDeg / 15) * 3_600_000;
    const coolestC = 7 + 12 * season + place.warmthC + random.normal(0, 3);
    const daylight = daylightHours(place.latitudeDeg, 60 + 9 * d);
    const lag = random.uniform(1.5, 3);
    const hoursToWarm = random.uniform(0.8, 1.6);
    let cloud = random.uniform(0, 1);
    const rangeC = 15 - 8 * cloud + random.normal(0, 1);
    let weather = 0;
    let surfaceC = coolestC;
    const due = new Set([10, 12, 14, 16.5, 19].map((h) => Math.round((h + random.uniform(-0.7, 0.7)) / STEP_HOURS)));
    for (let k = 24; k <= 84; k++) {
      const hour = k * STEP_HOURS;
      const time = new Date(midnight + hour * 3_600_000).toISOString();
      cloud = Math.min(1, Math.max(0, cloud + random.normal(0, 0.06)));
      weather = 0.97 * weather + random.normal(0, 0.35);
      const airC = coolestC + rangeC * Math.max(0, warmthAt(hour, daylight, lag)) + weather;
      const sine = Math.sin(((sunElevationDeg(time, place.latitudeDeg, place.longitudeDeg) ?? 0) * Math.PI) / 180);
      const sun = place.gainC * Math.max(0, sine) * (1 - 0.7 * cloud ** 2);
      surfaceC += (STEP_HOURS / hoursToWarm) * (airC + sun - surfaceC);
      if (!due.has(k)) continue;
      readings.push({
        track: place.track,
        latitudeDeg: place.latitudeDeg,
        longitudeDeg: place.longitudeDeg,
        time,
        airTempC: round(airC + random.normal(0, 0.4)),
        trackTempC: round(surfaceC + random.normal(0, 1.2)),
        cloud: cloudKnown ? round(cloud) : null,
      });
    }
  }
  return readings;
}
