import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, car } from '@/db/schema';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { createCar, getCar, listCars, updateCar } from '@/lib/server/cars';
import { GET, POST } from '@/pages/api/cars';
import { PATCH } from '@/pages/api/cars/[id]';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleCar, type World } from '../helpers';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const auditOf = (id: string) => world.handle.db.select().from(auditEvent).where(eq(auditEvent.subjectId, id));

describe('createCar', () => {
  it('gives a car without a list the usual adjustables, in their order', async () => {
    const made = await createCar(contextFor(world, 'crew_chief'), { name: 'Blue car' });
    expect(made.adjustables.map(({ key }) => key)).toEqual(DEFAULT_ADJUSTABLES.map(({ key }) => key));
    expect(made).toMatchObject({ name: 'Blue car', distanceFt: 1000, bandLowPct: 13, bandHighPct: 17 });
    expect(made).not.toHaveProperty('teamId');
  });

  it('takes strings as a form posts them, a comma as decimal sign, inches for meters, and blank as open', async () => {
    const made = await createCar(contextFor(world, 'owner'), {
      name: '  Long   name ',
      distanceFt: '660',
      finalDriveRatio: '3,2',
      rolloutM: '',
      rolloutIn: '114,5',
      rolloutGrowthPctAt100Mph: '4.4704',
      pulsesPerTurn: '',
    });
    expect(made).toMatchObject({ name: 'Long name', distanceFt: 660, finalDriveRatio: 3.2, pulsesPerTurn: null });
    expect(made.rolloutM).toBeCloseTo(114.5 * 0.0254, 12);
    expect(made.rolloutGrowthPerMps).toBeCloseTo(0.001, 12);
  });

  it('keeps the adjustables that are sent', async () => {
    const adjustables = [
      {
        key: 'lever_pos',
        label: 'Lever',
        step: 1,
        low: 0,
        high: 9,
        minutes: 4,
        group: 'clutch',
        beliefMeanPct: 0.4,
        beliefSdPct: 0.3,
      },
    ];
    const made = await createCar(contextFor(world, 'owner'), { name: 'One lever', adjustables });
    expect(made.adjustables).toHaveLength(1);
    expect(made.adjustables[0]).toMatchObject({ key: 'lever_pos', movable: true, unit: '', beliefMeanPct: 0.4 });
  });

  it.each([
    [{ name: '' }, 'name'],
    [{ name: 'x', distanceFt: 500 }, 'distanceFt'],
    [{ name: 'x', bandLowPct: 18, bandHighPct: 12 }, 'bandHighPct'],
    [{ name: 'x', finalDriveRatio: '3.2.1' }, 'finalDriveRatio'],
    [{ name: 'x', rolloutIn: 2.9 }, 'rolloutIn'],
    [{ name: 'x', slipWindowStartS: 3, slipWindowEndS: 2 }, 'slipWindowEndS'],
    [
      { name: 'x', adjustables: [{ key: 'lane', label: 'L', step: 1, low: 0, high: 9, group: 'clutch' }] },
      'adjustables.0.key',
    ],
    [
      { name: 'x', adjustables: [{ key: 'a', label: 'L', step: 1, low: 9, high: 0, group: 'clutch' }] },
      'adjustables.0.high',
    ],
  ])('refuses %j naming the field %s, and stores nothing', async (raw, field) => {
    const ctx = contextFor(world, 'owner');
    const error = await createCar(ctx, raw).catch((thrown: unknown) => thrown);
    const { body, status } = await callRoute(POST, { as: ctx, body: raw });
    expect(error).toBeInstanceOf(Error);
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toContain(field);
    expect(await listCars(ctx)).toEqual([]);
  });

  it('refuses a name the team has, but not the name of another team', async () => {
    await sampleCar(contextFor(world, 'owner', 'b'), { name: 'Same' });
    await sampleCar(contextFor(world, 'owner'), { name: 'Same' });
    await expect(sampleCar(contextFor(world, 'owner'), { name: 'Same' })).rejects.toMatchObject({ code: 'CONFLICT' });
  });

  it('ignores fields that are not its own', async () => {
    const made = await sampleCar(contextFor(world, 'owner'), { teamId: world.b.team.id, id: 'mine', createdAt: 'x' });
    const [row] = await world.handle.db.select().from(car).where(eq(car.id, made.id));
    expect(row).toMatchObject({ teamId: world.a.team.id, createdAt: '2026-05-02T15:00:00.000Z' });
  });

  it.each(otherRoles('owner', 'crew_chief'))('refuses a %s', async (role) => {
    await expect(createCar(contextFor(world, role), { name: 'x' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
    expect(await world.handle.db.select().from(car)).toEqual([]);
  });

  it('writes one audit row with who and what', async () => {
    const ctx = contextFor(world, 'owner');
    const made = await sampleCar(ctx);
    expect(await auditOf(made.id)).toMatchObject([
      {
        action: 'car.create',
        userId: ctx.user.id,
        teamId: ctx.team.id,
        requestId: ctx.requestId,
        at: '2026-05-02T15:00:00.000Z',
      },
    ]);
  });
});

describe('updateCar', () => {
  it('changes only what is sent, and notes old and new', async () => {
    const ctx = contextFor(world, 'owner');
    const made = await sampleCar(ctx, { sensorNote: 'both wheels' });
    const { status, body } = await callRoute(PATCH, {
      as: ctx,
      method: 'PATCH',
      params: { id: made.id },
      body: { bandLowPct: '12' },
    });
    expect(status).toBe(200);
    expect(body).toEqual({ ...made, bandLowPct: 12 });
    expect((await auditOf(made.id)).map(({ detail }) => detail)).toContainEqual({ bandLowPct: { from: 13, to: 12 } });
  });

  it('checks the change together with what stays', async () => {
    const made = await sampleCar(contextFor(world, 'owner'));
    const tooHigh = updateCar(contextFor(world, 'owner'), made.id, { bandLowPct: 17 });
    await expect(tooHigh).rejects.toMatchObject({ code: 'VALIDATION', fields: { bandHighPct: expect.any(String) } });
  });

  it('clears an optional value with null or blank', async () => {
    const made = await sampleCar(contextFor(world, 'owner'), { finalDriveRatio: 3.2, rolloutM: 2.9 });
    const after = await updateCar(contextFor(world, 'owner'), made.id, { finalDriveRatio: null, rolloutIn: '' });
    expect(after).toMatchObject({ finalDriveRatio: null, rolloutM: null });
  });

  it('takes an archived car off the list and keeps it readable', async () => {
    const ctx = contextFor(world, 'owner');
    const made = await sampleCar(ctx);
    await updateCar(ctx, made.id, { archived: true });
    expect(await listCars(ctx)).toEqual([]);
    expect(await getCar(ctx, made.id)).toMatchObject({ archivedAt: '2026-05-02T15:00:00.000Z' });
  });

  it('refuses an empty change and a name that is taken', async () => {
    const ctx = contextFor(world, 'owner');
    const [first, second] = [await sampleCar(ctx), await sampleCar(ctx)];
    await expect(updateCar(ctx, first.id, { unknown: 1 })).rejects.toThrow(/Nothing to change/);
    await expect(updateCar(ctx, first.id, { name: second.name })).rejects.toMatchObject({ code: 'CONFLICT' });
  });

  it.each(otherRoles('owner', 'crew_chief'))('refuses a %s', async (role) => {
    const made = await sampleCar(contextFor(world, 'owner'));
    await expect(updateCar(contextFor(world, role), made.id, { name: 'x' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it('is the same 404 for another team as for a missing car', async () => {
    const made = await sampleCar(contextFor(world, 'owner'));
    const other = contextFor(world, 'owner', 'b');
    const [theirs, missing] = await Promise.all(
      [made.id, 'missing'].map((id) => updateCar(other, id, { name: 'x' }).catch((thrown: Error) => thrown)),
    );
    expect(theirs).toMatchObject({ code: 'NOT_FOUND' });
    expect((theirs as Error).message).toBe((missing as Error).message);
    expect((await getCar(contextFor(world, 'owner'), made.id)).name).toBe(made.name);
  });
});

describe('reading cars', () => {
  it('lists only the own team, for every role', async () => {
    const made = await sampleCar(contextFor(world, 'owner'));
    await sampleCar(contextFor(world, 'owner', 'b'));
    const { status, body } = await callRoute(GET, { as: contextFor(world, 'driver') });
    expect(status).toBe(200);
    expect(body).toEqual([made]);
  });

  it('answers 404 for another team', async () => {
    const made = await sampleCar(contextFor(world, 'owner'));
    await expect(getCar(contextFor(world, 'owner', 'b'), made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });

  it('answers 401 to nobody and 403 to a user without a team', async () => {
    expect((await callRoute(GET)).status).toBe(401);
    const teamless = { ...contextFor(world, 'owner'), team: null, role: null } as never;
    expect((await callRoute(GET, { as: teamless })).status).toBe(403);
  });
});
