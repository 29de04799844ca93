/** What should be asked about a form as it stands, by field, each with the one-tap fix where there is one. */
import type { ReadingCheck } from '@/lib/domain/air/plausibility';
import type { UnitSystem } from '@/lib/domain/display';
import { type Fix, fixFor } from './fixes';
import { checksOf, type Place } from './live';
import { type FormValues, type MeasureKey, measuresOf, readForm } from './reading-form';

export interface Problem {
  key: MeasureKey;
  message: string;
  /** Cannot be stored like this. */
  blocks: boolean;
  /** What the question is about: a typed text that is no number, an impossible value, or an unlikely one. */
  kind: 'not-a-number' | ReadingCheck['level'];
  fix: Fix | null;
}

export interface Surroundings {
  place: Place;
  takenAt: string;
  units: UnitSystem;
}

export function problemsOf(values: FormValues, { place, takenAt, units }: Surroundings): Problem[] {
  const checks = (typed: FormValues, alone: boolean) =>
    checksOf(readForm(typed, units).reading, alone ? { ...place, previous: null } : place, takenAt, units);
  const { errors } = readForm(values, units);
  const unread = measuresOf(units).flatMap(({ key, name }) => {
    const message = errors[name];
    return message === undefined ? [] : [{ key, message, blocks: true, kind: 'not-a-number' as const, fix: null }];
  });
  return [...unread, ...checks(values, false).map((check) => asProblem(check, fixFor(check, values, units, checks)))];
}

function asProblem(check: ReadingCheck, fix: Fix | null): Problem {
  return {
    key: inputOf(check.field),
    message: check.message,
    blocks: check.level === 'impossible',
    kind: check.level,
    fix,
  };
}

// The kind of a pressure and the altitude it needs are asked where the pressure is typed.
const inputOf = (field: ReadingCheck['field']): MeasureKey =>
  field === 'pressureKind' || field === 'altitudeM' ? 'pressurePa' : field;
