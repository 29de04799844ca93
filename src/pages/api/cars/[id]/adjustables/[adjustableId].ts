import { updateAdjustable } from '@/lib/server/cars';
import { pathId, readRaw, teamRoute } from '@/lib/server/http';

export const PATCH = teamRoute(async (ctx, call) =>
  updateAdjustable(ctx, pathId(call), pathId(call, 'adjustableId'), await readRaw(call.request)),
);
