import { AppError } from '@/lib/server/errors';
import { teamRoute } from '@/lib/server/http';
import { currentSheet } from '@/lib/server/sheets';

export const GET = teamRoute(async (ctx, { url }) => {
  const sheet = await currentSheet(ctx, Object.fromEntries(url.searchParams));
  if (sheet === null) throw new AppError('NOT_FOUND', 'No launch sheet has been published for this car yet.');
  return sheet;
});
