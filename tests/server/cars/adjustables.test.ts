import { beforeEach, describe, expect, it } from 'vitest';
import { createAdjustable, getCar, updateAdjustable } from '@/lib/server/cars';
import { POST } from '@/pages/api/cars/[id]/adjustables';
import { PATCH } from '@/pages/api/cars/[id]/adjustables/[adjustableId]';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleCar, type World } from '../helpers';

let world: World;
let carId: string;
let adjustableId: string;
beforeEach(async () => {
  world = await makeTestDb();
  const made = await sampleCar(contextFor(world, 'owner'));
  carId = made.id;
  adjustableId = made.adjustables[0]?.id ?? '';
});

const WING = {
  key: 'wing_deg',
  label: 'Wing angle',
  unit: 'deg',
  step: '0,5',
  low: '0',
  high: '12',
  minutes: '4',
  group: 'launch',
};

describe('createAdjustable', () => {
  it('adds it last, from strings, open belief as null', async () => {
    const { status, body } = await callRoute(POST, {
      as: contextFor(world, 'crew_chief'),
      params: { id: carId },
      body: { ...WING, beliefMeanPct: '', beliefSdPct: '', movable: 'false' },
    });
    expect(status).toBe(201);
    expect(body).toMatchObject({
      key: 'wing_deg',
      step: 0.5,
      high: 12,
      movable: false,
      beliefMeanPct: null,
      position: 5,
    });
    expect((await getCar(contextFor(world, 'driver'), carId)).adjustables.at(-1)).toEqual(body);
  });

  it.each([
    [{ key: 'Wing Angle' }, 'key'],
    [{ key: 'slip_pct' }, 'key'],
    [{ step: 0 }, 'step'],
    [{ step: 13 }, 'step'],
    [{ high: -1 }, 'high'],
    [{ minutes: -1 }, 'minutes'],
    [{ group: 'tires' }, 'group'],
    [{ beliefMeanPct: 0.4 }, 'beliefSdPct'],
    [{ beliefSdPct: 0.4 }, 'beliefMeanPct'],
    [{ beliefMeanPct: 0.4, beliefSdPct: 0 }, 'beliefSdPct'],
  ])('refuses %j naming %s', async (change, field) => {
    const raw = { ...WING, ...change };
    const { status, body } = await callRoute(POST, {
      as: contextFor(world, 'owner'),
      params: { id: carId },
      body: raw,
    });
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toEqual([field]);
    expect((await getCar(contextFor(world, 'owner'), carId)).adjustables).toHaveLength(5);
  });

  it('refuses a key the car has', async () => {
    const again = createAdjustable(contextFor(world, 'owner'), carId, { ...WING, key: 'launch_rpm' });
    await expect(again).rejects.toMatchObject({ code: 'CONFLICT', fields: { key: expect.any(String) } });
  });

  it.each(otherRoles('owner', 'crew_chief'))('refuses a %s', async (role) => {
    const refused = createAdjustable(contextFor(world, role), carId, WING);
    await expect(refused).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });

  it('answers 404 to another team', async () => {
    const refused = createAdjustable(contextFor(world, 'owner', 'b'), carId, WING);
    await expect(refused).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});

describe('updateAdjustable', () => {
  it('changes what is sent', async () => {
    const { status, body } = await callRoute(PATCH, {
      as: contextFor(world, 'crew_chief'),
      method: 'PATCH',
      params: { id: carId, adjustableId },
      body: { beliefMeanPct: 0.5, beliefSdPct: '0,45', minutes: 9 },
    });
    expect(status).toBe(200);
    expect(body).toMatchObject({ id: adjustableId, beliefMeanPct: 0.5, beliefSdPct: 0.45, minutes: 9 });
  });

  it('keeps the key, under which past passes are stored', async () => {
    const ctx = contextFor(world, 'owner');
    await expect(updateAdjustable(ctx, carId, adjustableId, { key: 'other_g' })).rejects.toMatchObject({
      fields: { key: expect.any(String) },
    });
    await expect(
      updateAdjustable(ctx, carId, adjustableId, { key: 'counterweight_g', minutes: 8 }),
    ).resolves.toMatchObject({ minutes: 8 });
  });

  it('checks the new limits together with what stays', async () => {
    const refused = updateAdjustable(contextFor(world, 'owner'), carId, adjustableId, { low: 20 });
    await expect(refused).rejects.toMatchObject({ fields: { high: expect.any(String) } });
  });

  it('takes an archived one off the car', async () => {
    await updateAdjustable(contextFor(world, 'owner'), carId, adjustableId, { archived: 'true' });
    expect((await getCar(contextFor(world, 'owner'), carId)).adjustables).toHaveLength(4);
  });

  it.each(otherRoles('owner', 'crew_chief'))('refuses a %s', async (role) => {
    const refused = updateAdjustable(contextFor(world, role), carId, adjustableId, { minutes: 1 });
    await expect(refused).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });

  it('answers 404 to another team, and under another car of the own team', async () => {
    const theirs = updateAdjustable(contextFor(world, 'owner', 'b'), carId, adjustableId, { minutes: 1 });
    await expect(theirs).rejects.toMatchObject({ code: 'NOT_FOUND' });
    const second = await sampleCar(contextFor(world, 'owner'));
    const misplaced = updateAdjustable(contextFor(world, 'owner'), second.id, adjustableId, { minutes: 1 });
    await expect(misplaced).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
