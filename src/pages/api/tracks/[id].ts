import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { getTrack, updateTrack } from '@/lib/server/tracks';

export const GET = teamRoute((ctx, call) => getTrack(ctx, pathId(call)));
export const PATCH = teamRoute(async (ctx, call) => updateTrack(ctx, pathId(call), await readRaw(call.request)));
