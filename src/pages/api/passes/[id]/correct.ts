import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { correctPass } from '@/lib/server/passes';

export const POST = teamRoute(async (ctx, call) => correctPass(ctx, pathId(call), await readRaw(call.request)), 201);
