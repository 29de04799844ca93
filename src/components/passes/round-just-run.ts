const AFTER_PLAN_MS = 4 * 3_600_000;
const BEFORE_PLAN_MS = 30 * 60_000;

interface PlannedRound {
  plannedAt: string | null;
}

/** The round a pass logged now most likely belongs to: the one that was due last, else the next, else the first listed. */
export function roundJustRun<R extends PlannedRound>(rounds: readonly R[], now: Date): R | null {
  const planned = rounds
    .filter(({ plannedAt }) => plannedAt !== null)
    .map((round) => ({ round, waitMs: Date.parse(round.plannedAt ?? '') - now.getTime() }))
    .sort((a, b) => a.waitMs - b.waitMs);
  const due = planned.filter(({ waitMs }) => waitMs <= BEFORE_PLAN_MS && waitMs >= -AFTER_PLAN_MS).at(-1);
  const next = planned.find(({ waitMs }) => waitMs > 0);
  return due?.round ?? next?.round ?? rounds[0] ?? null;
}
