import { createEvent, listEvents } from '@/lib/server/events';
import { readRaw, teamRoute } from '@/lib/server/http';

export const GET = teamRoute((ctx) => listEvents(ctx));
export const POST = teamRoute(async (ctx, { request }) => createEvent(ctx, await readRaw(request)), 201);
