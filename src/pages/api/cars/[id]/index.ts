import { getCar, updateCar } from '@/lib/server/cars';
import { pathId, readRaw, teamRoute } from '@/lib/server/http';

export const GET = teamRoute((ctx, call) => getCar(ctx, pathId(call)));
export const PATCH = teamRoute(async (ctx, call) => updateCar(ctx, pathId(call), await readRaw(call.request)));
