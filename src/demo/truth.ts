/**
 * How the invented car really slips. Not the model's form on purpose: a ratio of clutch demand to tire grip through a saturating curve, a lopsided
 * grip hump over track temperature, wear that levels off, effects of place that come and go, and now and then shake or smoke. Every number
 * here is invented.
 */
import type { Random } from '@/evaluate/random';
import type { Lane, Settings } from '@/lib/domain/types';
import type { TrueWeather } from './weather';

/** What a place adds to ln(demand / grip), unknown to everybody. */
export interface Place {
  track: number;
  lanes: Readonly<Record<Lane, number>>;
  event: number;
}

export interface RunState {
  weather: TrueWeather;
  settings: Settings;
  runsOnDiscs: number;
  lane: Lane;
  place: Place;
  /** Passes already run at this event: rubber builds up. */
  passesAtEvent: number;
  /** Part of the season gone, 0-1. */
  season: number;
}

const LEAST_SLIP_PCT = 3;
const MOST_SLIP_PCT = 40;
const STEEPNESS = 4.8;
/** Puts slip at 15 % where demand equals grip. */
const MIDDLE = Math.log((15 - LEAST_SLIP_PCT) / (MOST_SLIP_PCT - 15));

const BEST_TRACK_C = 38;
const NEUTRAL = { clampLb: 458, launchRpm: 7400, delayS: 0.52, psi: 6.8, densityKgM3: 1.15 } as const;

/** Slip in percent before noise. */
export function expectedSlipPct(run: RunState): number {
  const lead = demand(run) - grip(run) + run.place.track + run.place.event + run.place.lanes[run.lane];
  const share = 1 / (1 + Math.exp(-(STEEPNESS * lead + MIDDLE)));
  return LEAST_SLIP_PCT + (MOST_SLIP_PCT - LEAST_SLIP_PCT) * share;
}

/** ln of what the clutch asks of the tire, 0 for the neutral car. */
function demand({ settings, weather, runsOnDiscs, season }: RunState): number {
  const { counterweight_g = 0, base_pressure_lb = 0, launch_rpm = 0, release_delay_s = 0 } = settings;
  const speed = launch_rpm / NEUTRAL.launchRpm;
  const clampLb = base_pressure_lb + 19 * counterweight_g * speed ** 2;
  const later = release_delay_s - NEUTRAL.delayS;
  const engine = 0.55 * Math.log(weather.densityKgM3 / NEUTRAL.densityKgM3) + 0.5 * Math.log(speed);
  const drift = 0.015 * Math.sin(2 * Math.PI * season);
  return Math.log(clampLb / NEUTRAL.clampLb) - 0.85 * later + 0.4 * later ** 2 + engine + discs(runsOnDiscs) + drift;
}

/** Fresh discs bite less until they are bedded; worn ones lose a little more each run, ever less. */
function discs(runs: number): number {
  return (runs === 0 ? -0.025 : 0) - 0.05 * (1 - Math.exp(-runs / 4));
}

/** ln of tire grip, 0 at its best. */
function grip({ weather, settings, passesAtEvent }: RunState): number {
  const off = weather.trackTempC - BEST_TRACK_C;
  const heat = off < 0 ? 0.00046 * (-off) ** 1.8 : 0.0015 * off ** 1.6;
  const damp = Math.max(0, 10 - (weather.trackTempC - weather.dewPointC));
  const over = (settings.tire_pressure_psi ?? NEUTRAL.psi) - NEUTRAL.psi;
  const rubber = 0.025 * (1 - Math.exp(-passesAtEvent / 4));
  return rubber - heat - 0.006 * damp ** 1.2 - 0.045 * over - 0.02 * over ** 2;
}

const drawLanes = (random: Random): Record<Lane, number> => ({
  left: random.normal(0, 0.012),
  right: random.normal(0, 0.012),
});

/** Draws what a track is like all year. */
export const drawTrack = (random: Random): Omit<Place, 'event'> => ({
  track: random.normal(0, 0.03),
  lanes: drawLanes(random),
});

/** Draws how the strip was prepared for one event. */
export const drawEvent = (random: Random): number => random.normal(0, 0.022);

export type Mishap = 'none' | 'shake' | 'smoke';

/** Slip as it came out: multiplicative noise, and a mishap more likely the farther the car is from its band. */
export function drawSlip(expectedPct: number, random: Random): { slipPct: number; mishap: Mishap } {
  const slipPct = expectedPct * Math.exp(random.normal(0, 0.085));
  const chance = random.uniform(0, 1);
  const smokes = 0.03 + 0.35 / (1 + Math.exp(-(slipPct - 25) / 2));
  const shakes = 0.025 + 0.35 / (1 + Math.exp((slipPct - 8) / 1.2));
  if (chance < smokes) return { slipPct: slipPct * random.uniform(1.3, 2), mishap: 'smoke' };
  if (chance > 1 - shakes) return { slipPct: slipPct * random.uniform(0.5, 0.75), mishap: 'shake' };
  return { slipPct, mishap: 'none' };
}
