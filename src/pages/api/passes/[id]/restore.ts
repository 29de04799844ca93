import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { restorePass } from '@/lib/server/passes';

export const POST = teamRoute(async (ctx, call) => restorePass(ctx, pathId(call), await readRaw(call.request)), 201);
