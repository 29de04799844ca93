/**
 * Invented seasons with known truth, for measuring the model (npm run evaluate) and for tests. None has the model's own form
 * unless its name says so. Everything is drawn from a seeded generator: the same seed gives the same season.
 */

import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import type { Adjustable, Conditions, Lane, PassRecord, Settings } from '@/lib/domain/types';
import { conditionsFromClimate } from './climate';
import { type Random, seededRandom } from './random';

export interface GeneratorOptions {
  name: string;
  events: number;
  passesPerEvent: number;
  tracks: number;
  /** ln slip from conditions. */
  surface: 'linear' | 'hump' | 'wave';
  noiseSd: number;
  outlierShare: number;
  outlierScale: number;
  trackSd: number;
  laneSd: number;
  eventSd: number;
  /** ln-slip shift from this share of the season on (a tyre batch). */
  shiftAt: number | null;
  shiftSize: number;
  /** True effects as a multiple of the belief means; one per adjustable is drawn around it. */
  effectFactor: number;
  effectSpread: number;
  wrongSignKey: string | null;
  /** Chance that a condition or setting is not recorded. */
  blankShare: number;
  extraAdjustables: number;
  dropHumidity: boolean;
  /** How strongly the chief reacts to conditions and to the last slip, 0-1. */
  reaction: number;
}

export interface SimulatedSeason {
  passes: PassRecord[];
  adjustables: Adjustable[];
  /** ln slip expected for a pass with other settings, all effects included, and the noise sd around it. */
  truth(index: number, settings: Settings): { logMean: number; noiseSd: number };
}

const BASE: GeneratorOptions = {
  name: 'base',
  events: 18,
  passesPerEvent: 9,
  tracks: 5,
  surface: 'hump',
  noiseSd: 0.1,
  outlierShare: 0.06,
  outlierScale: 4,
  trackSd: 0.12,
  laneSd: 0.05,
  eventSd: 0.08,
  shiftAt: null,
  shiftSize: 0,
  effectFactor: 1,
  effectSpread: 0.4,
  wrongSignKey: null,
  blankShare: 0,
  extraAdjustables: 0,
  dropHumidity: false,
  reaction: 0.7,
};

export const GENERATORS: readonly GeneratorOptions[] = [
  { ...BASE, name: 'linear', surface: 'linear', outlierShare: 0.02 },
  { ...BASE, name: 'nonlinear' },
  { ...BASE, name: 'nonlinear-wave', surface: 'wave', noiseSd: 0.13 },
  { ...BASE, name: 'shifted', shiftAt: 0.5, shiftSize: 0.25 },
  { ...BASE, name: 'heavy-outliers', outlierShare: 0.15, outlierScale: 5 },
  { ...BASE, name: 'few-tracks', tracks: 2 },
  { ...BASE, name: 'one-track', tracks: 1 },
  { ...BASE, name: 'many-adjustables', extraAdjustables: 6 },
  { ...BASE, name: 'missing-columns', dropHumidity: true, blankShare: 0.1 },
  { ...BASE, name: 'quiet', noiseSd: 0.05, outlierShare: 0.03, eventSd: 0.04 },
  { ...BASE, name: 'noisy', noiseSd: 0.2, eventSd: 0.12 },
  { ...BASE, name: 'belief-half', effectFactor: 0.5 },
  { ...BASE, name: 'belief-double', effectFactor: 2 },
  { ...BASE, name: 'belief-wrong-sign', wrongSignKey: 'counterweight_g' },
];

function extraAdjustable(i: number): Adjustable {
  return {
    key: `extra_${i}_mm`,
    label: `Extra ${i}`,
    unit: 'mm',
    step: 0.5,
    low: 0,
    high: 10,
    minutes: 10 + i,
    group: i % 2 === 0 ? 'clutch' : 'launch',
    movable: true,
    belief: i % 3 === 0 ? null : { meanPct: i % 2 === 0 ? 0.5 : -0.5, sdPct: 0.5 },
  };
}

