import { readRaw, teamRoute } from '@/lib/server/http';
import { listPasses, logPass } from '@/lib/server/passes';

export const GET = teamRoute((ctx, { url }) => listPasses(ctx, Object.fromEntries(url.searchParams)));
export const POST = teamRoute(async (ctx, { request }) => logPass(ctx, await readRaw(request)), 201);
