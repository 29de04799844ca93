/** The import form without script: a first post checks the file, a second one with the file again adds it. */
import type { FormPage } from '@/lib/server/form';
import { formData } from '@/lib/server/form';
import { shownError } from '@/lib/server/http';
import { contextFromLocals } from '@/lib/server/locals';
import { type ImportPlan, ImportRefused, importPasses, planImport, UPLOAD_LIMIT_BYTES } from '@/lib/server/passes';

export interface ImportPost {
  /** Set when the rows were added: return it from the page. */
  response: Response | null;
  plan: ImportPlan | null;
  message: string | null;
}

const NOTHING: ImportPost = { response: null, plan: null, message: null };

export async function handleImport(page: FormPage): Promise<ImportPost> {
  if (page.request.method !== 'POST') return NOTHING;
  try {
    const fields = Object.fromEntries(await formData(page.request, UPLOAD_LIMIT_BYTES));
    const ctx = contextFromLocals(page.locals);
    if (fields.step !== 'add') return { ...NOTHING, plan: await planImport(ctx, fields) };
    const { counts } = await importPasses(ctx, fields);
    return { ...NOTHING, response: page.redirect(addedPath(String(fields.carId), counts), 303) };
  } catch (error) {
    const shown = shownError(error, page.locals.requestId);
    page.response.status = shown.status;
    return { ...NOTHING, message: shown.message, plan: error instanceof ImportRefused ? error.plan : null };
  }
}

/** Where an import ends: the page says how many passes it added. */
export const addedPath = (carId: string, { added, duplicates }: ImportPlan['counts']): string =>
  `/passes/import?${new URLSearchParams({ car: carId, added: String(added), there: String(duplicates) })}`;
