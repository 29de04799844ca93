import { readRaw, teamRoute } from '@/lib/server/http';
import { enterReading, listReadings } from '@/lib/server/readings';

export const GET = teamRoute((ctx, { url }) => listReadings(ctx, Object.fromEntries(url.searchParams)));
export const POST = teamRoute(async (ctx, { request }) => enterReading(ctx, await readRaw(request)), 201);
