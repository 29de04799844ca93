import { index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import type { Adjustable, RunContext, SettingChange, Settings, Suggestion } from '../../lib/domain/types';
import { car, discSet } from './car';
import { createdAt, flag, id, instant } from './columns';
import { reading, round } from './season';
import { team, user } from './team';

/** What a suggestion was made from, kept so that it can be read later exactly as it was. */
export interface SuggestionInputs {
  context: RunContext;
  current: Settings;
  minutesLeft: number | null;
  /** Limits, steps and beliefs as they were then. */
  adjustables: Adjustable[];
}

/** Immutable. `training_hash` names the passes (and their values) the model had seen. */
export const suggestion = sqliteTable(
  'suggestion',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    roundId: text('round_id')
      .notNull()
      .references(() => round.id),
    readingId: text('reading_id')
      .notNull()
      .references(() => reading.id),
    inputs: text('inputs', { mode: 'json' }).$type<SuggestionInputs>().notNull(),
    result: text('result', { mode: 'json' }).$type<Suggestion>().notNull(),
    status: text('status').notNull(),
    modelVersion: text('model_version').notNull(),
    trainingHash: text('training_hash').notNull(),
    passesUsed: integer('passes_used').notNull(),
    createdBy: text('created_by')
      .notNull()
      .references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [index('suggestion_team_car').on(t.teamId, t.carId, t.createdAt), index('suggestion_round').on(t.roundId)],
);

/** The chief's own forecast, written before the suggestion opens. A skipped one is recorded as skipped. Immutable. */
export const ownEstimate = sqliteTable(
  'own_estimate',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    roundId: text('round_id')
      .notNull()
      .references(() => round.id),
    suggestionId: text('suggestion_id').references(() => suggestion.id),
    skipped: flag('skipped').notNull().default(false),
    slipPct: real('slip_pct'),
    lowPct: real('low_pct'),
    highPct: real('high_pct'),
    madeBy: text('made_by')
      .notNull()
      .references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [index('own_estimate_round').on(t.roundId)],
);

/** One per suggestion: the second of two chiefs is told. Immutable. */
export const decision = sqliteTable(
  'decision',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    suggestionId: text('suggestion_id')
      .notNull()
      .references(() => suggestion.id),
    ownEstimateId: text('own_estimate_id').references(() => ownEstimate.id),
    choice: text('choice', { enum: ['accept', 'adjust', 'decline'] }).notNull(),
    /** Which offer was accepted or started from; null on decline. */
    offerIndex: integer('offer_index'),
    finalSettings: text('final_settings', { mode: 'json' }).$type<Record<string, number>>().notNull(),
    reason: text('reason').notNull().default(''),
    decidedBy: text('decided_by')
      .notNull()
      .references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('decision_suggestion').on(t.suggestionId), index('decision_team').on(t.teamId)],
);

/** The published plan. A newer version supersedes; nothing is edited. */
export const launchSheet = sqliteTable(
  'launch_sheet',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    roundId: text('round_id')
      .notNull()
      .references(() => round.id),
    decisionId: text('decision_id')
      .notNull()
      .references(() => decision.id),
    version: integer('version').notNull(),
    settings: text('settings', { mode: 'json' }).$type<Record<string, number>>().notNull(),
    changes: text('changes', { mode: 'json' }).$type<SettingChange[]>().notNull(),
    notes: text('notes').notNull().default(''),
    publishedBy: text('published_by')
      .notNull()
      .references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('launch_sheet_car_version').on(t.carId, t.version), index('launch_sheet_team').on(t.teamId)],
);

export const launchSheetSeen = sqliteTable(
  'launch_sheet_seen',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    launchSheetId: text('launch_sheet_id')
      .notNull()
      .references(() => launchSheet.id),
    userId: text('user_id')
      .notNull()
      .references(() => user.id),
    seenAt: instant('seen_at').notNull(),
  },
  (t) => [uniqueIndex('launch_sheet_seen_once').on(t.launchSheetId, t.userId)],
);

/** Clutch service: what was measured on a disc set and when. Corrections are new rows. */
export const serviceRecord = sqliteTable(
  'service_record',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    discSetId: text('disc_set_id').references(() => discSet.id),
    roundId: text('round_id').references(() => round.id),
    measurements: text('measurements', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    notes: text('notes').notNull().default(''),
    correctsId: text('corrects_id'),
    recordedBy: text('recorded_by')
      .notNull()
      .references(() => user.id),
    createdAt: createdAt(),
  },
  (t) => [
    index('service_record_car').on(t.carId, t.createdAt),
    uniqueIndex('service_record_corrects').on(t.correctsId),
  ],
);

/** A line of the team's own checklist. */
export const checklistItem = sqliteTable(
  'checklist_item',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    carId: text('car_id')
      .notNull()
      .references(() => car.id),
    label: text('label').notNull(),
    position: integer('position').notNull().default(0),
    /** Must be signed before a launch sheet can be published. */
    requiredForSheet: flag('required_for_sheet').notNull().default(false),
    archivedAt: instant('archived_at'),
    createdAt: createdAt(),
  },
  (t) => [index('checklist_item_car').on(t.carId)],
);

export const checklistSignoff = sqliteTable(
  'checklist_signoff',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    itemId: text('item_id')
      .notNull()
      .references(() => checklistItem.id),
    roundId: text('round_id')
      .notNull()
      .references(() => round.id),
    serviceRecordId: text('service_record_id').references(() => serviceRecord.id),
    signedBy: text('signed_by')
      .notNull()
      .references(() => user.id),
    /** Set when the item was overridden instead of done. */
    overrideReason: text('override_reason'),
    signedAt: instant('signed_at').notNull(),
  },
  (t) => [index('checklist_signoff_round').on(t.roundId)],
);
