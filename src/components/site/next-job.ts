import { can, type Role } from '@/lib/domain/permissions';
import type { CarState, Today } from '@/lib/server/today';

export interface Job {
  href: string;
  label: string;
  why: string;
}

/** A track changes within the half hour; common practice, no published source. */
const FRESH_MS = 30 * 60_000;
/** A clock may run a little ahead; a reading dated later than that is not one of now. */
const AHEAD_MS = 5 * 60_000;

export function isFresh({ reading, now }: Pick<Today, 'reading' | 'now'>): boolean {
  if (reading === null) return false;
  const ageMs = now.getTime() - Date.parse(reading.takenAt);
  return ageMs <= FRESH_MS && ageMs >= -AHEAD_MS;
}

/** The one thing this member should do next; never more than one, and always something the role may do. */
export function nextJob(role: Role, today: Today): Job {
  return setUpJob(role, today) ?? (role === 'driver' ? sheetJob(today) : roundJob(role, today));
}

function sheetJob({ cars }: Today): Job {
  const published = cars.some((car) => car.sheet !== null);
  const why = published ? 'The plan the crew chief published.' : 'Nothing is published yet. It will stand there.';
  return { href: '/sheet', label: 'Open the launch sheet', why };
}

function setUpJob(role: Role, { have, round }: Today): Job | null {
  if (have.cars === 0 && can(role, 'car:edit'))
    return {
      href: '/cars/new',
      label: 'Add the first car',
      why: 'Its band and adjustables are what suggestions move.',
    };
  if (have.passes === 0 && have.cars > 0 && can(role, 'pass:import'))
    return { href: '/passes/import', label: 'Import past passes', why: 'A suggestion rests on your own history.' };
  if (round === null && can(role, 'round:edit'))
    return { href: '/events', label: 'Plan a round', why: 'No round with a planned time is coming up.' };
  return null;
}

function roundJob(role: Role, today: Today): Job {
  if (!isFresh(today) && can(role, 'reading:enter'))
    return { href: '/conditions', label: 'Enter conditions', why: 'There is no reading from the last half hour.' };
  const open = today.cars.find((car) => car.decision === null);
  return (open && suggestionJob(role, open)) ?? sheetJob(today);
}

function suggestionJob(role: Role, car: CarState): Job | null {
  if (!car.suggestion)
    return can(role, 'suggestion:create')
      ? { href: '/suggestions', label: 'Ask for a suggestion', why: `Nothing has been asked for ${car.name} yet.` }
      : null;
  const href = `/suggestions/${car.suggestion.id}`;
  if (can(role, 'suggestion:decide')) return { href, label: 'Decide', why: `The suggestion for ${car.name} is open.` };
  return can(role, 'suggestion:view')
    ? { href, label: 'Read the suggestion', why: 'The chief has not decided.' }
    : null;
}
