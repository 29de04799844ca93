import { forecastSettings, MODEL_VERSION } from '@/lib/domain/model';
import type { Forecast } from '@/lib/domain/types';
import { forecastInput } from '@/lib/forms/suggestion';
import { requireCan, type ServerContext } from '../context';
import { loadPassRecords, trainingHash } from '../passes';
import { limitWarnings, refuseMissingKeys, refuseUnknownKeys } from '../settings';
import { suggestionRow } from './view';

export interface LiveForecast {
  /** Null with too few passes. */
  forecast: Forecast | null;
  /** False when the model or what it can see of the passes is no longer that of the suggestion. */
  asSuggested: boolean;
  /** Plain sentences about the settings. */
  warnings: string[];
}

/** The forecast for other settings under the circumstances and the passes of a suggestion. Stores nothing. */
export async function liveForecast(ctx: ServerContext, suggestionId: string, raw: unknown): Promise<LiveForecast> {
  requireCan(ctx, 'suggestion:view');
  const { settings } = forecastInput.parse(raw);
  const made = await suggestionRow(ctx, suggestionId);
  const { context, adjustables } = made.inputs;
  refuseUnknownKeys(settings, adjustables, 'settings');
  refuseMissingKeys(settings, adjustables, 'settings');
  const passes = await loadPassRecords(ctx, made.carId, made.createdAt);
  return {
    forecast: forecastSettings({ passes, adjustables, band: made.result.band, context, settings }),
    asSuggested: made.modelVersion === MODEL_VERSION && trainingHash(passes) === made.trainingHash,
    warnings: limitWarnings(settings, adjustables),
  };
}
