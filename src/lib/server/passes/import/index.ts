import { passImport } from '@/lib/forms/pass';
import type { ParsedPassFile } from '@/lib/pass-csv';
import { requireCan, type ServerContext } from '../../context';
import { AppError } from '../../errors';
import { activeAdjustables, teamCar } from '../../lookup';
import { type ImportPlan, prepareImport } from './plan';
import { readPassFile } from './read';
import { storeImport } from './store';

export type { ImportPlan } from './plan';
export { UPLOAD_LIMIT_BYTES } from './read';

export interface ImportResult extends ImportPlan {
  /** False for a dry run. */
  stored: boolean;
}

/** Refused because rows were refused; the plan says which and why. Nothing was stored. */
export class ImportRefused extends AppError {
  constructor(
    message: string,
    readonly plan: ImportPlan,
  ) {
    super('VALIDATION', message, { file: message });
  }
}

/** What importing a file would do; nothing is stored. Throws VALIDATION or TOO_LARGE when the file cannot be read. */
export async function planImport(ctx: ServerContext, raw: Record<string, unknown>): Promise<ImportPlan> {
  const { carId, file } = await readUpload(ctx, raw);
  return (await prepareImport(ctx, ctx.db, carId, file)).plan;
}

/**
 * Imports a pass file (`file`, `carId`) in one transaction. With `dryRun` it only plans. When rows are refused nothing is stored
 * unless `confirmPartial` says to keep the good ones; passes the car has already are left out, so the same file adds nothing.
 */
export async function importPasses(ctx: ServerContext, raw: Record<string, unknown>): Promise<ImportResult> {
  const { carId, file, dryRun, confirmPartial } = await readUpload(ctx, raw);
  if (dryRun) return { ...(await prepareImport(ctx, ctx.db, carId, file)).plan, stored: false };
  return ctx.write(async (db) => {
    const prepared = await prepareImport(ctx, db, carId, file);
    refuseUnconfirmed(prepared.plan, confirmPartial ?? false);
    if (prepared.plan.counts.added > 0) await storeImport(ctx, db, carId, prepared);
    return { ...prepared.plan, stored: true };
  });
}

interface Upload {
  carId: string;
  file: ParsedPassFile;
  dryRun?: boolean | undefined;
  confirmPartial?: boolean | undefined;
}

async function readUpload(ctx: ServerContext, raw: Record<string, unknown>): Promise<Upload> {
  requireCan(ctx, 'pass:import');
  const input = passImport.parse(raw);
  await teamCar(ctx, input.carId);
  const file = await readPassFile(raw.file, await activeAdjustables(ctx, input.carId));
  return { ...input, file };
}

function refuseUnconfirmed(plan: ImportPlan, confirmed: boolean): void {
  const { refused, rows } = plan.counts;
  if (refused === 0 || (confirmed && refused < rows)) return;
  const first = plan.refused[0];
  const where = first ? ` Row ${first.row}${first.column ? `, ${first.column}` : ''}: ${first.reason}` : '';
  const advice =
    refused < rows ? ' Correct the file, or confirm that only the good rows are kept.' : ' Correct the file.';
  throw new ImportRefused(
    `${refused} of ${rows} rows cannot be imported, so nothing was stored.${where}${advice}`,
    plan,
  );
}
