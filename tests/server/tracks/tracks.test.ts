import { beforeEach, describe, expect, it } from 'vitest';
import { createTrack, getTrack, listTracks, updateTrack } from '@/lib/server/tracks';
import { GET, POST } from '@/pages/api/tracks';
import { PATCH } from '@/pages/api/tracks/[id]';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleTrack, type World } from '../helpers';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

describe('createTrack', () => {
  it('stores meters, also from feet', async () => {
    const { status, body } = await callRoute(POST, {
      as: contextFor(world, 'tuner'),
      body: {
        name: 'Mesa Flat',
        latitudeDeg: '39,65',
        longitudeDeg: '-105.1',
        altitudeFt: '5800',
        timeZone: 'America/Denver',
      },
    });
    expect(status).toBe(201);
    expect(body).toMatchObject({
      name: 'Mesa Flat',
      latitudeDeg: 39.65,
      longitudeDeg: -105.1,
      timeZone: 'America/Denver',
    });
    expect(body.altitudeM).toBeCloseTo(5800 * 0.3048, 9);
    expect(body).not.toHaveProperty('altitudeFt');
  });

  it.each([
    [{ name: ' ' }, 'name'],
    [{ name: 'x', timeZone: 'Mountain time' }, 'timeZone'],
    [{ name: 'x', latitudeDeg: 91, longitudeDeg: 0 }, 'latitudeDeg'],
    [{ name: 'x', latitudeDeg: 40 }, 'longitudeDeg'],
    [{ name: 'x', altitudeM: 5800 }, 'altitudeM'],
    [{ name: 'x', altitudeM: '1e400' }, 'altitudeM'],
  ])('refuses %j naming %s', async (raw, field) => {
    const { status, body } = await callRoute(POST, { as: contextFor(world, 'owner'), body: raw });
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields)).toEqual([field]);
    expect(await listTracks(contextFor(world, 'owner'))).toEqual([]);
  });

  it('refuses a name the team has, but not the name of another team', async () => {
    await sampleTrack(contextFor(world, 'owner', 'b'), { name: 'Same' });
    await sampleTrack(contextFor(world, 'owner'), { name: 'Same' });
    await expect(sampleTrack(contextFor(world, 'owner'), { name: 'Same' })).rejects.toMatchObject({ code: 'CONFLICT' });
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    await expect(createTrack(contextFor(world, role), { name: 'x' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });
});

describe('updateTrack', () => {
  it('changes what is sent', async () => {
    const made = await sampleTrack(contextFor(world, 'tuner'));
    const options = {
      as: contextFor(world, 'tuner'),
      method: 'PATCH',
      params: { id: made.id },
      body: { altitudeFt: 1000 },
    };
    const { status, body } = await callRoute(PATCH, options);
    expect(status).toBe(200);
    expect(body).toEqual({ ...made, altitudeM: 304.8 });
  });

  it('checks the position together with what stays', async () => {
    const made = await sampleTrack(contextFor(world, 'owner'));
    const refused = updateTrack(contextFor(world, 'owner'), made.id, { longitudeDeg: '' });
    await expect(refused).rejects.toMatchObject({ fields: { longitudeDeg: expect.any(String) } });
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    const made = await sampleTrack(contextFor(world, 'owner'));
    await expect(updateTrack(contextFor(world, role), made.id, { name: 'x' })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    });
  });

  it('answers 404 to another team and changes nothing', async () => {
    const made = await sampleTrack(contextFor(world, 'owner'));
    const other = contextFor(world, 'owner', 'b');
    await expect(updateTrack(other, made.id, { name: 'x' })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(getTrack(other, made.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
    expect(await getTrack(contextFor(world, 'owner'), made.id)).toEqual(made);
  });
});

it('lists only the own team, for every role', async () => {
  const made = await sampleTrack(contextFor(world, 'owner'));
  await sampleTrack(contextFor(world, 'owner', 'b'));
  expect((await callRoute(GET, { as: contextFor(world, 'driver') })).body).toEqual([made]);
});
