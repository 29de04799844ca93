/** One simulated season replayed one step ahead and scored against truth and simple rivals. */

import { experienceOf } from '@/lib/domain/model/experience';
import { forecastLog } from '@/lib/domain/model/forecast';
import { leastSquares, predictLeastSquares } from '@/lib/domain/model/least-squares';
import { logCdf, logQuantile } from '@/lib/domain/model/predictive';
import { suggestWith } from '@/lib/domain/model/suggest';
import { type PreparedPass, preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import { crpsSample } from '@/lib/domain/season/scores';
import { normalCdf, studentTQuantile } from '@/lib/domain/stats/special';
import { type Adjustable, DEFAULT_BAND, type Settings } from '@/lib/domain/types';
import { type FarScore, scoreFar } from './far-conditions';
import type { GeneratorOptions, SimulatedSeason } from './generators';

export interface PassScore {
  seen: number;
  pit: number;
  crps: number;
  crpsLast: number;
  crpsLeastSquares: number;
  flagged: boolean;
  /** Every tenth pass: what happens far outside what was seen. */
  far: FarScore[];
  /** Null when no offer could be made. */
  odds: { offered: boolean; stated: number; offer: number; hold: number; nudge: number } | null;
}

const QUANTILES = Array.from({ length: 39 }, (_, i) => (i + 0.5) / 39);
const FIRST_OFFER = 14;

export function scoreSeason(season: SimulatedSeason, options: GeneratorOptions): PassScore[] {
  const prepared = preparePasses(season.passes);
  return prepared.slice(8).map((_, k) => scorePass(season, options, prepared, k + 8));
}

function scorePass(
  season: SimulatedSeason,
  options: GeneratorOptions,
  prepared: readonly PreparedPass[],
  i: number,
): PassScore {
  const before = prepared.slice(0, i);
  const { features, pass } = prepared[i]!;
  const model = trainModel(before, season.adjustables, DEFAULT_BAND)!;
  const { forecast } = forecastLog(model, features);
  const slip = pass.slipPct!;
  return {
    seen: i,
    pit: logCdf(forecast, Math.log(slip)),
    crps: crpsSample(
      slip,
      QUANTILES.map((p) => Math.exp(logQuantile(forecast, p))),
    ),
    crpsLast: Math.abs(slip - before[before.length - 1]!.pass.slipPct!),
    crpsLeastSquares: crpsSample(slip, leastSquaresQuantiles(before, prepared[i]!, season.adjustables)),
    flagged: experienceOf(
      features,
      model.rows.map((r) => r.features),
    ).outside,
    far: i % 10 === 0 ? scoreFar(season, options, model, before, i) : [],
    odds: i >= FIRST_OFFER ? scoreOffer(season, options, before, model, i) : null,
  };
}

/** Plain least squares on slip itself, as a rival would do it: settings and conditions, no pooling, no priors. */
function leastSquaresQuantiles(
  before: readonly PreparedPass[],
  run: PreparedPass,
  adjustables: readonly Adjustable[],
): number[] {
  const row = ({ features: f }: PreparedPass): number[] => [
    1,
    ...adjustables.map((a) => ((f.settings[a.key] ?? a.low) - a.low) / a.step),
    f.densityKgM3 ?? 1.15,
    f.trackTempC ?? 35,
    f.runsOnDiscs ?? 3,
  ];
  const y = before.map((p) => p.pass.slipPct!);
  const fit = leastSquares(before.map(row), y);
  if (fit.kind !== 'fit') {
    const mean = y.reduce((s, v) => s + v, 0) / y.length;
    const sd = Math.sqrt(y.reduce((s, v) => s + (v - mean) ** 2, 0) / (y.length - 1));
    return QUANTILES.map((p) => mean + sd * Math.sqrt(1 + 1 / y.length) * studentTQuantile(p, y.length - 1));
  }
  const { location, scale } = predictLeastSquares(fit, row(run));
  return QUANTILES.map((p) => location + scale * studentTQuantile(p, fit.df));
}

function scoreOffer(
  season: SimulatedSeason,
  options: GeneratorOptions,
  before: readonly PreparedPass[],
  model: TrainedModel,
  i: number,
): PassScore['odds'] {
  const pass = season.passes[i]!;
  const current = season.passes[i - 1]!.settings;
  const suggestion = suggestWith(model, before, {
    passes: [],
    adjustables: season.adjustables,
    band: DEFAULT_BAND,
    context: pass,
    current,
    minutesLeft: null,
  });
  const first = suggestion.offers[0];
  const settings = first?.settings ?? current;
  const stated = (first?.forecast ?? suggestion.noChange)!.pInBand;
  const odds = (s: Settings) => trueOdds(season, options, i, s);
  return {
    offered: suggestion.status === 'offered',
    stated,
    offer: odds(settings),
    hold: odds(current),
    nudge: odds(nudged(season, current, season.passes[i - 1]!.slipPct!)),
  };
}

function trueOdds(season: SimulatedSeason, options: GeneratorOptions, i: number, settings: Settings): number {
  const { logMean, noiseSd } = season.truth(i, settings);
  const inBand = (sd: number) =>
    normalCdf((Math.log(DEFAULT_BAND.highPct) - logMean) / sd) -
    normalCdf((Math.log(DEFAULT_BAND.lowPct) - logMean) / sd);
  return (1 - options.outlierShare) * inBand(noiseSd) + options.outlierShare * inBand(noiseSd * options.outlierScale);
}

/** The simple rule of the pits: move the first adjustable against the last slip by what is believed of it. */
function nudged(season: SimulatedSeason, current: Settings, lastSlip: number): Settings {
  const a = season.adjustables[0]!;
  const perStep = (a.belief?.meanPct ?? 0.5) / 15;
  const steps = Math.round(Math.log(15 / lastSlip) / perStep);
  const value = Math.min(a.high, Math.max(a.low, current[a.key]! + steps * a.step));
  return { ...current, [a.key]: value };
}
