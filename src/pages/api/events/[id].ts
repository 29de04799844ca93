import { getEvent, updateEvent } from '@/lib/server/events';
import { pathId, readRaw, teamRoute } from '@/lib/server/http';

export const GET = teamRoute((ctx, call) => getEvent(ctx, pathId(call)));
export const PATCH = teamRoute(async (ctx, call) => updateEvent(ctx, pathId(call), await readRaw(call.request)));
