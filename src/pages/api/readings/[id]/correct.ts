import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { correctReading } from '@/lib/server/readings';

export const POST = teamRoute(async (ctx, call) => correctReading(ctx, pathId(call), await readRaw(call.request)), 201);