function surfaceEffect(
  kind: GeneratorOptions['surface'],
  trackTempC: number,
  density: number,
  dewMarginC: number,
): number {
  const warm = (trackTempC - 36) / 12;
  const dew = Math.max(0, 8 - dewMarginC) / 8;
  if (kind === 'linear') return 0.12 * warm + 0.1 * ((density - 1.15) / 0.04);
  const hump = warm > 0 ? 0.12 * warm * warm : 0.2 * warm * warm;
  const ripple = kind === 'wave' ? 0.08 * Math.sin(2.2 * warm) : 0;
  return Math.min(0.9, hump) + ripple + 0.09 * ((density - 1.15) / 0.04) + 0.18 * dew;
}

const wear = (runs: number): number => -0.1 * (1 - Math.exp(-runs / 4)) + (runs === 0 ? 0.06 : 0);

function defaultSettings(adjustables: readonly Adjustable[]): Record<string, number> {
  return Object.fromEntries(
    adjustables.map((a) => [a.key, a.low + Math.round((a.high - a.low) / 2 / a.step) * a.step]),
  );
}

const clampTo = (a: Adjustable, v: number): number => Math.min(a.high, Math.max(a.low, Number(v.toFixed(6))));

/** Draws one season. `seed` and the options decide everything. */
export function simulateSeason(options: GeneratorOptions, seed: number): SimulatedSeason {
  const random = seededRandom(seed * 7919 + options.name.length * 131);
  const adjustables = [
    ...DEFAULT_ADJUSTABLES,
    ...Array.from({ length: options.extraAdjustables }, (_, i) => extraAdjustable(i)),
  ];
  const middle = defaultSettings(adjustables);
  const effects = drawEffects(adjustables, options, random);
  const tracks = Array.from({ length: options.tracks }, (_, i) => ({
    name: `Track ${i + 1}`,
    altitudeM: i === 1 ? 1500 : random.uniform(20, 400),
    warmthC: random.uniform(-4, 6),
    effect: random.normal(0, options.trackSd),
    lanes: { left: random.normal(0, options.laneSd), right: random.normal(0, options.laneSd) },
  }));
  const passes: PassRecord[] = [];
  const logBase: number[] = [];
  let settings = { ...middle };
  let runs = 0;
  let lastLog = Math.log(15);
  let passNo = 0;
  for (let e = 0; e < options.events; e++) {
    const season = e / Math.max(1, options.events - 1);
    const trackIndex = e < options.tracks ? e : random.integer(0, options.tracks - 1);
    const track = tracks[trackIndex]!;
    const eventEffect = random.normal(0, options.eventSd);
    const shift = options.shiftAt !== null && season >= options.shiftAt ? options.shiftSize : 0;
    const day = Date.UTC(2026, 1, 15) + e * 13 * 86_400_000;
    const weather = {
      meanC: 16 + 13 * Math.sin(Math.PI * season) + track.warmthC + random.normal(0, 3),
      humidity: random.uniform(0.25, 0.75),
      cloud: random.uniform(0, 1),
    };
    for (let p = 0; p < options.passesPerEvent; p++) {
      passNo++;
      const hour = 10 + (p % 3) * 4 + random.uniform(-0.7, 0.7);
      const climate = conditionsFromClimate(weather, hour, track.altitudeM, random);
      const lane: Lane = random.uniform(0, 1) < 0.5 ? 'left' : 'right';
      if (runs > 7 || random.uniform(0, 1) < 0.1) runs = 0;
      const base =
        Math.log(15) +
        surfaceEffect(options.surface, climate.trackTempC, climate.densityKgM3, climate.dewMarginC) -
        0.2 +
        track.effect +
        track.lanes[lane] +
        eventEffect +
        shift +
        wear(runs) -
        0.02 * Math.min(p, 4);
      settings = react(settings, adjustables, middle, { ...options, random, base, lastLog });
      const logMean = base + settingsEffect(settings, middle, adjustables, effects);
      const outlier = random.uniform(0, 1) < options.outlierShare;
      const log = logMean + random.normal(0, options.noiseSd * (outlier ? options.outlierScale : 1));
      const slip = Math.min(70, Math.max(2, Math.exp(log)));
      lastLog = log;
      logBase.push(base);
      passes.push({
        id: `p${passNo}`,
        passNo,
        event: `Event ${e + 1}`,
        track: track.name,
        time: new Date(day + Math.floor(p / 3) * 86_400_000 + hour * 3_600_000).toISOString(),
        round: p < 4 ? `Q${p + 1}` : `E${p - 3}`,
        lane,
        conditions: blankSome(climate.conditions, options, random),
        settings: { ...settings },
        runsOnDiscs: runs,
        slipPct: Number(slip.toFixed(2)),
        slipSdPct: null,
        sixtyFtS: null,
        outcome: outcomeOf(slip),
        excluded: false,
      });
      runs++;
    }
  }
  return {
    passes,
    adjustables,
    truth: (index, wanted) => ({
      logMean: logBase[index]! + settingsEffect(wanted, middle, adjustables, effects),
      noiseSd: options.noiseSd,
    }),
  };
}

