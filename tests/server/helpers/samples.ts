import { createCar } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { createEvent } from '@/lib/server/events';
import { createRound } from '@/lib/server/rounds';
import { createTrack } from '@/lib/server/tracks';
import { contextFor, type World } from './world';

let serial = 0;
const next = (): number => {
  serial += 1;
  return serial;
};

/** A car with the usual five adjustables. */
export const sampleCar = (ctx: ServerContext, fields: Record<string, unknown> = {}) =>
  createCar(ctx, { name: `Car ${next()}`, ...fields });

export const sampleTrack = (ctx: ServerContext, fields: Record<string, unknown> = {}) =>
  createTrack(ctx, {
    name: `Track ${next()}`,
    latitudeDeg: 39.5,
    longitudeDeg: -104.9,
    altitudeM: 1770,
    timeZone: 'America/Denver',
    ...fields,
  });

export async function sampleEvent(ctx: ServerContext, fields: Record<string, unknown> = {}) {
  const trackId = fields.trackId ?? (await sampleTrack(ctx)).id;
  return createEvent(ctx, {
    name: `Event ${next()}`,
    startsOn: '2026-05-01',
    endsOn: '2026-05-03',
    ...fields,
    trackId,
  });
}

export async function sampleRound(ctx: ServerContext, fields: Record<string, unknown> = {}) {
  const eventId = fields.eventId ?? (await sampleEvent(ctx)).id;
  return createRound(ctx, { name: `Q${next()}`, ...fields, eventId });
}

/** One car, track, event and round of a team, made by its owner. */
export async function sampleSeason(world: World, which: 'a' | 'b' = 'a') {
  const owner = contextFor(world, 'owner', which);
  const car = await sampleCar(owner);
  const track = await sampleTrack(owner);
  const event = await sampleEvent(owner, { trackId: track.id });
  const round = await sampleRound(owner, { eventId: event.id });
  return { car, track, event, round };
}
