import { teamRoute } from '@/lib/server/http';
import { exportPasses } from '@/lib/server/passes';

export const GET = teamRoute(async (ctx, { url }) => {
  const { fileName, csv } = await exportPasses(ctx, Object.fromEntries(url.searchParams));
  const headers = {
    'content-type': 'text/csv; charset=utf-8',
    'content-disposition': `attachment; filename="${fileName}"`,
    'x-content-type-options': 'nosniff',
    'cache-control': 'no-store',
  };
  return new Response(csv, { headers });
});
