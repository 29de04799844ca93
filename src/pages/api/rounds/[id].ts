import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { getRound, updateRound } from '@/lib/server/rounds';

export const GET = teamRoute((ctx, call) => getRound(ctx, pathId(call)));
export const PATCH = teamRoute(async (ctx, call) => updateRound(ctx, pathId(call), await readRaw(call.request)));
