import { pathId, readRaw, teamRoute } from '@/lib/server/http';
import { liveForecast } from '@/lib/server/suggestions';

export const POST = teamRoute(async (ctx, call) => liveForecast(ctx, pathId(call), await readRaw(call.request)));
