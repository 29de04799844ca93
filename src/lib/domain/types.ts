import type { Breakdown } from './model/contributions';
import type { Sensitivity } from './model/sensitivity';

/** Plain data that the domain core, the server and the screens share. SI units unless a name says otherwise. */

export type AdjustableGroup = 'clutch' | 'launch';

/** The chief's belief: one step up changes slip by `meanPct` give or take `sdPct` (one standard deviation), in slip points. */
export interface EffectBelief {
  meanPct: number;
  sdPct: number;
}

/** Something the team can set on the car. Values, step and limits are in the adjustable's own `unit`. */
export interface Adjustable {
  key: string;
  label: string;
  unit: string;
  step: number;
  low: number;
  high: number;
  /** Working minutes to change it, whatever the number of steps. */
  minutes: number;
  group: AdjustableGroup;
  /** Whether suggestions may move it. */
  movable: boolean;
  belief: EffectBelief | null;
}

export type Settings = Readonly<Record<string, number>>;
export type Lane = 'left' | 'right';
export type Outcome = 'clean' | 'shake' | 'smoke' | 'aborted';
export const OUTCOMES = ['clean', 'shake', 'smoke', 'aborted'] as const satisfies readonly Outcome[];
export const LANES = ['left', 'right'] as const satisfies readonly Lane[];

/** Target slip range in percent against ground speed. */
export interface Band {
  lowPct: number;
  highPct: number;
}

/** About 15 % driven-wheel slip: a rule of thumb, common practice with no published source. The team sets its own. */
export const DEFAULT_BAND: Band = { lowPct: 13, highPct: 17 };

/** Conditions at a pass or for a forecast. Null is "not measured", never a guess. */
export interface Conditions {
  airTempC: number | null;
  /** Fraction 0-1. */
  relativeHumidity: number | null;
  /** Station pressure, Pa: already converted when an altimeter setting was read. */
  stationPressurePa: number | null;
  trackTempC: number | null;
}

/** One pass as the model sees it. */
export interface PassRecord {
  /** Stable id, used to name passes in results. */
  id: string;
  passNo: number;
  event: string;
  track: string;
  /** UTC, ISO 8601. Sort key together with passNo. */
  time: string;
  round: string;
  lane: Lane | null;
  conditions: Conditions;
  /** One value per adjustable key; a missing key is "not recorded". */
  settings: Settings;
  runsOnDiscs: number | null;
  slipPct: number | null;
  /** Known measurement error of slipPct, one sd in slip points; null when unknown. */
  slipSdPct: number | null;
  sixtyFtS: number | null;
  outcome: Outcome | null;
  excluded: boolean;
}

/** A forecast is asked for these circumstances plus settings. */
export interface RunContext {
  event: string;
  track: string;
  time: string;
  round: string;
  lane: Lane | null;
  conditions: Conditions;
  runsOnDiscs: number | null;
}

export const FORECAST_QUANTILES = [0.025, 0.1, 0.25, 0.5, 0.75, 0.9, 0.975] as const;

/** Predictive distribution of slip in percent, in plain numbers. */
export interface Forecast {
  meanPct: number;
  sdPct: number;
  /** Keys are String(p) for p in FORECAST_QUANTILES. */
  quantiles: Readonly<Record<string, number>>;
  /** 20 equally likely values (quantiles at 0.025, 0.075 ... 0.975) for the dotplot. */
  dots: readonly number[];
  pBelow: number;
  pInBand: number;
  pAbove: number;
}

export interface SettingChange {
  key: string;
  from: number;
  to: number;
  /** Signed whole steps. */
  steps: number;
  minutes: number;
}

/** 60-ft time forecast beside a slip forecast, seconds: middle and 80 % range. */
export interface SixtyFtOutlook {
  medianS: number;
  low80S: number;
  high80S: number;
}

export interface Offer {
  settings: Settings;
  /** Empty for "no change". */
  changes: readonly SettingChange[];
  minutes: number;
  forecast: Forecast;
  /** Null when too few passes recorded a 60-ft time. */
  sixtyFt: SixtyFtOutlook | null;
}

export type SuggestionStatus = 'offered' | 'hold' | 'too_few_passes' | 'outside_experience' | 'missing_input';

export interface DiscountedPass {
  id: string;
  passNo: number;
  /** Weight between 0 and 1 the pass was given. */
  weight: number;
  slipPct: number;
  /** What the model expected of that pass. */
  expectedPct: number;
}

export interface NearPass {
  id: string;
  passNo: number;
  /** Standardised distance in conditions and settings; 0 is the same. */
  distance: number;
  slipPct: number;
  outcome: Outcome | null;
}

export interface EffectSummary {
  key: string;
  /** Effect of one step up at the middle of the band, slip points: median and one sd. */
  meanPct: number;
  sdPct: number;
  priorMeanPct: number;
  priorSdPct: number;
  /** 0 = all from passes, 1 = all from the belief. */
  shareOnBelief: number;
}

/** What the model offers for one run: immutable once stored. Refusals are results, not errors. */
export interface Suggestion {
  status: SuggestionStatus;
  /** The forecast for the settings as they stand; null when there is none. */
  noChange: Forecast | null;
  /** 60-ft time for the settings as they stand. */
  noChangeSixtyFt: SixtyFtOutlook | null;
  /** Best first, up to three; "no change" is always among them. Empty when the status is a refusal. */
  offers: readonly Offer[];
  band: Band;
  passesUsed: number;
  passesNeeded: number;
  /** Plain sentences: why this is the result. */
  reasons: readonly string[];
  /** Plain sentences: what to be careful about. */
  warnings: readonly string[];
  /** Names of conditions outside experience. */
  outsideVariables: readonly string[];
  discounted: readonly DiscountedPass[];
  nearest: readonly NearPass[];
  effects: readonly EffectSummary[];
  /** Why the forecast as it stands differs from the team's typical pass; null when there is no forecast. */
  breakdown: Breakdown | null;
  /** What each reading's own error would do to it; null when there is no forecast. */
  sensitivity: Sensitivity | null;
  modelVersion: string;
}
