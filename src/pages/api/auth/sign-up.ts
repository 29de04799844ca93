import { signUp } from '@/lib/server/auth';
import { openRoute, readRaw } from '@/lib/server/http';

export const POST = openRoute(async (call) => signUp(call, await readRaw(call.request)), 201);
