import { and, asc, desc, eq, type SQL } from 'drizzle-orm';
import {
  car,
  decision,
  event,
  launchSheet,
  launchSheetSeen,
  membership,
  round,
  suggestion,
  track,
  user,
} from '@/db/schema';
import type { Role } from '@/lib/domain/permissions';
import type { Adjustable, SettingChange } from '@/lib/domain/types';
import { sheetFilter } from '@/lib/forms/sheet';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';
import { teamCar } from '../lookup';

/** One planned setting, in the adjustable's own unit. */
export interface SheetItem extends Pick<Adjustable, 'key' | 'label' | 'unit' | 'group' | 'step'> {
  value: number;
  /** What it was before; null when it stays. */
  from: number | null;
}

export interface SeenMark {
  userId: string;
  name: string;
  /** Null once they have left the team. */
  role: Role | null;
  seenAt: string;
}

/** A published plan as driver and crew read it: settings and notes, no odds. */
export interface SheetView extends Omit<typeof launchSheet.$inferSelect, 'teamId'> {
  carName: string;
  roundName: string;
  eventName: string;
  trackName: string;
  timeZone: string;
  lane: 'left' | 'right' | null;
  choice: 'accept' | 'adjust' | 'decline';
  publishedByName: string;
  suggestionId: string;
  /** Every setting, clutch first. */
  items: SheetItem[];
  /** What has to be changed, in work order. */
  changes: (SettingChange & Pick<Adjustable, 'label' | 'unit' | 'group' | 'step'>)[];
  /** Working minutes of all changes. */
  minutes: number;
  seen: SeenMark[];
  /** False once a newer version of the car's sheet is published. */
  current: boolean;
}

/** The newest launch sheet of a car; null when none was published. */
export async function currentSheet(ctx: ServerContext, raw: unknown): Promise<SheetView | null> {
  requireCan(ctx, 'sheet:view');
  const { carId } = sheetFilter.parse(raw);
  await teamCar(ctx, carId);
  const [row] = await selectSheets(ctx, eq(launchSheet.carId, carId)).limit(1);
  return row ? sheetView(ctx, row, row.sheet.version) : null;
}

/** One launch sheet of the team, superseded or not. Throws NOT_FOUND. */
export async function getSheet(ctx: ServerContext, sheetId: string): Promise<SheetView> {
  requireCan(ctx, 'sheet:view');
  const [row] = await selectSheets(ctx, eq(launchSheet.id, sheetId));
  if (!row) throw notFound('launch sheet');
  const [newest] = await selectSheets(ctx, eq(launchSheet.carId, row.sheet.carId)).limit(1);
  return sheetView(ctx, row, newest?.sheet.version ?? 0);
}

function selectSheets(ctx: ServerContext, where: SQL) {
  return ctx.db
    .select({
      sheet: launchSheet,
      carName: car.name,
      roundName: round.name,
      lane: round.lane,
      eventName: event.name,
      trackName: track.name,
      timeZone: track.timeZone,
      choice: decision.choice,
      suggestionId: suggestion.id,
      inputs: suggestion.inputs,
      publishedByName: user.name,
    })
    .from(launchSheet)
    .innerJoin(car, eq(car.id, launchSheet.carId))
    .innerJoin(round, eq(round.id, launchSheet.roundId))
    .innerJoin(event, eq(event.id, round.eventId))
    .innerJoin(track, eq(track.id, event.trackId))
    .innerJoin(decision, eq(decision.id, launchSheet.decisionId))
    .innerJoin(suggestion, eq(suggestion.id, decision.suggestionId))
    .innerJoin(user, eq(user.id, launchSheet.publishedBy))
    .where(and(eq(launchSheet.teamId, ctx.team.id), where))
    .orderBy(desc(launchSheet.version))
    .$dynamic();
}

type Selected = Awaited<ReturnType<typeof selectSheets>>[number];

async function sheetView(ctx: ServerContext, selected: Selected, newestVersion: number): Promise<SheetView> {
  const { sheet, inputs, ...names } = selected;
  const { teamId: _team, ...row } = sheet;
  return {
    ...row,
    ...names,
    items: sheetItems(sheet, inputs.adjustables),
    changes: sheet.changes.map((change) => ({ ...change, ...namesOf(change.key, inputs.adjustables) })),
    minutes: sheet.changes.reduce((sum, change) => sum + change.minutes, 0),
    seen: await seenMarks(ctx, sheet.id),
    current: sheet.version === newestVersion,
  };
}

function sheetItems(sheet: Selected['sheet'], adjustables: readonly Adjustable[]): SheetItem[] {
  const from = new Map(sheet.changes.map((change) => [change.key, change.from]));
  const items = adjustables.flatMap(({ key, label, unit, group, step }) => {
    const value = sheet.settings[key];
    return value === undefined ? [] : [{ key, label, unit, group, step, value, from: from.get(key) ?? null }];
  });
  return items.sort((a, b) => Number(a.group === 'launch') - Number(b.group === 'launch'));
}

function namesOf(
  key: string,
  adjustables: readonly Adjustable[],
): Pick<Adjustable, 'label' | 'unit' | 'group' | 'step'> {
  const { label, unit, group, step } = adjustables.find((one) => one.key === key) ?? {
    label: key,
    unit: '',
    group: 'clutch',
    step: 0.01,
  };
  return { label, unit, group, step };
}

async function seenMarks(ctx: ServerContext, sheetId: string): Promise<SeenMark[]> {
  return ctx.db
    .select({ userId: user.id, name: user.name, role: membership.role, seenAt: launchSheetSeen.seenAt })
    .from(launchSheetSeen)
    .innerJoin(user, eq(user.id, launchSheetSeen.userId))
    .leftJoin(membership, and(eq(membership.userId, user.id), eq(membership.teamId, ctx.team.id)))
    .where(and(eq(launchSheetSeen.launchSheetId, sheetId), eq(launchSheetSeen.teamId, ctx.team.id)))
    .orderBy(asc(launchSheetSeen.seenAt));
}
