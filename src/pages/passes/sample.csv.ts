import { sampleRows } from '@/components/passes/sample-file';
import { exportPassCsv } from '@/lib/pass-csv';
import { requireCan } from '@/lib/server/context';
import { teamRoute } from '@/lib/server/http';
import { activeAdjustables, teamCar } from '@/lib/server/lookup';

/** A pass file to fill in, with the columns of the car. */
export const GET = teamRoute(async (ctx, { url }) => {
  requireCan(ctx, 'pass:import');
  const car = await teamCar(ctx, url.searchParams.get('car') ?? '');
  const adjustables = await activeAdjustables(ctx, car.id);
  const csv = exportPassCsv(sampleRows(adjustables), adjustables, ctx.team.units);
  const headers = {
    'content-type': 'text/csv; charset=utf-8',
    'content-disposition': 'attachment; filename="passes-to-fill-in.csv"',
    'x-content-type-options': 'nosniff',
    'cache-control': 'no-store',
  };
  return new Response(csv, { headers });
});
