import { type BeliefView, beliefViews } from '@/lib/domain/model/belief-view';
import { MIN_PASSES } from '@/lib/domain/model/constants';
import { trains } from '@/lib/domain/model/features';
import { preparePasses, trainModel } from '@/lib/domain/model/train';
import { requireCan, type ServerContext } from '../context';
import { activeAdjustables, teamCar } from '../lookup';
import { loadPassRecords } from '../passes';

export interface CarEffects {
  /** Passes with a measured slip, not aborted and not excluded. */
  passesUsed: number;
  passesNeeded: number;
  /** One per adjustable on the car, slip points per step; null with too few passes. */
  views: BeliefView[] | null;
}

/** What the chief believed of each adjustable against what the passes of the car say today. Stores nothing. Throws NOT_FOUND. */
export async function carEffects(ctx: ServerContext, carId: string): Promise<CarEffects> {
  requireCan(ctx, 'suggestion:view');
  const car = await teamCar(ctx, carId);
  const passes = await loadPassRecords(ctx, car.id);
  const band = { lowPct: car.bandLowPct, highPct: car.bandHighPct };
  const model = trainModel(preparePasses(passes), await activeAdjustables(ctx, car.id), band);
  return {
    passesUsed: passes.filter(trains).length,
    passesNeeded: MIN_PASSES,
    views: model && beliefViews(model),
  };
}
