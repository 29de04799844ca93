import { parsePatch } from '@/lib/forms/fields';
import { passCorrection, passPatchShape, siSpeeds, withoutTwins } from '@/lib/forms/pass';
import { requireCan, type ServerContext } from '../context';
import { validationError } from '../errors';
import { activeAdjustables } from '../lookup';
import { limitWarnings, refuseUnknownKeys } from '../settings';
import { checkLinks } from './links';
import type { LoggedPass } from './log';
import { recorded } from './recorded';
import { type PassChange, passRow, replacePass } from './replace';
import type { PassRow } from './view';

/**
 * Corrects a pass by a new row. `passId` is the row that was looked at; only the fields that are sent change, and a setting
 * sent as null is taken out. Throws VALIDATION, NOT_FOUND, or CONFLICT when that row has been replaced meanwhile.
 */
export async function correctPass(ctx: ServerContext, passId: string, raw: unknown): Promise<LoggedPass> {
  requireCan(ctx, 'pass:correct');
  const { reason } = passCorrection.parse(raw);
  const patch = parsePatch(passPatchShape, raw);
  const old = await passRow(ctx, passId);
  const adjustables = await activeAdjustables(ctx, old.carId);
  refuseUnknownKeys(patch.settings ?? {}, adjustables, 'settings', old.settings);
  const change = passChange(old, patch);
  await checkLinks(ctx, { ...old, ...change });
  const view = await replacePass(ctx, old, { ...change, correctionReason: reason }, 'pass.correct');
  return { ...view, warnings: limitWarnings(view.settings, adjustables) };
}

type Patch = ReturnType<typeof parsePatch<typeof passPatchShape>>;

function passChange(old: PassRow, patch: Patch): PassChange {
  const { settings, passNo, ...rest } = withoutTwins(patch);
  const change: PassChange = { ...rest, ...siSpeeds(patch), ...slipSource(old, patch) };
  if (passNo != null) change.passNo = passNo;
  if (settings) change.settings = recorded({ ...old.settings, ...settings });
  if (Object.entries(change).every(([name, value]) => same(old[name as keyof PassRow], value))) throw nothingDiffers();
  return change;
}

/** A slip that is typed in is measured by hand, whatever the old one came from. */
function slipSource(old: PassRow, patch: Patch): PassChange {
  if (patch.slipPct === undefined || patch.slipPct === old.slipPct) return {};
  return { slipSource: patch.slipPct === null ? null : 'measured' };
}

const same = (a: unknown, b: unknown): boolean => JSON.stringify(a ?? null) === JSON.stringify(b ?? null);

const nothingDiffers = () =>
  validationError('Nothing differs from the pass as it stands, so there is nothing to correct.');
