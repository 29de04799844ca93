import { beforeEach, describe, expect, it } from 'vitest';
import { carEffects, updateAdjustable } from '@/lib/server/cars';
import { contextFor, makeTestDb, sampleCar, type World } from '../helpers';
import { readyToAsk } from '../suggestions/season';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

describe('carEffects', () => {
  it('sets each belief against what the passes say, as believed today', async () => {
    const { car } = await readyToAsk(world, 40);
    const before = await carEffects(contextFor(world, 'crew'), car.id);
    expect(before.passesUsed).toBe(40);
    expect(before.views?.map((view) => view.key).sort()).toEqual(car.adjustables.map(({ key }) => key).sort());
    for (const view of before.views ?? []) expect(view.now.sdPct).toBeLessThan(view.belief.sdPct);
    const { id } = car.adjustables.find(({ key }) => key === 'counterweight_g')!;
    await updateAdjustable(contextFor(world, 'owner'), car.id, id, { beliefMeanPct: -2, beliefSdPct: 0.5 });
    const after = await carEffects(contextFor(world, 'crew'), car.id);
    const view = after.views?.find(({ key }) => key === 'counterweight_g');
    expect(view?.belief.meanPct).toBeCloseTo(-2, 9);
  });

  it('gives no effects with too few passes, and says how many it takes', async () => {
    const car = await sampleCar(contextFor(world, 'owner'));
    expect(await carEffects(contextFor(world, 'crew'), car.id)).toEqual({
      passesUsed: 0,
      passesNeeded: 8,
      views: null,
    });
  });

  it('is not for the driver, and another team has no such car', async () => {
    const car = await sampleCar(contextFor(world, 'owner'));
    await expect(carEffects(contextFor(world, 'driver'), car.id)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(carEffects(contextFor(world, 'owner', 'b'), car.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(carEffects(contextFor(world, 'owner'), 'nothing')).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
