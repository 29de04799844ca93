import { pathId, teamRoute } from '@/lib/server/http';
import { getReading } from '@/lib/server/readings';

export const GET = teamRoute((ctx, call) => getReading(ctx, pathId(call)));
