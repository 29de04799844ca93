import type { ServerContext } from '@/lib/server/context';
import { formData } from '@/lib/server/form';
import { errorResponse, json, teamRoute } from '@/lib/server/http';
import { ImportRefused, importPasses, UPLOAD_LIMIT_BYTES } from '@/lib/server/passes';

export const POST = teamRoute(async (ctx, { request }) => {
  const form = await formData(request, UPLOAD_LIMIT_BYTES);
  return importOrPlan(ctx, Object.fromEntries(form));
});

/** A refusal comes with the plan, so that the rows can be corrected. */
async function importOrPlan(ctx: ServerContext, fields: Record<string, unknown>): Promise<unknown> {
  try {
    return await importPasses(ctx, fields);
  } catch (error) {
    if (!(error instanceof ImportRefused)) throw error;
    const refusal = await errorResponse(error, ctx.requestId).json();
    return json({ ...refusal, plan: error.plan }, error.status);
  }
}
