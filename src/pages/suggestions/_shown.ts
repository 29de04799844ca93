import type { Shown } from '@/components/suggestion/shown';
import type { ServerContext } from '@/lib/server/context';
import { listSheets } from '@/lib/server/sheets';
import { getSuggestion, laterRun } from '@/lib/server/suggestions';

/** A suggestion with the launch sheet that its decision became. Throws NOT_FOUND. */
export async function loadShown(ctx: ServerContext, suggestionId: string): Promise<Shown> {
  const suggestion = await getSuggestion(ctx, suggestionId);
  const { decision, carId } = suggestion;
  const sheets = decision ? await listSheets(ctx, { carId }) : [];
  const index = sheets.findIndex((sheet) => sheet.decisionId === decision?.id);
  const sheet = sheets[index];
  return {
    suggestion,
    sheet: sheet ? { id: sheet.id, version: sheet.version, current: index === 0 } : null,
    later: await laterRun(ctx, suggestionId),
  };
}
