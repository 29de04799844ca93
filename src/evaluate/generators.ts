/**
 * Invented seasons with known truth, for measuring the model (npm run evaluate) and for tests. None has the model's own form
 * unless its name says so. Everything is drawn from a seeded generator: the same seed gives the same season.
 */

import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import type { Adjustable, Conditions, Lane, PassRecord, Settings } from '@/lib/domain/types';
import { type Climate, conditionsFromClimate, type DayWeather, type SurfaceState, surfaceState } from './climate';
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
  /** Steps (one sd) that each setting is moved at every pass for no reason: how wide a range is tried. */
  fiddle: number;
}

export interface SimulatedSeason {
  passes: PassRecord[];
  adjustables: Adjustable[];
  /** The conditions of a pass as they were, whether recorded or not. */
  conditionsAt(index: number): Conditions;
  /** ln slip expected for a pass with other settings, or under other conditions (all four known), all effects included, and the noise sd around it. */
  truth(index: number, settings: Settings, conditions?: Conditions): { logMean: number; noiseSd: number };
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
  fiddle: 0.5,
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
  { ...BASE, name: 'narrow-settings', fiddle: 0.15, reaction: 0.4 },
  { ...BASE, name: 'wide-settings', fiddle: 1.5 },
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

function surfaceEffect(kind: GeneratorOptions['surface'], state: SurfaceState): number {
  const warm = (state.trackTempC - 36) / 12;
  const thick = (state.densityKgM3 - 1.15) / 0.04;
  const dew = Math.max(0, 8 - state.dewMarginC) / 8;
  if (kind === 'linear') return 0.12 * warm + 0.1 * thick;
  const hump = warm > 0 ? 0.12 * warm * warm : 0.2 * warm * warm;
  const ripple = kind === 'wave' ? 0.08 * Math.sin(2.2 * warm) : 0;
  return Math.min(0.9, hump) + ripple + 0.09 * thick + 0.18 * dew;
}

const wear = (runs: number): number => -0.1 * (1 - Math.exp(-runs / 4)) + (runs === 0 ? 0.06 : 0);

function defaultSettings(adjustables: readonly Adjustable[]): Record<string, number> {
  return Object.fromEntries(
    adjustables.map((a) => [a.key, a.low + Math.round((a.high - a.low) / 2 / a.step) * a.step]),
  );
}

const clampTo = (a: Adjustable, v: number): number => Math.min(a.high, Math.max(a.low, Number(v.toFixed(6))));

interface Track {
  name: string;
  altitudeM: number;
  warmthC: number;
  effect: number;
  lanes: Record<Lane, number>;
}

interface EventDraw {
  index: number;
  track: Track;
  /** Track, event and shift together: what every pass of the event shares. */
  effect: number;
  dayMs: number;
  weather: DayWeather;
}

/** The season while it is being drawn. */
interface Draft {
  options: GeneratorOptions;
  random: Random;
  adjustables: Adjustable[];
  middle: Record<string, number>;
  effects: Record<string, number>;
  tracks: Track[];
  passes: PassRecord[];
  /** ln slip of each pass but for surface and settings. */
  standing: number[];
  climates: Climate[];
  settings: Record<string, number>;
  runs: number;
  lastLog: number;
}

/** Draws one season. `seed` and the options decide everything. */
export function simulateSeason(options: GeneratorOptions, seed: number): SimulatedSeason {
  const draft = newDraft(options, seededRandom(seed * 7919 + options.name.length * 131));
  for (let e = 0; e < options.events; e++) {
    const event = drawEvent(draft, e);
    for (let p = 0; p < options.passesPerEvent; p++) drawPass(draft, event, p);
  }
  const { passes, adjustables, standing, climates, middle, effects } = draft;
  const logMean = (index: number, settings: Settings, state: SurfaceState) =>
    standing[index]! + surfaceEffect(options.surface, state) + settingsEffect(settings, middle, adjustables, effects);
  return {
    passes,
    adjustables,
    conditionsAt: (index) => climates[index]!.conditions,
    truth: (index, wanted, conditions) => ({
      logMean: logMean(index, wanted, conditions ? surfaceState(conditions) : climates[index]!),
      noiseSd: options.noiseSd,
    }),
  };
}

function newDraft(options: GeneratorOptions, random: Random): Draft {
  const extra = Array.from({ length: options.extraAdjustables }, (_, i) => extraAdjustable(i));
  const adjustables = [...DEFAULT_ADJUSTABLES, ...extra];
  const middle = defaultSettings(adjustables);
  const effects = drawEffects(adjustables, options, random);
  const tracks = Array.from({ length: options.tracks }, (_, i) => drawTrack(i, options, random));
  const start = { settings: { ...middle }, runs: 0, lastLog: Math.log(15) };
  return { options, random, adjustables, middle, effects, tracks, passes: [], standing: [], climates: [], ...start };
}

function drawTrack(i: number, options: GeneratorOptions, random: Random): Track {
  return {
    name: `Track ${i + 1}`,
    altitudeM: i === 1 ? 1500 : random.uniform(20, 400),
    warmthC: random.uniform(-4, 6),
    effect: random.normal(0, options.trackSd),
    lanes: { left: random.normal(0, options.laneSd), right: random.normal(0, options.laneSd) },
  };
}

function drawEvent({ options, random, tracks }: Draft, index: number): EventDraw {
  const season = index / Math.max(1, options.events - 1);
  const track = tracks[index < options.tracks ? index : random.integer(0, options.tracks - 1)]!;
  const shift = options.shiftAt !== null && season >= options.shiftAt ? options.shiftSize : 0;
  const effect = track.effect + random.normal(0, options.eventSd) + shift;
  const weather = {
    meanC: 16 + 13 * Math.sin(Math.PI * season) + track.warmthC + random.normal(0, 3),
    humidity: random.uniform(0.25, 0.75),
    cloud: random.uniform(0, 1),
  };
  return { index, track, effect, dayMs: Date.UTC(2026, 1, 15) + index * 13 * 86_400_000, weather };
}

function drawPass(draft: Draft, event: EventDraw, p: number): void {
  const { options, random, adjustables, middle, effects } = draft;
  const hour = 10 + (p % 3) * 4 + random.uniform(-0.7, 0.7);
  const climate = conditionsFromClimate(event.weather, hour, event.track.altitudeM, random);
  const lane: Lane = random.uniform(0, 1) < 0.5 ? 'left' : 'right';
  if (draft.runs > 7 || random.uniform(0, 1) < 0.1) draft.runs = 0;
  const standing =
    Math.log(15) - 0.2 + event.effect + event.track.lanes[lane] + wear(draft.runs) - 0.02 * Math.min(p, 4);
  const base = standing + surfaceEffect(options.surface, climate);
  draft.settings = react(draft.settings, adjustables, middle, { ...options, random, base, lastLog: draft.lastLog });
  const odd = random.uniform(0, 1) < options.outlierShare;
  const noise = random.normal(0, options.noiseSd * (odd ? options.outlierScale : 1));
  draft.lastLog = base + settingsEffect(draft.settings, middle, adjustables, effects) + noise;
  draft.standing.push(standing);
  draft.climates.push(climate);
  draft.passes.push(passOf(draft, event, { p, hour, lane, conditions: climate.conditions }));
  draft.runs++;
}

interface Drawn {
  p: number;
  hour: number;
  lane: Lane;
  conditions: Conditions;
}

function passOf(draft: Draft, event: EventDraw, { p, hour, lane, conditions }: Drawn): PassRecord {
  const passNo = draft.passes.length + 1;
  const slip = Math.min(70, Math.max(2, Math.exp(draft.lastLog)));
  return {
    id: `p${passNo}`,
    passNo,
    event: `Event ${event.index + 1}`,
    track: event.track.name,
    time: new Date(event.dayMs + Math.floor(p / 3) * 86_400_000 + hour * 3_600_000).toISOString(),
    round: p < 4 ? `Q${p + 1}` : `E${p - 3}`,
    lane,
    conditions: blankSome(conditions, draft.options, draft.random),
    settings: { ...draft.settings },
    runsOnDiscs: draft.runs,
    slipPct: Number(slip.toFixed(2)),
    slipSdPct: null,
    sixtyFtS: null,
    outcome: outcomeOf(slip),
    excluded: false,
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
    const steps = Math.round((share * wanted) / believed + pull * 0.5 + r.random.normal(0, r.fiddle));
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
