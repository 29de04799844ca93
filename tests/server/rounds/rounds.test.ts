import { beforeEach, describe, expect, it } from 'vitest';
import { createRound, getRound, listRounds, updateRound } from '@/lib/server/rounds';
import { GET, POST } from '@/pages/api/rounds';
import { PATCH } from '@/pages/api/rounds/[id]';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleEvent, sampleRound, type World } from '../helpers';

let world: World;
let eventId: string;
beforeEach(async () => {
  world = await makeTestDb();
  eventId = (await sampleEvent(contextFor(world, 'owner'))).id;
});

describe('createRound', () => {
  it('comes last without a position, and stores the planned time in UTC', async () => {
    const ctx = contextFor(world, 'tuner');
    await createRound(ctx, { eventId, name: 'Q1', position: '4' });
    const { status, body } = await callRoute(POST, {
      as: ctx,
      body: { eventId, name: 'Q2', lane: '', position: '', plannedAt: '2026-05-01T14:05-06:00' },
    });
    expect(status).toBe(201);
    expect(body).toMatchObject({ eventId, name: 'Q2', position: 5, lane: null, plannedAt: '2026-05-01T20:05:00.000Z' });
  });

  it("reads a wall-clock time in the track's zone", async () => {
    const made = await createRound(contextFor(world, 'owner'), {
      eventId,
      name: 'Q1',
      plannedAtLocal: '2026-05-01T14:05',
    });
    expect(made).toMatchObject({ plannedAt: '2026-05-01T20:05:00.000Z', timeZone: 'America/Denver' });
  });

  it.each([
    [{ name: '' }, 'name'],
    [{ lane: 'middle' }, 'lane'],
    [{ position: 0 }, 'position'],
    [{ position: 1.5 }, 'position'],
    [{ plannedAt: '2026-05-01T14:05' }, 'plannedAt'],
    [{ plannedAtLocal: 'noon' }, 'plannedAtLocal'],
    [{ eventId: '' }, 'eventId'],
  ])('refuses %j naming %s', async (change, field) => {
    const body = { eventId, name: 'Q1', ...change };
    const answer = await callRoute(POST, { as: contextFor(world, 'owner'), body });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toEqual([field]);
    expect(await listRounds(contextFor(world, 'owner'))).toEqual([]);
  });

  it('refuses a name the event has, not the same name in another event', async () => {
    const ctx = contextFor(world, 'owner');
    await createRound(ctx, { eventId, name: 'Q1' });
    await expect(createRound(ctx, { eventId, name: 'Q1' })).rejects.toMatchObject({ code: 'CONFLICT' });
    await expect(sampleRound(ctx, { name: 'Q1' })).resolves.toBeTruthy();
  });

  it("answers 404 for another team's event", async () => {
    const refused = createRound(contextFor(world, 'owner', 'b'), { eventId, name: 'Q1' });
    await expect(refused).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    await expect(createRound(contextFor(world, role), { eventId, name: 'Q1' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });
});

describe('updateRound', () => {
  it('takes the lane when it is drawn and leaves the rest', async () => {
    const made = await createRound(contextFor(world, 'owner'), { eventId, name: 'Q1', plannedAt: '2026-05-01T14:05Z' });
    const options = {
      as: contextFor(world, 'tuner'),
      method: 'PATCH',
      params: { id: made.id },
      body: { lane: 'left' },
    };
    expect((await callRoute(PATCH, options)).body).toEqual({ ...made, lane: 'left' });
  });

  it('clears the planned time with a blank', async () => {
    const ctx = contextFor(world, 'owner');
    const made = await createRound(ctx, { eventId, name: 'Q1', plannedAt: '2026-05-01T14:05Z' });
    expect((await updateRound(ctx, made.id, { plannedAtLocal: '' })).plannedAt).toBeNull();
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    const made = await sampleRound(contextFor(world, 'owner'));
    await expect(updateRound(contextFor(world, role), made.id, { lane: 'left' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it('answers 404 to another team and changes nothing', async () => {
    const made = await sampleRound(contextFor(world, 'owner'));
    const other = contextFor(world, 'owner', 'b');
    await expect(updateRound(other, made.id, { lane: 'left' })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    expect(await getRound(contextFor(world, 'owner'), made.id)).toEqual(made);
    await expect(getRound(other, made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});

describe('listRounds', () => {
  it('lists the own team in the order of the event, or one event', async () => {
    const ctx = contextFor(world, 'owner');
    const second = await createRound(ctx, { eventId, name: 'Q2', position: 2 });
    const first = await createRound(ctx, { eventId, name: 'Q1', position: 1 });
    await sampleRound(ctx);
    const { body } = await callRoute(GET, { as: contextFor(world, 'driver'), url: `/api/rounds?eventId=${eventId}` });
    expect(body).toEqual([first, second]);
    expect(await listRounds(ctx)).toHaveLength(3);
  });

  it("shows nothing of another team's event", async () => {
    await createRound(contextFor(world, 'owner'), { eventId, name: 'Q1' });
    expect(await listRounds(contextFor(world, 'owner', 'b'), { eventId })).toEqual([]);
    expect(await listRounds(contextFor(world, 'owner', 'b'), { eventId: "' OR 1=1 --" })).toEqual([]);
  });
});
