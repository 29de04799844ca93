import { and, asc, eq, isNull } from 'drizzle-orm';
import { car } from '@/db/schema';
import { requireCan, type ServerContext } from '../context';
import { teamCar } from '../lookup';
import { type CarView, withAdjustables } from './view';

/** The team's cars with their adjustables, by name; archived ones are left out. */
export async function listCars(ctx: ServerContext): Promise<CarView[]> {
  requireCan(ctx, 'car:view');
  const rows = await ctx.db
    .select()
    .from(car)
    .where(and(eq(car.teamId, ctx.team.id), isNull(car.archivedAt)))
    .orderBy(asc(car.name));
  return withAdjustables(ctx, rows);
}

/** One car of the team, archived or not. Throws NOT_FOUND. */
export async function getCar(ctx: ServerContext, carId: string): Promise<CarView> {
  requireCan(ctx, 'car:view');
  const [view] = await withAdjustables(ctx, [await teamCar(ctx, carId)]);
  return view as CarView;
}
