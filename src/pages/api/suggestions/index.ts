import { readRaw, teamRoute } from '@/lib/server/http';
import { createSuggestion, listSuggestions } from '@/lib/server/suggestions';

export const GET = teamRoute((ctx, { url }) => listSuggestions(ctx, Object.fromEntries(url.searchParams)));
export const POST = teamRoute(async (ctx, { request }) => createSuggestion(ctx, await readRaw(request)), 201);
