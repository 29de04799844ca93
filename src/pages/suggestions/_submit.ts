import { parseDecimal } from '@/lib/domain/decimal';
import { can } from '@/lib/domain/permissions';
import type { ServerContext } from '@/lib/server/context';
import { validationError } from '@/lib/server/errors';
import type { RawForm } from '@/lib/server/form';
import {
  createSuggestion,
  latestOwnEstimate,
  type OwnEstimateView,
  recordOwnEstimate,
  type SuggestionView,
} from '@/lib/server/suggestions';

/** The own estimate is stored first, then the model is asked: what was written before cannot have been copied from it. */
export async function askWithEstimate(ctx: ServerContext, raw: RawForm): Promise<SuggestionView> {
  if (can(ctx.role, 'suggestion:decide')) await recordEstimate(ctx, raw);
  return createSuggestion(ctx, raw);
}

async function recordEstimate(ctx: ServerContext, raw: RawForm): Promise<void> {
  const { carId, roundId, ownSlipPct, ownLowPct, ownHighPct } = raw;
  const skipped = raw.estimate === 'skip';
  const earlier = await earlierEstimate(ctx, carId, roundId);
  if (skipped && earlier) return;
  const blank = [ownSlipPct, ownLowPct, ownHighPct].every((value) => value === undefined || value === '');
  if (!skipped && blank && earlier && !earlier.skipped) return;
  if (!skipped && blank) throw estimateMissing();
  const given = skipped ? {} : { slipPct: ownSlipPct, lowPct: ownLowPct, highPct: ownHighPct };
  if (earlier?.madeBy === ctx.user.id && isSame(earlier, given)) return;
  await recordOwnEstimate(ctx, { carId, roundId, skipped, ...given });
}

// Asked again for the same round (or sent twice) the estimate that stands is not written a second time, nor hidden by a skip.
async function earlierEstimate(ctx: ServerContext, carId: unknown, roundId: unknown): Promise<OwnEstimateView | null> {
  if (typeof carId !== 'string' || typeof roundId !== 'string') return null;
  return latestOwnEstimate(ctx, carId, roundId);
}

function isSame(earlier: OwnEstimateView, given: Record<string, unknown>): boolean {
  return (['slipPct', 'lowPct', 'highPct'] as const).every(
    (name) => earlier[name] === parseDecimal(String(given[name] ?? '')),
  );
}

function estimateMissing() {
  const message = 'Enter the slip you expect first, or choose to skip your estimate.';
  return validationError(message, { ownSlipPct: message });
}
