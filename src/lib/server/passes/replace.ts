import { randomUUID } from 'node:crypto';
import { and, eq } from 'drizzle-orm';
import type { Db } from '@/db/client';
import { pass, user } from '@/db/schema';
import { auditInsert } from '../audit';
import type { ServerContext } from '../context';
import { conflict, notFound } from '../errors';
import { getPass } from './list';
import type { PassRow, PassView } from './view';

export type PassChange = Partial<Omit<PassRow, 'id' | 'rootId' | 'correctsId' | 'teamId' | 'carId'>>;

/** A row of a pass of the team. Throws NOT_FOUND. */
export async function passRow(ctx: ServerContext, passId: string): Promise<PassRow> {
  const [row] = await ctx.db
    .select()
    .from(pass)
    .where(and(eq(pass.id, passId), eq(pass.teamId, ctx.team.id)));
  if (!row) throw notFound('pass');
  return row;
}

/**
 * Writes the row that replaces `old`. Throws CONFLICT when `old` has been replaced already: of two changes made from the same
 * row only the first stands, and the second is told who made it.
 */
export async function replacePass(
  ctx: ServerContext,
  old: PassRow,
  change: PassChange,
  action: 'pass.correct' | 'pass.exclude' | 'pass.restore',
): Promise<PassView> {
  const row: PassRow = { ...old, ...change, ...ownPart(ctx, old) };
  const detail = { passNo: row.passNo, correctsId: old.id, reason: row.correctionReason };
  await ctx.write(async (db) => {
    await refuseReplaced(ctx, db, old);
    await db.batch([
      db.insert(pass).values(row),
      auditInsert(db, ctx, action, { type: 'pass', id: row.rootId }, detail),
    ]);
  });
  return (await getPass(ctx, row.id)).pass;
}

const ownPart = (ctx: ServerContext, old: PassRow) => ({
  id: randomUUID(),
  correctsId: old.id,
  source: 'hand' as const,
  enteredBy: ctx.user.id,
  clientId: null,
  createdAt: ctx.now().toISOString(),
});

async function refuseReplaced(ctx: ServerContext, db: Db, old: PassRow): Promise<void> {
  const [other] = await db
    .select({ by: user.name })
    .from(pass)
    .leftJoin(user, eq(user.id, pass.enteredBy))
    .where(and(eq(pass.correctsId, old.id), eq(pass.teamId, ctx.team.id)));
  if (!other) return;
  const who = other.by ? ` by ${other.by}` : '';
  throw conflict(`Pass ${old.passNo} was changed${who} since you opened it. Open it again and check what stands now.`);
}
