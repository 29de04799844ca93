import { createCar, listCars } from '@/lib/server/cars';
import { readRaw, teamRoute } from '@/lib/server/http';

export const GET = teamRoute((ctx) => listCars(ctx));
export const POST = teamRoute(async (ctx, { request }) => createCar(ctx, await readRaw(request)), 201);
