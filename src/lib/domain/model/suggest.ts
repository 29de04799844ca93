import type {
  Adjustable,
  Band,
  Forecast,
  PassRecord,
  RunContext,
  Settings,
  SixtyFtOutlook,
  Suggestion,
  SuggestionStatus,
} from '../types';
import type { Column } from './columns';
import { MIN_PASSES, MODEL_VERSION } from './constants';
import { contributionsOf } from './contributions';
import { type Experience, experienceOf } from './experience';
import { discountedPasses, effectSummaries, nearestPasses } from './explain';
import { type RunFeatures, roundOfContext, runFeatures, trains } from './features';
import { forecastLog } from './forecast';
import { toForecast } from './predictive';
import { searchSettings } from './search';
import { readingSensitivity } from './sensitivity';
import { forecastSixtyFt, type SixtyFtModel, trainSixtyFt } from './sixty-ft';
import { type PreparedPass, preparePasses, type TrainedModel, trainModel } from './train';

export interface SuggestInput {
  passes: readonly PassRecord[];
  adjustables: readonly Adjustable[];
  band: Band;
  context: RunContext;
  /** One value per adjustable: the settings as they stand. */
  current: Settings;
  /** Null: no limit on working time. */
  minutesLeft: number | null;
}

/** What the model offers for a run. Refusals (too few passes, outside experience, missing input) are results. */
export function suggestFor(input: SuggestInput): Suggestion {
  const prepared = preparePasses(input.passes);
  const sixtyFt = trainSixtyFt(prepared, input.adjustables);
  return suggestWith(trainModel(prepared, input.adjustables, input.band), prepared, input, sixtyFt);
}

/** As `suggestFor`, with a model trained before on the same passes. */
export function suggestWith(
  model: TrainedModel | null,
  prepared: readonly PreparedPass[],
  input: SuggestInput,
  sixtyFt: SixtyFtModel | null = null,
): Suggestion {
  const used = prepared.filter((p) => trains(p.pass)).length;
  if (!model) return tooFew(input, used);
  const ordered = prepared.map((p) => p.pass);
  const run = runFeatures({ ...input.context, settings: input.current }, roundOfContext(ordered, input.context));
  return withSixtyFt(compose(model, run, input, used), run, sixtyFt);
}

/** Forecast for any settings under the same passes: for moving settings by hand. Null with too few passes. */
export function forecastSettings(
  input: Omit<SuggestInput, 'current' | 'minutesLeft'> & { settings: Settings },
): Forecast | null {
  const prepared = preparePasses(input.passes);
  const model = trainModel(prepared, input.adjustables, input.band);
  if (!model) return null;
  const ordered = prepared.map((p) => p.pass);
  const run = runFeatures({ ...input.context, settings: input.settings }, roundOfContext(ordered, input.context));
  return toForecast(forecastLog(model, run).forecast, input.band);
}

function tooFew({ band }: SuggestInput, used: number): Suggestion {
  const more = Math.max(1, MIN_PASSES - used);
  return {
    ...blank(band, used),
    status: 'too_few_passes',
    reasons: [
      `The model has ${used} usable ${used === 1 ? 'pass' : 'passes'} and needs ${MIN_PASSES}: log ${more} more with a measured slip.`,
    ],
  };
}

const blank = (band: Band, used: number): Suggestion => ({
  status: 'hold',
  noChange: null,
  noChangeSixtyFt: null,
  offers: [],
  band,
  passesUsed: used,
  passesNeeded: MIN_PASSES,
  reasons: [],
  warnings: [],
  outsideVariables: [],
  discounted: [],
  nearest: [],
  effects: [],
  breakdown: null,
  sensitivity: null,
  modelVersion: MODEL_VERSION,
});

function compose(model: TrainedModel, run: RunFeatures, input: SuggestInput, used: number): Suggestion {
  const { forecast, missing: unknown } = forecastLog(model, run);
  const missing = namesOf(unknown);
  const essential = namesOf(unknown.filter((c) => c.essential));
  const experience = experienceOf(
    run,
    model.rows.map((r) => r.features),
  );
  const refusal = refusalOf(essential, experience);
  const search = refusal ? null : searchSettings(model, run, input.minutesLeft);
  return {
    ...blank(input.band, used),
    status: refusal ?? (search!.worthChanging ? 'offered' : 'hold'),
    noChange: toForecast(forecast, input.band),
    offers: search?.offers ?? [],
    reasons: reasonsFor(refusal, essential, experience, search?.worthChanging ?? false),
    warnings: warningsFor(model, run, missing, input),
    outsideVariables: experience.variables,
    discounted: discountedPasses(model),
    nearest: nearestPasses(model, run),
    effects: effectSummaries(model),
    breakdown: contributionsOf(model, run),
    sensitivity: readingSensitivity(model, {
      context: input.context,
      settings: input.current,
      roundInEvent: run.roundInEvent,
    }),
  };
}

/** The 60-ft time of every set of settings in a suggestion, where the team has recorded enough of them. */
function withSixtyFt(suggestion: Suggestion, run: RunFeatures, sixtyFt: SixtyFtModel | null): Suggestion {
  if (!sixtyFt) return suggestion;
  const outlook = (settings: Settings): SixtyFtOutlook => {
    const { medianS, quantiles } = forecastSixtyFt(sixtyFt, { ...run, settings });
    return { medianS, low80S: quantiles['0.1']!, high80S: quantiles['0.9']! };
  };
  const offers = suggestion.offers.map((offer) => ({ ...offer, sixtyFt: outlook(offer.settings) }));
  return { ...suggestion, offers, noChangeSixtyFt: outlook(run.settings) };
}

function refusalOf(missing: readonly string[], experience: Experience): SuggestionStatus | null {
  if (experience.outside) return 'outside_experience';
  return missing.length > 0 ? 'missing_input' : null;
}

function reasonsFor(
  refusal: SuggestionStatus | null,
  missing: readonly string[],
  experience: Experience,
  worthChanging: boolean,
): string[] {
  if (refusal === 'outside_experience') {
    return [
      `Today's ${listed(experience.variables)} ${experience.variables.length > 1 ? 'are' : 'is'} outside what your passes cover, so no change is offered.`,
    ];
  }
  if (refusal === 'missing_input') return [`Not known for this run: ${listed(missing)}. Enter it to get offers.`];
  if (worthChanging) return ['Offers are ranked by the odds of slip in the band, less a small cost for each step.'];
  return ['No change within the limits and the time left improves the odds enough to be worth making.'];
}

function warningsFor(model: TrainedModel, run: RunFeatures, missing: readonly string[], input: SuggestInput): string[] {
  const warnings: string[] = [];
  if (model.columnSet.leftOut.length > 0)
    warnings.push(`Left out, because too few passes record it: ${listed(model.columnSet.leftOut)}.`);
  if (missing.length > 0) warnings.push(`Taken as average because it is not known: ${listed(missing)}.`);
  if (!model.rows.some((r) => r.features.track === run.track))
    warnings.push(`No passes at ${run.track} yet: the forecast allows for an unknown track.`);
  const outside = input.adjustables.filter((a) => outOfLimits(a, run.settings[a.key]));
  if (outside.length > 0) warnings.push(`Outside its limits as it stands: ${listed(outside.map((a) => a.label))}.`);
  return warnings;
}

const outOfLimits = (a: Adjustable, v: number | undefined): boolean => v !== undefined && (v < a.low || v > a.high);

/** Names of facts, each once: a column and its square are one fact. */
const namesOf = (columns: readonly Column[]): string[] => [...new Set(columns.map((c) => c.name.split(',')[0]!))];

function listed(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}
