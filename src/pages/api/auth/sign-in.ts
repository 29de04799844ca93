import { signIn } from '@/lib/server/auth';
import { openRoute, readRaw } from '@/lib/server/http';

export const POST = openRoute(async (call) => signIn(call, await readRaw(call.request)));
