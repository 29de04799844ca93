import { and, eq } from 'drizzle-orm';
import { car } from '@/db/schema';
import { carPatchShape, siLengths } from '@/lib/forms/car';
import { parsePatch } from '@/lib/forms/fields';
import { archiveChange } from '../archive';
import { auditInsert, changedFields } from '../audit';
import { requireCan, type ServerContext } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { teamCar } from '../lookup';
import { getCar } from './list';
import { carProblems } from './rules';
import type { CarView } from './view';

/** Changes the fields that are sent. Throws NOT_FOUND, VALIDATION or CONFLICT (name taken). */
export async function updateCar(ctx: ServerContext, carId: string, raw: unknown): Promise<CarView> {
  requireCan(ctx, 'car:edit');
  const before = await teamCar(ctx, carId);
  const patch = carPatch(ctx, raw);
  refuseProblems(carProblems({ ...before, ...patch }));
  const changed = changedFields(before, patch);
  if (Object.keys(changed).length === 0) return getCar(ctx, carId);
  await refuseDuplicate('name', `Your team has a car named ${patch.name} already. Choose another name.`, () =>
    ctx.write((db) =>
      db.batch([
        db
          .update(car)
          .set(patch)
          .where(and(eq(car.id, carId), eq(car.teamId, ctx.team.id))),
        auditInsert(db, ctx, 'car.update', { type: 'car', id: carId }, changed),
      ]),
    ),
  );
  return getCar(ctx, carId);
}

function carPatch(ctx: ServerContext, raw: unknown) {
  const { rolloutIn, frontRolloutIn, rolloutGrowthPctAt100Mph, rolloutGrowthPctAt100Kmh, archived, ...columns } =
    parsePatch(carPatchShape, raw);
  const twins = { rolloutIn, frontRolloutIn, rolloutGrowthPctAt100Mph, rolloutGrowthPctAt100Kmh };
  return { ...columns, ...siLengths({ ...columns, ...twins }), ...archiveChange(ctx, archived) };
}
