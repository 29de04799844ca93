import { readRaw, teamRoute } from '@/lib/server/http';
import { createRound, listRounds } from '@/lib/server/rounds';

export const GET = teamRoute((ctx, { url }) => listRounds(ctx, Object.fromEntries(url.searchParams)));
export const POST = teamRoute(async (ctx, { request }) => createRound(ctx, await readRaw(request)), 201);
