import { pathId, teamRoute } from '@/lib/server/http';
import { getPass } from '@/lib/server/passes';

export const GET = teamRoute((ctx, call) => getPass(ctx, pathId(call)));
