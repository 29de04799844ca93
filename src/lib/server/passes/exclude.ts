import { passExclusion, passRestoration } from '@/lib/forms/pass';
import { requireCan, type ServerContext } from '../context';
import { conflict } from '../errors';
import { passRow, replacePass } from './replace';
import type { PassView } from './view';

/** Leaves a pass out of the model, with a reason, by a new row. Throws CONFLICT when it is left out already or was replaced. */
export async function excludePass(ctx: ServerContext, passId: string, raw: unknown): Promise<PassView> {
  requireCan(ctx, 'pass:exclude');
  const { reason } = passExclusion.parse(raw);
  const old = await passRow(ctx, passId);
  if (old.excluded) throw conflict(`Pass ${old.passNo} is left out already.`);
  const change = { excluded: true, excludedReason: reason, correctionReason: reason };
  return replacePass(ctx, old, change, 'pass.exclude');
}

/** Lets a left-out pass count again, with a reason, by a new row. Throws CONFLICT when it counts already or was replaced. */
export async function restorePass(ctx: ServerContext, passId: string, raw: unknown): Promise<PassView> {
  requireCan(ctx, 'pass:exclude');
  const { reason } = passRestoration.parse(raw);
  const old = await passRow(ctx, passId);
  if (!old.excluded) throw conflict(`Pass ${old.passNo} counts already.`);
  const change = { excluded: false, excludedReason: null, correctionReason: reason };
  return replacePass(ctx, old, change, 'pass.restore');
}
