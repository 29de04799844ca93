import { randomUUID } from 'node:crypto';
import { and, eq, max } from 'drizzle-orm';
import type { BatchItem } from 'drizzle-orm/batch';
import type { Db } from '@/db/client';
import { decision, launchSheet, type suggestion, user } from '@/db/schema';
import { type DecisionInput, decisionInput } from '@/lib/forms/decision';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate } from '../duplicates';
import { conflict } from '../errors';
import { getSheet, type SheetView } from '../sheets';
import { latestOwnEstimate, suggestionRow } from '../suggestions';
import { changeList } from './changes';
import { type FinalSettings, finalSettings } from './final-settings';

type SuggestionRow = typeof suggestion.$inferSelect;
type NewDecision = typeof decision.$inferInsert;
type NewSheet = typeof launchSheet.$inferInsert;

export interface Decided {
  decision: Omit<NewDecision, 'teamId'> & { decidedByName: string };
  /** The launch sheet that was published; null when it was kept back. */
  sheet: SheetView | null;
  /** Plain sentences about the final settings. */
  warnings: string[];
}

/**
 * Records what the chief decided on a suggestion and, unless `publish` is false, publishes the launch sheet with it: both or
 * neither. One decision for each suggestion. Throws NOT_FOUND, VALIDATION, or CONFLICT telling who decided before.
 */
export async function decideSuggestion(ctx: ServerContext, suggestionId: string, raw: unknown): Promise<Decided> {
  requireCan(ctx, 'suggestion:decide');
  const input = decisionInput.parse(raw);
  const publish = input.publish ?? true;
  if (publish) requireCan(ctx, 'sheet:publish');
  const made = await suggestionRow(ctx, suggestionId);
  const final = finalSettings(made, input);
  const asked = { made, input, final, publish };
  const { decided, sheet } = await refuseDuplicate('choice', 'This suggestion has been decided already.', () =>
    ctx.write((db) => store(ctx, db, asked)),
  );
  const { teamId: _team, ...row } = decided;
  return {
    decision: { ...row, decidedByName: ctx.user.name },
    sheet: sheet ? await getSheet(ctx, sheet.id) : null,
    warnings: final.warnings,
  };
}

interface Asked {
  made: SuggestionRow;
  input: DecisionInput;
  final: FinalSettings;
  publish: boolean;
}

// Asked and written within one turn of the write queue: of two chiefs at once one wins and the other is told.
async function store(
  ctx: ServerContext,
  db: Db,
  asked: Asked,
): Promise<{ decided: NewDecision; sheet: NewSheet | null }> {
  await refuseDecided(ctx, db, asked.made.id);
  const estimate = await latestOwnEstimate(ctx, asked.made.carId, asked.made.roundId, db);
  const decided = newDecision(ctx, asked, estimate?.id ?? null);
  const version = await nextVersion(ctx, db, asked.made.carId);
  const sheet = asked.publish ? newSheet(ctx, asked, decided, version) : null;
  const detail = { choice: decided.choice, reason: decided.reason, warnings: asked.final.warnings };
  await db.batch([
    db.insert(decision).values(decided),
    auditInsert(db, ctx, 'suggestion.decide', { type: 'suggestion', id: asked.made.id }, detail),
    ...publication(ctx, db, sheet),
  ]);
  return { decided, sheet };
}

function newDecision(ctx: ServerContext, { made, input, final }: Asked, ownEstimateId: string | null): NewDecision {
  return {
    id: randomUUID(),
    teamId: ctx.team.id,
    suggestionId: made.id,
    ownEstimateId,
    choice: input.choice,
    offerIndex: final.offerIndex,
    finalSettings: { ...final.settings },
    reason: input.reason,
    decidedBy: ctx.user.id,
    createdAt: ctx.now().toISOString(),
  };
}

function newSheet(ctx: ServerContext, { made, input }: Asked, decided: NewDecision, version: number): NewSheet {
  return {
    id: randomUUID(),
    teamId: ctx.team.id,
    carId: made.carId,
    roundId: made.roundId,
    decisionId: decided.id,
    version,
    settings: decided.finalSettings,
    changes: changeList(made.inputs.current, decided.finalSettings, made.inputs.adjustables),
    notes: input.notes,
    publishedBy: ctx.user.id,
    createdAt: decided.createdAt,
  };
}

function publication(ctx: ServerContext, db: Db, sheet: NewSheet | null): BatchItem<'sqlite'>[] {
  if (!sheet) return [];
  const detail = { carId: sheet.carId, version: sheet.version };
  return [
    db.insert(launchSheet).values(sheet),
    auditInsert(db, ctx, 'launch_sheet.publish', { type: 'launch_sheet', id: sheet.id }, detail),
  ];
}

async function refuseDecided(ctx: ServerContext, db: Db, suggestionId: string): Promise<void> {
  const [other] = await db
    .select({ by: user.name, choice: decision.choice })
    .from(decision)
    .innerJoin(user, eq(user.id, decision.decidedBy))
    .where(and(eq(decision.suggestionId, suggestionId), eq(decision.teamId, ctx.team.id)));
  if (other)
    throw conflict(
      `${other.by} has decided on this suggestion already (${other.choice}). Ask for a new one to change the plan.`,
    );
}

async function nextVersion(ctx: ServerContext, db: Db, carId: string): Promise<number> {
  const [row] = await db
    .select({ last: max(launchSheet.version) })
    .from(launchSheet)
    .where(and(eq(launchSheet.teamId, ctx.team.id), eq(launchSheet.carId, carId)));
  return (row?.last ?? 0) + 1;
}
