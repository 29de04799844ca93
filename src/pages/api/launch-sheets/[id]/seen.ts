import { pathId, teamRoute } from '@/lib/server/http';
import { markSeen } from '@/lib/server/sheets';

export const POST = teamRoute((ctx, call) => markSeen(ctx, pathId(call)));
