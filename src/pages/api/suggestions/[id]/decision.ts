import { decideSuggestion } from '@/lib/server/decisions';
import { pathId, readRaw, teamRoute } from '@/lib/server/http';

export const POST = teamRoute(
  async (ctx, call) => decideSuggestion(ctx, pathId(call), await readRaw(call.request)),
  201,
);
