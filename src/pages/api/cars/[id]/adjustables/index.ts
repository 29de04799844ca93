import { createAdjustable } from '@/lib/server/cars';
import { pathId, readRaw, teamRoute } from '@/lib/server/http';

export const POST = teamRoute(
  async (ctx, call) => createAdjustable(ctx, pathId(call), await readRaw(call.request)),
  201,
);
