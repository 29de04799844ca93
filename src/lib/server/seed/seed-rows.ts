import { createHash } from 'node:crypto';
import type * as schema from '@/db/schema';
import type { DemoPerson, DemoSeason } from '@/demo';

type Row<T extends { $inferInsert: unknown }> = T['$inferInsert'];

export interface SeedRows {
  team: Row<typeof schema.team>;
  users: Row<typeof schema.user>[];
  memberships: Row<typeof schema.membership>[];
  car: Row<typeof schema.car>;
  adjustables: Row<typeof schema.adjustable>[];
  discSets: Row<typeof schema.discSet>[];
  tracks: Row<typeof schema.track>[];
  events: Row<typeof schema.event>[];
  rounds: Row<typeof schema.round>[];
  readings: Row<typeof schema.reading>[];
  passes: Row<typeof schema.pass>[];
}

/** The rows of the invented season. Ids are made from its refs, so every demo database has the same. */
export function seedRows(season: DemoSeason, hashes: ReadonlyMap<DemoPerson, string>): SeedRows {
  const createdAt = season.readings[0]?.takenAt ?? season.next.at;
  const base = { teamId: demoId('team', season.team.name), createdAt };
  return {
    team: { id: base.teamId, ...season.team, demo: true, createdAt },
    ...peopleRows(season, hashes, base),
    ...carRows(season, base),
    ...calendarRows(season, base),
    ...runRows(season, base.teamId),
  };
}

type Base = { teamId: string; createdAt: string };

/** A UUID-shaped id that depends on nothing but its name. */
export function demoId(kind: string, ref: string): string {
  const hex = createHash('sha256').update(`slipband demo ${kind} ${ref}`).digest('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), `4${hex.slice(13, 16)}`, `a${hex.slice(17, 20)}`, hex.slice(20, 32)].join(
    '-',
  );
}

const userId = (person: DemoPerson): string => demoId('user', person.email);

function peopleRows({ people }: DemoSeason, hashes: ReadonlyMap<DemoPerson, string>, base: Base) {
  return {
    users: people.map((person) => ({
      id: userId(person),
      name: person.name,
      email: person.email,
      passwordHash: hashes.get(person) ?? '',
      createdAt: base.createdAt,
    })),
    memberships: people.map((person) => ({
      ...base,
      id: demoId('membership', person.email),
      userId: userId(person),
      role: person.role,
    })),
  };
}

const carIdOf = ({ car }: DemoSeason): string => demoId('car', car.name);

function carRows(season: DemoSeason, base: Base) {
  const carId = carIdOf(season);
  return {
    car: { ...base, ...season.car, id: carId },
    adjustables: season.adjustables.map(({ belief, ...fields }, position) => ({
      ...base,
      ...fields,
      id: demoId('adjustable', fields.key),
      carId,
      position,
      beliefMeanPct: belief?.meanPct ?? null,
      beliefSdPct: belief?.sdPct ?? null,
    })),
    discSets: season.discSets.map(({ ref, ...fields }) => ({ ...base, ...fields, id: demoId('disc set', ref), carId })),
  };
}

function calendarRows({ tracks, events, rounds }: DemoSeason, base: Base) {
  return {
    tracks: tracks.map(({ ref, ...fields }) => ({ ...base, ...fields, id: demoId('track', ref) })),
    events: events.map(({ ref, trackRef, ...fields }) => ({
      ...base,
      ...fields,
      id: demoId('event', ref),
      trackId: demoId('track', trackRef),
    })),
    rounds: rounds.map(({ ref, eventRef, ...fields }) => ({
      ...base,
      ...fields,
      id: demoId('round', ref),
      eventId: demoId('event', eventRef),
    })),
  };
}

function runRows(season: DemoSeason, teamId: string) {
  const tuner = season.people.find(({ role }) => role === 'tuner');
  const enteredBy = tuner ? userId(tuner) : null;
  const carId = carIdOf(season);
  return {
    readings: season.readings.map(({ ref, trackRef, roundRef, ...fields }) => ({
      ...fields,
      id: demoId('reading', ref),
      teamId,
      trackId: demoId('track', trackRef),
      roundId: demoId('round', roundRef),
      enteredBy,
      createdAt: fields.takenAt,
    })),
    passes: season.passes.map(({ ref, roundRef, readingRef, discSetRef, utcOffset: _, ...fields }) => ({
      ...fields,
      id: demoId('pass', ref),
      rootId: demoId('pass', ref),
      teamId,
      carId,
      roundId: demoId('round', roundRef),
      readingId: demoId('reading', readingRef),
      discSetId: demoId('disc set', discSetRef),
      enteredBy,
      createdAt: fields.runAt,
    })),
  };
}
