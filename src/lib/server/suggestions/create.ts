import { randomUUID } from 'node:crypto';
import { suggestion } from '@/db/schema';
import { suggestFor } from '@/lib/domain/model';
import type { Adjustable, Band, Settings } from '@/lib/domain/types';
import { type SuggestionInput, suggestionInput } from '@/lib/forms/suggestion';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { activeAdjustables, type CarRow, teamCar } from '../lookup';
import { loadPassRecords, trainingHash } from '../passes';
import { refuseMissingKeys, refuseUnknownKeys } from '../settings';
import { runContext } from './context';
import { currentSettings } from './current';
import { getSuggestion, type SuggestionView } from './view';

/**
 * Asks the model for a run and stores what it said with what it was asked: never edited afterwards. Without `current` the settings
 * are those of the newest launch sheet or pass. Throws NOT_FOUND, or VALIDATION naming every adjustable without a value.
 */
export async function createSuggestion(ctx: ServerContext, raw: unknown): Promise<SuggestionView> {
  requireCan(ctx, 'suggestion:create');
  const input = suggestionInput.parse(raw);
  const car = await teamCar(ctx, input.carId);
  const adjustables = await activeAdjustables(ctx, car.id);
  const current = await settingsAsTheyStand(ctx, input, adjustables);
  const row = await askModel(ctx, car, input, adjustables, current);
  const detail = { carId: car.id, roundId: row.roundId, status: row.status, passesUsed: row.passesUsed };
  await ctx.write((db) =>
    db.batch([
      db.insert(suggestion).values(row),
      auditInsert(db, ctx, 'suggestion.create', { type: 'suggestion', id: row.id }, detail),
    ]),
  );
  return getSuggestion(ctx, row.id);
}

/** What was entered, or without it the settings of the newest sheet or pass. Throws VALIDATION naming what is missing or unknown. */
export async function settingsAsTheyStand(
  ctx: ServerContext,
  input: Pick<SuggestionInput, 'carId' | 'current'>,
  adjustables: readonly Adjustable[],
): Promise<Settings> {
  const settings = input.current ?? onlyKnown((await currentSettings(ctx, input.carId)).settings, adjustables);
  refuseUnknownKeys(settings, adjustables, 'current');
  refuseMissingKeys(settings, adjustables, 'current');
  return settings;
}

/** An old pass may have settings of adjustables that are no longer on the car. */
function onlyKnown(settings: Settings, adjustables: readonly Adjustable[]): Settings {
  const known = adjustables.filter(({ key }) => settings[key] !== undefined);
  return Object.fromEntries(known.map(({ key }) => [key, settings[key] as number]));
}

// The model runs here, before the write: nothing slow may happen inside it.
async function askModel(
  ctx: ServerContext,
  car: CarRow,
  input: SuggestionInput,
  adjustables: Adjustable[],
  current: Settings,
): Promise<typeof suggestion.$inferInsert> {
  // Stamped before the passes are read, so that `asOf` this instant gives the same passes again.
  const createdAt = ctx.now().toISOString();
  const { context, readingId } = await runContext(ctx, input);
  const passes = await loadPassRecords(ctx, car.id);
  const { minutesLeft } = input;
  const result = suggestFor({ passes, adjustables, band: bandOf(car), context, current, minutesLeft });
  return {
    id: randomUUID(),
    teamId: ctx.team.id,
    carId: car.id,
    roundId: input.roundId,
    readingId,
    inputs: { context, current, minutesLeft, adjustables },
    result,
    status: result.status,
    modelVersion: result.modelVersion,
    trainingHash: trainingHash(passes),
    passesUsed: result.passesUsed,
    createdBy: ctx.user.id,
    createdAt,
  };
}

const bandOf = (car: CarRow): Band => ({ lowPct: car.bandLowPct, highPct: car.bandHighPct });