function drawEffects(
  adjustables: readonly Adjustable[],
  options: GeneratorOptions,
  random: Random,
): Record<string, number> {
  return Object.fromEntries(
    adjustables.map((a) => {
      const believed = (a.belief?.meanPct ?? random.normal(0, 0.3)) / 15;
      const sign = a.key === options.wrongSignKey ? -1 : 1;
      return [a.key, sign * believed * options.effectFactor * Math.exp(random.normal(0, options.effectSpread))];
    }),
  );
}

function settingsEffect(
  settings: Settings,
  middle: Settings,
  adjustables: readonly Adjustable[],
  effects: Record<string, number>,
): number {
  return adjustables.reduce((sum, a) => sum + (effects[a.key]! * (settings[a.key]! - middle[a.key]!)) / a.step, 0);
}

interface Reaction extends GeneratorOptions {
  random: Random;
  base: number;
  lastLog: number;
}

// An imperfect chief: feels part of today's conditions, corrects part of the last miss, and fiddles.
function react(
  settings: Record<string, number>,
  adjustables: readonly Adjustable[],
  middle: Settings,
  r: Reaction,
): Record<string, number> {
  const next = { ...settings };
  const wanted =
    -r.reaction * (0.5 * (r.lastLog - Math.log(15)) + 0.5 * (r.base + r.random.normal(0, 0.12) - Math.log(15)));
  for (const a of adjustables) {
    const believed = (a.belief?.meanPct ?? 0.3) / 15;
    const pull = (0.25 * (middle[a.key]! - next[a.key]!)) / a.step;
    const share = a.key === 'counterweight_g' ? 0.6 : 0.12;
    const steps = Math.round((share * wanted) / believed + pull * 0.5 + r.random.normal(0, 0.5));
    next[a.key] = clampTo(a, next[a.key]! + steps * a.step);
  }
  return next;
}

function blankSome(conditions: Conditions, options: GeneratorOptions, random: Random): Conditions {
  const blank = <T>(v: T): T | null => (random.uniform(0, 1) < options.blankShare ? null : v);
  return {
    airTempC: blank(conditions.airTempC),
    relativeHumidity: options.dropHumidity ? null : blank(conditions.relativeHumidity),
    stationPressurePa: blank(conditions.stationPressurePa),
    trackTempC: blank(conditions.trackTempC),
  };
}

function outcomeOf(slip: number): PassRecord['outcome'] {
  if (slip > 26) return 'smoke';
  return slip < 8 ? 'shake' : 'clean';
}
