import { readRaw, teamRoute } from '@/lib/server/http';
import { createTrack, listTracks } from '@/lib/server/tracks';

export const GET = teamRoute((ctx) => listTracks(ctx));
export const POST = teamRoute(async (ctx, { request }) => createTrack(ctx, await readRaw(request)), 201);
