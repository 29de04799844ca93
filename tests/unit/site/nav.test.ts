import { describe, expect, it } from 'vitest';
import { isCurrent, navEntries, splitForBar } from '@/components/site/nav';
import { isFresh, nextJob } from '@/components/site/next-job';
import { THEMES, themeFrom } from '@/components/site/theme';
import { can, ROLES, type Role } from '@/lib/domain/permissions';
import type { Today } from '@/lib/server/today';

const bar = (role: Role) => splitForBar(role).bar.map(({ label }) => label);

describe('navigation', () => {
  it.each(ROLES)('a %s is offered only what the table of rights allows, each once', (role) => {
    const entries = navEntries(role);
    expect(entries.every((entry) => can(role, entry.right))).toBe(true);
    const { bar: first, more } = splitForBar(role);
    expect([...first, ...more].map(({ href }) => href).sort()).toEqual(entries.map(({ href }) => href).sort());
    expect(first).toHaveLength(4);
  });

  it('has the four jobs of a tuner in reach, and the launch sheet for a driver', () => {
    expect(bar('tuner')).toEqual(['Today', 'Conditions', 'Passes', 'Suggestion']);
    expect(bar('driver').slice(0, 2)).toEqual(['Today', 'Launch sheet']);
    expect(navEntries('driver').map(({ href }) => href)).not.toContain('/suggestions');
  });

  it('marks the entry a page belongs to', () => {
    const current = (path: string) => navEntries('owner').filter((entry) => isCurrent(entry, path));
    expect(current('/').map(({ label }) => label)).toEqual(['Today']);
    expect(current('/cars/1/adjustables/2').map(({ label }) => label)).toEqual(['Cars']);
    expect(current('/carsharing')).toEqual([]);
  });
});

describe('theme', () => {
  it('takes only the three names', () => {
    expect(THEMES.map(themeFrom)).toEqual(['auto', 'day', 'night']);
    expect([themeFrom('"><script>'), themeFrom(null), themeFrom(undefined)]).toEqual(['auto', 'auto', 'auto']);
  });
});

const NOW = new Date('2026-05-02T15:00:00.000Z');
const car: Today['cars'][number] = { id: 'c', name: 'Car 1', suggestion: null, decision: null, sheet: null };

function today(change: Partial<Today> & { ageMin?: number } = {}): Today {
  const { ageMin = 10, ...rest } = change;
  const takenAt = new Date(NOW.getTime() - ageMin * 60_000).toISOString();
  return {
    now: NOW,
    zone: 'America/Denver',
    round: { id: 'r' } as Today['round'],
    reading: { takenAt } as Today['reading'],
    cars: [car],
    have: { cars: 1, tracks: 1, rounds: 1, passes: 100 },
    ...rest,
  };
}

const suggestion = { id: 's', status: 'offered', createdAt: NOW.toISOString() };
const decided = { ...car, suggestion, decision: { choice: 'accept' as const, createdAt: NOW.toISOString() } };

describe('the next job', () => {
  it('asks for a reading when there is none of the last half hour', () => {
    expect([isFresh(today({ ageMin: 30 })), isFresh(today({ ageMin: 31 })), isFresh(today({ reading: null }))]).toEqual(
      [true, false, false],
    );
    expect(isFresh(today({ ageMin: -60 })), 'dated ahead').toBe(false);
    expect(nextJob('tuner', today({ ageMin: 31 })).href).toBe('/conditions');
    expect(nextJob('crew', today({ ageMin: 31 })).href).toBe('/conditions');
  });

  it('goes from reading to suggestion to decision to sheet, as the role may', () => {
    const open = today({ cars: [{ ...car, suggestion }] });
    expect(nextJob('crew_chief', today()).href).toBe('/suggestions');
    expect(nextJob('crew', today()).href).toBe('/sheet');
    expect(nextJob('crew_chief', open)).toMatchObject({ href: '/suggestions/s', label: 'Decide' });
    expect(nextJob('tuner', open)).toMatchObject({ href: '/suggestions/s', label: 'Read the suggestion' });
    expect(nextJob('crew_chief', today({ cars: [decided] })).href).toBe('/sheet');
  });

  it('gives the driver the sheet, whatever else is open', () => {
    expect(nextJob('driver', today({ ageMin: 500, round: null })).href).toBe('/sheet');
  });

  it('starts a new team with what it lacks, and never asks a role for what it may not do', () => {
    const nothing = today({ cars: [], round: null, reading: null, have: { cars: 0, tracks: 0, rounds: 0, passes: 0 } });
    expect(nextJob('owner', nothing).href).toBe('/cars/new');
    expect(nextJob('crew', nothing).href).toBe('/conditions');
    expect(nextJob('tuner', today({ have: { cars: 1, tracks: 1, rounds: 1, passes: 0 } })).href).toBe('/passes/import');
    expect(nextJob('tuner', today({ round: null })).href).toBe('/events');
  });
});
