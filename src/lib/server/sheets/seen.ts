import { randomUUID } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import { launchSheet, launchSheetSeen } from '@/db/schema';
import { auditInsert } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { notFound } from '../errors';
import { getSheet, type SheetView } from './view';

/** Marks a launch sheet as seen by the caller. The first time counts; again changes nothing. Throws NOT_FOUND. */
export async function markSeen(ctx: ServerContext, sheetId: string): Promise<SheetView> {
  requireCan(ctx, 'sheet:seen');
  const mine = { teamId: ctx.team.id, launchSheetId: sheetId, userId: ctx.user.id };
  await ctx.write(async (db) => {
    const [sheet] = await db
      .select({ id: launchSheet.id, version: launchSheet.version })
      .from(launchSheet)
      .where(and(eq(launchSheet.id, sheetId), eq(launchSheet.teamId, ctx.team.id)));
    if (!sheet) throw notFound('launch sheet');
    const [seen] = await db
      .select({ id: launchSheetSeen.id })
      .from(launchSheetSeen)
      .where(and(eq(launchSheetSeen.launchSheetId, sheetId), eq(launchSheetSeen.userId, ctx.user.id)));
    if (seen) return;
    const subject = { type: 'launch_sheet', id: sheetId };
    await db.batch([
      db.insert(launchSheetSeen).values({ ...mine, id: randomUUID(), seenAt: ctx.now().toISOString() }),
      auditInsert(db, ctx, 'launch_sheet.seen', subject, { version: sheet.version }),
    ]);
  });
  return getSheet(ctx, sheetId);
}
