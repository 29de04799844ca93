/** The pass form: what its inputs show, and what is sent to the verbs. */
import { toInputText, type UnitSystem } from '@/lib/domain/display';
import { localInputValue, zonedInstant } from '@/lib/forms/instants';
import { validationError } from '@/lib/server/errors';
import type { PassView } from '@/lib/server/passes';

/** Names of the speed inputs; the verbs take either unit and store m/s. */
export const SPEED_NAMES = {
  us: { eighth: 'eighthMph', quarter: 'quarterMph' },
  metric: { eighth: 'eighthKmh', quarter: 'quarterKmh' },
} as const satisfies Record<UnitSystem, Record<string, string>>;

export interface ZonedRound {
  id: string;
  timeZone: string;
}

/** A stored pass as its form shows it. */
export function formOfPass(pass: PassView, units: UnitSystem): Record<string, string> {
  const speeds = SPEED_NAMES[units];
  const settings = Object.entries(pass.settings).map(([key, value]) => [`settings.${key}`, String(value)]);
  const numbers = NUMBERS.map((name) => [name, pass[name] === null ? '' : String(pass[name])]);
  return {
    ...Object.fromEntries([...settings, ...numbers]),
    roundId: pass.roundId,
    readingId: pass.readingId ?? '',
    runAtLocal: localInputValue(pass.runAt, pass.timeZone),
    lane: pass.lane ?? '',
    outcome: pass.outcome ?? '',
    notes: pass.notes,
    [speeds.eighth]: toInputText('speed', pass.eighthMps, units),
    [speeds.quarter]: toInputText('speed', pass.quarterMps, units),
  };
}

const NUMBERS = [
  'passNo',
  'slipPct',
  'sixtyFtS',
  'threeThirtyFtS',
  'eighthS',
  'thousandFtS',
  'quarterS',
  'runsOnDiscs',
] as const;

type Raw = Record<string, unknown>;

/** The posted form as the log verb takes it: the wall clock becomes an instant in the zone of the round's track. */
export function passBody({ runAtLocal, ...raw }: Raw, rounds: readonly ZonedRound[]): Raw {
  return { ...raw, runAt: runAtOf(runAtLocal, raw.roundId, rounds) };
}

function runAtOf(local: unknown, roundId: unknown, rounds: readonly ZonedRound[]): string {
  const round = rounds.find(({ id }) => id === roundId);
  if (!round) throw validationError('Choose the round of the pass.', { roundId: 'Choose the round of the pass.' });
  const runAt = typeof local === 'string' ? zonedInstant(local, round.timeZone) : null;
  if (runAt !== null) return runAt;
  const message = 'Enter the date and time of the pass at the track.';
  throw validationError(message, { runAtLocal: message });
}

/**
 * Only what was changed on the form: a number goes through its shown digits, so that sending all of them back would change
 * untouched ones. Throws VALIDATION when nothing was.
 */
export function changedBody(raw: Raw, shown: Readonly<Record<string, string>>, rounds: readonly ZonedRound[]): Raw {
  const { settings, reason, runAtLocal, ...rest } = raw;
  const fields = Object.entries(rest).filter(([name, value]) => value !== (shown[name] ?? ''));
  const set = Object.entries((settings ?? {}) as Raw).filter(
    ([key, value]) => value !== (shown[`settings.${key}`] ?? ''),
  );
  const moved = runAtLocal !== shown.runAtLocal;
  if (fields.length === 0 && set.length === 0 && !moved)
    throw validationError('Nothing differs from the pass as it stands. Change what was wrong, then save.');
  const runAt = moved ? { runAt: runAtOf(runAtLocal, raw.roundId, rounds) } : {};
  return {
    ...Object.fromEntries(fields),
    ...(set.length > 0 ? { settings: Object.fromEntries(set) } : {}),
    ...runAt,
    reason,
  };
}

/** Field messages of the verb under the names of the inputs. */
export function namedAsInputs(errors: Readonly<Record<string, string>>): Record<string, string> {
  const { runAt, ...rest } = errors;
  return runAt === undefined ? rest : { ...rest, runAtLocal: runAt };
}
