import { teamRoute } from '@/lib/server/http';
import { me } from '@/lib/server/teams';

export const GET = teamRoute((ctx) => me(ctx));
