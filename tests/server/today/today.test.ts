import { beforeEach, describe, expect, it } from 'vitest';
import { updateCar } from '@/lib/server/cars';
import { decideSuggestion } from '@/lib/server/decisions';
import { enterReading } from '@/lib/server/readings';
import { markSeen } from '@/lib/server/sheets';
import { createSuggestion } from '@/lib/server/suggestions';
import { listMembers } from '@/lib/server/teams';
import { getToday } from '@/lib/server/today';
import { contextFor, makeTestDb, sampleEvent, sampleRound, type World } from '../helpers';
import { conditions, readyToAsk } from '../suggestions/season';

let world: World;
beforeEach(async () => {
  world = await makeTestDb();
});

const EMPTY = { round: null, reading: null, cars: [], have: { cars: 0, tracks: 0, rounds: 0, passes: 0 } };

describe('today', () => {
  it('of a new team is empty, and of another team stays so', async () => {
    expect(await getToday(contextFor(world, 'owner'))).toMatchObject({ ...EMPTY, zone: 'UTC' });
    await readyToAsk(world, 12);
    expect(await getToday(contextFor(world, 'owner'))).toMatchObject({ have: { cars: 1, passes: 12 } });
    expect(await getToday(contextFor(world, 'owner', 'b'))).toMatchObject(EMPTY);
  });

  it('shows the soonest round that is not over for half an hour, on the clock of its track', async () => {
    const { event, round } = await readyToAsk(world, 12);
    const owner = contextFor(world, 'owner');
    await sampleRound(owner, { eventId: event.id, name: 'Later', plannedAt: '2026-05-02T14:00-06:00' });
    const at = async (time: string) => (await getToday(contextFor(world, 'owner', 'a', time))).round?.name ?? null;
    expect(await at('2026-05-02T17:00:00.000Z')).toBe(round.name);
    expect(await at('2026-05-02T18:30:00.000Z')).toBe(round.name);
    expect(await at('2026-05-02T18:31:00.000Z')).toBe('Later');
    expect(await at('2026-05-03T18:00:00.000Z')).toBeNull();
    expect((await getToday(owner)).zone).toBe(round.timeZone);
  });

  it('takes the reading of the next round track, and the newest one when no round is planned', async () => {
    const { reading } = await readyToAsk(world, 12);
    const owner = contextFor(world, 'owner');
    expect((await getToday(owner)).reading?.id).toBe(reading.id);
    const elsewhere = await sampleEvent(owner, { name: 'Elsewhere' });
    await sampleRound(owner, { eventId: elsewhere.id, plannedAt: '2026-05-02T09:30-06:00' });
    expect((await getToday(owner)).round?.trackId).toBe(elsewhere.trackId);
    expect((await getToday(owner)).reading).toBeNull();
  });

  it('does not take a reading dated ahead for the conditions of now', async () => {
    const { reading, trackId } = await readyToAsk(world, 12);
    const owner = contextFor(world, 'owner', 'a', '2026-05-02T20:00:00.000Z');
    const later = await enterReading(owner, conditions(trackId, { takenAt: '2026-05-02T19:30:00.000Z' }));
    const seenAt = async (time: string) => (await getToday(contextFor(world, 'owner', 'a', time))).reading?.id;
    expect(await seenAt('2026-05-02T15:00:00.000Z')).toBe(reading.id);
    expect(await seenAt('2026-05-02T19:25:00.000Z')).toBe(later.id);
  });

  it('follows the plan from suggestion to seen, and keeps suggestions from the driver', async () => {
    const { ask, car } = await readyToAsk(world, 12);
    const chief = contextFor(world, 'crew_chief');
    const plan = async (role: 'crew_chief' | 'driver') => (await getToday(contextFor(world, role))).cars[0];
    expect(await plan('crew_chief')).toEqual({
      id: car.id,
      name: car.name,
      suggestion: null,
      decision: null,
      sheet: null,
    });

    const made = await createSuggestion(chief, ask);
    const choice = { choice: 'decline', finalSettings: ask.current, reason: 'Track too green.', publish: true };
    const { sheet } = await decideSuggestion(chief, made.id, choice);
    await markSeen(contextFor(world, 'driver'), sheet?.id ?? '');
    expect(await plan('crew_chief')).toMatchObject({
      suggestion: { id: made.id },
      decision: { choice: 'decline' },
      sheet: { version: 1, seenBy: ['driver of Team A'] },
    });
    expect(await plan('driver')).toMatchObject({ suggestion: null, decision: null, sheet: { version: 1 } });
  });

  it('leaves archived cars out', async () => {
    const { car } = await readyToAsk(world, 12);
    await updateCar(contextFor(world, 'owner'), car.id, { archived: true });
    expect((await getToday(contextFor(world, 'owner'))).cars).toEqual([]);
  });
});

describe('members', () => {
  it('are names and roles of the own team, without addresses', async () => {
    const members = await listMembers(contextFor(world, 'driver'));
    expect(members).toHaveLength(5);
    expect(members).toContainEqual({ name: 'owner of Team A', role: 'owner' });
    expect(JSON.stringify(members)).not.toContain('@');
  });
});
