import { pathId, teamRoute } from '@/lib/server/http';
import { getSuggestion } from '@/lib/server/suggestions';

export const GET = teamRoute((ctx, call) => getSuggestion(ctx, pathId(call)));
