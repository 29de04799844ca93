/** How the model behaves where it has never been: conditions far outside the passes seen so far. */
import { experienceOf } from '@/lib/domain/model/experience';
import { runFeatures } from '@/lib/domain/model/features';
import { forecastLog } from '@/lib/domain/model/forecast';
import { logQuantile } from '@/lib/domain/model/predictive';
import type { PreparedPass, TrainedModel } from '@/lib/domain/model/train';
import { normalCdf } from '@/lib/domain/stats/special';
import type { Conditions } from '@/lib/domain/types';
import type { GeneratorOptions, SimulatedSeason } from './generators';

export interface FarScore {
  flagged: boolean;
  /** Chance that slip there lies in the 80 % interval. */
  cover80: number;
}

/** Sds beyond the middle of what was seen, and at least this much beyond its edge. */
const FAR_SDS = 4;
const BEYOND = { trackTempC: 12, stationPressurePa: 5000 } as const;
type Moved = keyof typeof BEYOND;

/** The pass's own conditions with track temperature, or pressure and so density, moved far out on either side. */
export function scoreFar(
  season: SimulatedSeason,
  options: GeneratorOptions,
  model: TrainedModel,
  before: readonly PreparedPass[],
  i: number,
): FarScore[] {
  return (Object.keys(BEYOND) as Moved[]).flatMap((moved) =>
    [-1, 1].map((side) => scoreAt(season, options, model, i, farConditions(season, before, i, moved, side))),
  );
}

function farConditions(
  season: SimulatedSeason,
  before: readonly PreparedPass[],
  i: number,
  moved: Moved,
  side: number,
): Conditions {
  const seen = before.map((_, k) => season.conditionsAt(k)[moved]!);
  const mean = seen.reduce((s, v) => s + v, 0) / seen.length;
  const sd = Math.sqrt(seen.reduce((s, v) => s + (v - mean) ** 2, 0) / seen.length);
  const edge = side < 0 ? Math.min(...seen) : Math.max(...seen);
  const out = side * Math.max(side * (edge + side * BEYOND[moved]), side * (mean + side * FAR_SDS * sd));
  return { ...season.conditionsAt(i), [moved]: out };
}

function scoreAt(
  season: SimulatedSeason,
  options: GeneratorOptions,
  model: TrainedModel,
  i: number,
  conditions: Conditions,
): FarScore {
  const pass = season.passes[i]!;
  const shown = { ...conditions, relativeHumidity: options.dropHumidity ? null : conditions.relativeHumidity };
  const run = runFeatures(
    { ...pass, conditions: shown },
    model.prepared[model.prepared.length - 1]!.features.roundInEvent,
  );
  const training = model.rows.map((r) => r.features);
  const { forecast } = forecastLog(model, run);
  const { logMean, noiseSd } = season.truth(i, pass.settings, conditions);
  const inside = (sd: number) =>
    normalCdf((logQuantile(forecast, 0.9) - logMean) / sd) - normalCdf((logQuantile(forecast, 0.1) - logMean) / sd);
  const share = options.outlierShare;
  return {
    flagged: experienceOf(run, training).outside,
    cover80: (1 - share) * inside(noiseSd) + share * inside(noiseSd * options.outlierScale),
  };
}
