import { randomUUID } from 'node:crypto';
import type { adjustable } from '@/db/schema';
import type { adjustableInput } from '@/lib/forms/car';
import type { ServerContext } from '../context';

export type AdjustableFields = Omit<ReturnType<typeof adjustableInput.parse>, 'position'> & { position?: number };

export function adjustableRow(
  ctx: ServerContext,
  carId: string,
  fields: AdjustableFields,
  lastPosition: number,
): typeof adjustable.$inferInsert {
  const position = fields.position ?? lastPosition;
  return { ...fields, position, id: randomUUID(), teamId: ctx.team.id, carId, createdAt: ctx.now().toISOString() };
}
