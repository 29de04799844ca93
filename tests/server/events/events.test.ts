import { beforeEach, describe, expect, it } from 'vitest';
import { createEvent, getEvent, listEvents, updateEvent } from '@/lib/server/events';
import { GET, POST } from '@/pages/api/events';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleEvent, sampleTrack, type World } from '../helpers';

let world: World;
let trackId: string;
beforeEach(async () => {
  world = await makeTestDb();
  trackId = (await sampleTrack(contextFor(world, 'owner'))).id;
});

const opener = () => ({ trackId, name: 'Opener', startsOn: '2026-05-01', endsOn: '2026-05-03' });

describe('createEvent', () => {
  it('answers with the track it is at', async () => {
    const { status, body } = await callRoute(POST, { as: contextFor(world, 'tuner'), body: opener() });
    expect(status).toBe(201);
    expect(body).toMatchObject({ ...opener(), timeZone: 'America/Denver', trackName: expect.any(String) });
  });

  it.each([{ endsOn: undefined }, { endsOn: '' }])('lasts one day without a last day (%j)', async (change) => {
    const made = await createEvent(contextFor(world, 'owner'), { ...opener(), ...change });
    expect(made.endsOn).toBe('2026-05-01');
  });

  it.each([
    [{ name: '' }, 'name'],
    [{ trackId: '' }, 'trackId'],
    [{ startsOn: '05/01/2026' }, 'startsOn'],
    [{ startsOn: '2026-02-30' }, 'startsOn'],
    [{ endsOn: '2026-04-30' }, 'endsOn'],
    [{ endsOn: '2027-05-03' }, 'endsOn'],
  ])('refuses %j naming %s', async (change, field) => {
    const { status, body } = await callRoute(POST, {
      as: contextFor(world, 'owner'),
      body: { ...opener(), ...change },
    });
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toEqual([field]);
    expect(await listEvents(contextFor(world, 'owner'))).toEqual([]);
  });

  it('refuses the same name on the same first day', async () => {
    await createEvent(contextFor(world, 'owner'), opener());
    await expect(createEvent(contextFor(world, 'owner'), opener())).rejects.toMatchObject({ code: 'CONFLICT' });
    await expect(
      createEvent(contextFor(world, 'owner'), { ...opener(), startsOn: '2026-05-02' }),
    ).resolves.toBeTruthy();
  });

  it("answers 404 for another team's track", async () => {
    const refused = createEvent(contextFor(world, 'owner', 'b'), opener());
    await expect(refused).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    await expect(createEvent(contextFor(world, role), opener())).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });
});

describe('updateEvent', () => {
  it('changes what is sent and checks it with what stays', async () => {
    const ctx = contextFor(world, 'owner');
    const made = await createEvent(ctx, opener());
    expect(await updateEvent(ctx, made.id, { endsOn: '2026-05-04' })).toEqual({ ...made, endsOn: '2026-05-04' });
    await expect(updateEvent(ctx, made.id, { endsOn: '2026-04-04' })).rejects.toMatchObject({ code: 'VALIDATION' });
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    const made = await createEvent(contextFor(world, 'owner'), opener());
    await expect(updateEvent(contextFor(world, role), made.id, { name: 'x' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it("answers 404 to another team, and for another team's track", async () => {
    const made = await createEvent(contextFor(world, 'owner'), opener());
    const other = contextFor(world, 'owner', 'b');
    await expect(updateEvent(other, made.id, { name: 'x' })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(getEvent(other, made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
    const theirTrack = (await sampleTrack(other)).id;
    const moved = updateEvent(contextFor(world, 'owner'), made.id, { trackId: theirTrack });
    await expect(moved).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});

it('lists only the own team, newest first', async () => {
  const ctx = contextFor(world, 'owner');
  const early = await sampleEvent(ctx, { startsOn: '2026-03-01', endsOn: '2026-03-01' });
  const late = await sampleEvent(ctx, { startsOn: '2026-06-01', endsOn: '2026-06-01' });
  await sampleEvent(contextFor(world, 'owner', 'b'));
  const { body } = await callRoute(GET, { as: contextFor(world, 'driver') });
  expect(body.map(({ id }: { id: string }) => id)).toEqual([late.id, early.id]);
});
