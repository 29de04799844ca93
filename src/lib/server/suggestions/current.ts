import { and, desc, eq, isNull } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { launchSheet, pass } from '@/db/schema';
import type { Settings } from '@/lib/domain/types';
import { requireCan, type ServerContext } from '../context';
import { teamCar } from '../lookup';

export interface CurrentSettings {
  /** Own unit of each adjustable; a missing key is not known. */
  settings: Settings;
  /** Where they were taken from; null when the car has neither sheet nor pass. */
  from: { kind: 'launch_sheet'; version: number } | { kind: 'pass'; passNo: number } | null;
  /** UTC instant of that sheet or pass. */
  at: string | null;
}

/** The settings as they stand: those of the newest launch sheet when it is newer than the newest pass, else of that pass. */
export async function currentSettings(ctx: ServerContext, carId: string): Promise<CurrentSettings> {
  requireCan(ctx, 'pass:view');
  await teamCar(ctx, carId);
  const sheet = await newestSheet(ctx, carId);
  const run = await newestPass(ctx, carId);
  if (sheet && (!run || sheet.createdAt > run.runAt))
    return { settings: sheet.settings, from: { kind: 'launch_sheet', version: sheet.version }, at: sheet.createdAt };
  if (run) return { settings: run.settings, from: { kind: 'pass', passNo: run.passNo }, at: run.runAt };
  return { settings: {}, from: null, at: null };
}

async function newestSheet(ctx: ServerContext, carId: string) {
  const [row] = await ctx.db
    .select()
    .from(launchSheet)
    .where(and(eq(launchSheet.teamId, ctx.team.id), eq(launchSheet.carId, carId)))
    .orderBy(desc(launchSheet.version))
    .limit(1);
  return row;
}

async function newestPass(ctx: ServerContext, carId: string) {
  const successor = alias(pass, 'successor');
  const [row] = await ctx.db
    .select({ passNo: pass.passNo, runAt: pass.runAt, settings: pass.settings })
    .from(pass)
    .leftJoin(successor, eq(successor.correctsId, pass.id))
    .where(and(eq(pass.teamId, ctx.team.id), eq(pass.carId, carId), isNull(successor.id)))
    .orderBy(desc(pass.runAt), desc(pass.passNo))
    .limit(1);
  return row;
}
