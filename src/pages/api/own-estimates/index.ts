import { readRaw, teamRoute } from '@/lib/server/http';
import { listOwnEstimates, recordOwnEstimate } from '@/lib/server/suggestions';

export const GET = teamRoute((ctx, { url }) => listOwnEstimates(ctx, Object.fromEntries(url.searchParams)));
export const POST = teamRoute(async (ctx, { request }) => recordOwnEstimate(ctx, await readRaw(request)), 201);
