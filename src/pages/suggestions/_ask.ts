import type { Ask } from '@/components/suggestion/ask';
import { listCars } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { listPasses } from '@/lib/server/passes';
import { listReadings } from '@/lib/server/readings';
import { listRounds, type RoundView } from '@/lib/server/rounds';
import { type CurrentSettings, currentSettings, latestOwnEstimate } from '@/lib/server/suggestions';
import { getToday } from '@/lib/server/today';

const MAX_ROUNDS = 20;
const MAX_READINGS = 12;
const NOTHING_SET: CurrentSettings = { settings: {}, from: null, at: null };

/** Loads it for the car and round named in the address, else the first car and the next planned round. */
export async function loadAsk(ctx: ServerContext, params: URLSearchParams): Promise<Ask> {
  const [cars, rounds, today] = await Promise.all([listCars(ctx), listRounds(ctx), getToday(ctx)]);
  const now = ctx.now();
  const car = cars.find((one) => one.id === params.get('car')) ?? cars[0] ?? null;
  const ordered = inAskingOrder(rounds, now);
  const round = rounds.find((one) => one.id === params.get('round')) ?? today.round ?? ordered[0] ?? null;
  const shown = ordered.slice(0, MAX_ROUNDS);
  return {
    now,
    cars,
    car,
    rounds: round && !shown.some((one) => one.id === round.id) ? [round, ...shown] : shown,
    round,
    readings: await listReadings(ctx, { limit: MAX_READINGS, ...(round ? { trackId: round.trackId } : {}) }),
    current: car ? await currentSettings(ctx, car.id) : NOTHING_SET,
    runsOnDiscs: car ? await runsOnDiscsNow(ctx, car.id) : null,
    minutesLeft: minutesUntil(round?.plannedAt ?? null, now),
    estimate: car && round ? await latestOwnEstimate(ctx, car.id, round.id) : null,
  };
}

/** What is to come first, soonest first; then what has no time; then the past, newest first. */
export function inAskingOrder(rounds: readonly RoundView[], now: Date): RoundView[] {
  const time = (round: RoundView): number => Date.parse(round.plannedAt ?? '');
  const ahead = rounds.filter((round) => time(round) >= now.getTime()).sort((a, b) => time(a) - time(b));
  const past = rounds.filter((round) => time(round) < now.getTime()).sort((a, b) => time(b) - time(a));
  return [...ahead, ...rounds.filter((round) => round.plannedAt === null), ...past];
}

// The discs that ran last are taken to be still in the car: one more run on them than when that pass began.
async function runsOnDiscsNow(ctx: ServerContext, carId: string): Promise<number | null> {
  const { passes } = await listPasses(ctx, { carId, limit: 1 });
  const before = passes[0]?.runsOnDiscs ?? null;
  return before === null ? null : before + 1;
}

const MS_PER_MIN = 60_000;
const A_DAY_MIN = 24 * 60;

/** Whole minutes until the planned time; null when it is not planned, past, or more than a day away. */
export function minutesUntil(plannedAt: string | null, now: Date): number | null {
  if (plannedAt === null) return null;
  const minutes = Math.floor((Date.parse(plannedAt) - now.getTime()) / MS_PER_MIN);
  return minutes >= 0 && minutes <= A_DAY_MIN ? minutes : null;
}
