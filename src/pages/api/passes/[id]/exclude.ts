import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { excludePass } from '@/lib/server/passes';

export const POST = teamRoute(async (ctx, call) => excludePass(ctx, pathId(call), await readRaw(call.request)), 201);
