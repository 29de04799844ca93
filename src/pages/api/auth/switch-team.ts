import { switchTeam } from '@/lib/server/auth';
import { openRoute, readRaw } from '@/lib/server/http';

/** Not public: the middleware asks for a session first. */
export const POST = openRoute(async (call) => switchTeam(call, await readRaw(call.request)));
