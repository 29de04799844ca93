import { and, count, eq } from 'drizzle-orm';
import { adjustable } from '@/db/schema';
import { adjustableInput, adjustablePatchShape } from '@/lib/forms/car';
import { parsePatch } from '@/lib/forms/fields';
import { archiveChange } from '../archive';
import { auditInsert, changedFields } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { notFound, validationError } from '../errors';
import { teamCar } from '../lookup';
import { adjustableRow } from './rows';
import { adjustableProblems } from './rules';
import { type AdjustableView, adjustableView } from './view';

/** Adds something that can be set on the car; without a position it comes last. Throws NOT_FOUND, VALIDATION or CONFLICT. */
export async function createAdjustable(ctx: ServerContext, carId: string, raw: unknown): Promise<AdjustableView> {
  requireCan(ctx, 'car:edit');
  requireCan(ctx, 'belief:edit');
  const { id } = await teamCar(ctx, carId);
  const input = adjustableInput.parse(raw);
  refuseProblems(adjustableProblems(input));
  const row = adjustableRow(ctx, id, input, await countAdjustables(ctx, id));
  await refuseDuplicate('key', `The car has an adjustable with the key ${row.key} already.`, () =>
    ctx.write((db) =>
      db.batch([
        db.insert(adjustable).values(row),
        auditInsert(db, ctx, 'adjustable.create', { type: 'adjustable', id: row.id }, { carId: id, key: row.key }),
      ]),
    ),
  );
  return adjustableView(await teamAdjustable(ctx, id, row.id));
}

/** Changes the fields that are sent. The key stays: past passes are kept under it. Throws NOT_FOUND or VALIDATION. */
export async function updateAdjustable(
  ctx: ServerContext,
  carId: string,
  adjustableId: string,
  raw: unknown,
): Promise<AdjustableView> {
  requireCan(ctx, 'car:edit');
  requireCan(ctx, 'belief:edit');
  const before = await teamAdjustable(ctx, carId, adjustableId);
  const { archived, ...columns } = parsePatch(adjustablePatchShape, raw);
  const patch = { ...columns, ...archiveChange(ctx, archived) };
  refuseNewKey(before.key, patch.key);
  refuseProblems(adjustableProblems({ ...before, ...patch }));
  const changed = changedFields(before, patch);
  if (Object.keys(changed).length === 0) return adjustableView(before);
  await ctx.write((db) =>
    db.batch([
      db
        .update(adjustable)
        .set(patch)
        .where(and(eq(adjustable.id, adjustableId), eq(adjustable.teamId, ctx.team.id))),
      auditInsert(db, ctx, 'adjustable.update', { type: 'adjustable', id: adjustableId }, changed),
    ]),
  );
  return adjustableView(await teamAdjustable(ctx, carId, adjustableId));
}

function refuseNewKey(before: string, key: string | undefined): void {
  if (key === undefined || key === before) return;
  const message = `The key stays ${before}: past passes are kept under it. Change the label, or add a new adjustable.`;
  throw validationError(message, { key: message });
}

async function teamAdjustable(ctx: ServerContext, carId: string, adjustableId: string) {
  const [row] = await ctx.db
    .select()
    .from(adjustable)
    .where(and(eq(adjustable.id, adjustableId), eq(adjustable.carId, carId), eq(adjustable.teamId, ctx.team.id)));
  if (!row) throw notFound('adjustable');
  return row;
}

async function countAdjustables(ctx: ServerContext, carId: string): Promise<number> {
  const [row] = await ctx.db
    .select({ n: count() })
    .from(adjustable)
    .where(and(eq(adjustable.carId, carId), eq(adjustable.teamId, ctx.team.id)));
  return row?.n ?? 0;
}
