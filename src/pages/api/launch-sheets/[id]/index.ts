import { pathId, teamRoute } from '@/lib/server/http';
import { getSheet } from '@/lib/server/sheets';

export const GET = teamRoute((ctx, call) => getSheet(ctx, pathId(call)));
