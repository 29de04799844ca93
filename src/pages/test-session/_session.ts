import type { Ask } from '@/components/suggestion/ask';
import type { ServerContext } from '@/lib/server/context';
import { asAppError } from '@/lib/server/http';
import { type TestSession, testSession } from '@/lib/server/suggestions';
import { loadAsk } from '../suggestions/_ask';

/** The asking fields and, when there is enough to go on, what would teach most. */
export interface ShownSession {
  ask: Ask;
  /** What the inputs show, by name. */
  values: Record<string, string>;
  errors: Readonly<Record<string, string>>;
  /** What is wrong with the question; null when nothing is. */
  message: string | null;
  session: TestSession | null;
}

/** Asked by address, so that it works without script and can be sent on: nothing is stored. */
export async function loadSession(ctx: ServerContext, params: URLSearchParams): Promise<ShownSession> {
  const ask = await loadAsk(ctx, placeOf(params));
  const values = params.has('roundId') ? Object.fromEntries(params) : filledIn(ask);
  const shown = { ask, values, errors: {}, message: null, session: null };
  if (!ask.car || !ask.round || ask.readings.length === 0) return shown;
  try {
    return { ...shown, session: await testSession(ctx, questionOf(ask, ask.car.id, values)) };
  } catch (error) {
    const known = asAppError(error);
    if (known?.code !== 'VALIDATION') throw known ?? error;
    return { ...shown, errors: known.fields ?? {}, message: known.message };
  }
}

function placeOf(params: URLSearchParams): URLSearchParams {
  const [car, round] = [params.get('carId') ?? params.get('car'), params.get('roundId') ?? params.get('round')];
  return new URLSearchParams({ ...(car && { car }), ...(round && { round }) });
}

function filledIn({ round, readings, minutesLeft, runsOnDiscs }: Ask): Record<string, string> {
  const text = (value: number | null): string => (value === null ? '' : String(value));
  return {
    roundId: round?.id ?? '',
    readingId: readings[0]?.id ?? '',
    minutesLeft: text(minutesLeft),
    runsOnDiscs: text(runsOnDiscs),
  };
}

function questionOf({ car }: Ask, carId: string, values: Record<string, string>): Record<string, unknown> {
  const { roundId, readingId, minutesLeft, runsOnDiscs } = values;
  const typed = (car?.adjustables ?? []).flatMap(({ key }) => {
    const value = values[`current.${key}`];
    return value === undefined ? [] : [[key, value]];
  });
  const current = typed.length > 0 ? { current: Object.fromEntries(typed) } : {};
  return { carId, roundId, readingId, minutesLeft, runsOnDiscs, ...current };
}
