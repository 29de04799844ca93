import { and, asc, eq, inArray, isNull } from 'drizzle-orm';
import { adjustable } from '@/db/schema';
import type { ServerContext } from '../context';
import type { CarRow } from '../lookup';

type AdjustableRow = typeof adjustable.$inferSelect;
/** What screens and the API get: the row without the tenant columns. SI and the adjustable's own unit. */
export type AdjustableView = Omit<AdjustableRow, 'teamId' | 'carId'>;
export type CarView = Omit<CarRow, 'teamId'> & { adjustables: AdjustableView[] };

export function adjustableView({ teamId: _team, carId: _car, ...view }: AdjustableRow): AdjustableView {
  return view;
}

/** Adds to each car what can be set on it, in the team's order; archived adjustables are left out. */
export async function withAdjustables(ctx: ServerContext, cars: readonly CarRow[]): Promise<CarView[]> {
  const rows = await adjustablesOf(ctx, cars);
  return cars.map(({ teamId: _team, ...view }) => ({
    ...view,
    adjustables: rows.filter((row) => row.carId === view.id).map(adjustableView),
  }));
}

function adjustablesOf(ctx: ServerContext, cars: readonly CarRow[]): Promise<AdjustableRow[]> {
  const ids = cars.map((car) => car.id);
  return ctx.db
    .select()
    .from(adjustable)
    .where(and(eq(adjustable.teamId, ctx.team.id), inArray(adjustable.carId, ids), isNull(adjustable.archivedAt)))
    .orderBy(asc(adjustable.position), asc(adjustable.key));
}
