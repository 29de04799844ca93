import { MIN_PASSES } from '../model/constants';
import { experienceOf } from '../model/experience';
import { type RunFeatures, trains } from '../model/features';
import { forecastLog } from '../model/forecast';
import { toForecast } from '../model/predictive';
import { suggestWith } from '../model/suggest';
import { type PreparedPass, preparePasses, type TrainedModel, trainModel } from '../model/train';
import type { Adjustable, Band, Forecast, PassRecord, Settings, SuggestionStatus } from '../types';

/** The first pass a replay forecasts: eight come before it. */
export const FIRST_REPLAYED = MIN_PASSES;

export interface ReplaySuggestion {
  status: SuggestionStatus;
  /** Every adjustable; unchanged when nothing is offered. */
  settings: Settings;
  pInBand: number | null;
  leverage: number;
}

export interface ReplayEntry {
  passNo: number;
  id: string;
  passesUsed: number;
  /** Null when refused. */
  forecast: Forecast | null;
  slipPct: number | null;
  outsideExperience: boolean;
  refused: string | null;
  suggestion?: ReplaySuggestion;
}

export interface ReplayOptions {
  adjustables: readonly Adjustable[];
  band: Band;
  /** Also say what would have been offered first, from the settings of the pass before. */
  suggest?: boolean;
}

/** Runs the season again one pass at a time: pass i is forecast from the passes before it only, in every part of the model. */
export function replaySeason(passes: readonly PassRecord[], options: ReplayOptions): ReplayEntry[] {
  const prepared = preparePasses(passes);
  return prepared.slice(FIRST_REPLAYED).map((_, k) => replayOne(prepared, k + FIRST_REPLAYED, options));
}

function replayOne(prepared: readonly PreparedPass[], i: number, options: ReplayOptions): ReplayEntry {
  const before = prepared.slice(0, i);
  const { pass, features } = prepared[i]!;
  const used = before.filter((p) => trains(p.pass)).length;
  const model = trainModel(before, options.adjustables, options.band);
  const experience = model ? experienceBefore(model, features) : null;
  const entry: ReplayEntry = {
    passNo: pass.passNo,
    id: pass.id,
    passesUsed: used,
    forecast: model ? toForecast(forecastLog(model, features).forecast, options.band) : null,
    slipPct: pass.slipPct,
    outsideExperience: experience?.outside ?? false,
    refused: model ? null : 'too_few_passes',
  };
  if (!options.suggest) return entry;
  const leverage = experience?.leverage ?? 0;
  return { ...entry, suggestion: { ...suggestionBefore(model, before, pass, options), leverage } };
}

function suggestionBefore(
  model: TrainedModel | null,
  before: readonly PreparedPass[],
  pass: PassRecord,
  options: ReplayOptions,
): Omit<ReplaySuggestion, 'leverage'> {
  const settings = settingsBefore(before, pass, options.adjustables);
  const input = { ...options, passes: [], context: pass, current: settings, minutesLeft: null };
  const suggestion = suggestWith(model, before, input);
  const first = suggestion.offers[0];
  return {
    status: suggestion.status,
    settings: first?.settings ?? settings,
    pInBand: (first?.forecast ?? suggestion.noChange)?.pInBand ?? null,
  };
}

const experienceBefore = (model: TrainedModel, run: RunFeatures) =>
  experienceOf(
    run,
    model.rows.map((r) => r.features),
  );

function settingsBefore(
  before: readonly PreparedPass[],
  pass: PassRecord,
  adjustables: readonly Adjustable[],
): Settings {
  return Object.fromEntries(
    adjustables.flatMap((a) => {
      const value = lastKnown(before, a.key) ?? pass.settings[a.key];
      return value === undefined ? [] : [[a.key, value]];
    }),
  );
}

const lastKnown = (before: readonly PreparedPass[], key: string): number | undefined =>
  [...before].reverse().find((p) => p.pass.settings[key] !== undefined)?.pass.settings[key];
