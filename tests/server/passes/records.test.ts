import { beforeEach, describe, expect, it } from 'vitest';
import { correctPass, excludePass, loadPassRecords, logPass, trainingHash } from '@/lib/server/passes';
import { correctReading, enterReading } from '@/lib/server/readings';
import { contextFor, makeTestDb, sampleEvent, sampleRound, sampleSeason, type World } from '../helpers';

let world: World;
let season: Awaited<ReturnType<typeof sampleSeason>>;
beforeEach(async () => {
  world = await makeTestDb();
  season = await sampleSeason(world);
});

const at = (time: string) => contextFor(world, 'tuner', 'a', `2026-05-02T${time}:00.000Z`);
const reading = (change: Record<string, unknown> = {}) => ({
  trackId: season.track.id,
  takenAt: '2026-05-01T19:00Z',
  airTempC: 20,
  trackTempC: 30,
  ...change,
});
const passAt = (runAt: string, change: Record<string, unknown> = {}) => ({
  carId: season.car.id,
  roundId: season.round.id,
  runAt,
  slipPct: 15,
  settings: { launch_rpm: 7000 },
  ...change,
});

describe('loadPassRecords', () => {
  it('gives the passes as they stand, in the order they were run, with the corrected reading', async () => {
    const old = await enterReading(at('10:00'), reading());
    const fixed = await correctReading(at('10:05'), old.id, { ...reading({ trackTempC: 35 }), reason: 'typo' });
    await correctReading(at('10:06'), fixed.id, { ...reading({ trackTempC: 36 }), reason: 'typo' });
    const late = await logPass(at('10:10'), passAt('2026-05-01T21:00Z', { readingId: old.id }));
    const early = await logPass(at('10:11'), passAt('2026-05-01T20:00Z', { lane: 'right', runsOnDiscs: 3 }));
    await correctPass(at('10:12'), late.id, { slipPct: 17, reason: 'typo' });
    const records = await loadPassRecords(at('11:00'), season.car.id);
    expect(records.map(({ id }) => id)).toEqual([early.rootId, late.rootId]);
    expect(records[0]).toEqual({
      id: early.rootId,
      passNo: 2,
      event: `${season.event.name} 2026`,
      track: season.track.name,
      time: '2026-05-01T20:00:00.000Z',
      round: season.round.name,
      lane: 'right',
      conditions: { airTempC: null, relativeHumidity: null, stationPressurePa: null, trackTempC: null },
      settings: { launch_rpm: 7000 },
      runsOnDiscs: 3,
      slipPct: 15,
      slipSdPct: null,
      sixtyFtS: null,
      outcome: null,
      excluded: false,
    });
    expect(records[1]).toMatchObject({ slipPct: 17, conditions: { trackTempC: 36 } });
  });

  it('tells apart the same event of two years', async () => {
    const owner = contextFor(world, 'owner');
    for (const year of [2024, 2025]) {
      const event = await sampleEvent(owner, {
        trackId: season.track.id,
        name: 'Spring',
        startsOn: `${year}-05-01`,
        endsOn: `${year}-05-02`,
      });
      const round = await sampleRound(owner, { eventId: event.id, name: 'Q1' });
      await logPass(at('10:00'), passAt(`${year}-05-01T20:00Z`, { roundId: round.id }));
    }
    const records = await loadPassRecords(at('11:00'), season.car.id);
    expect(records.map(({ event }) => event)).toEqual(['Spring 2024', 'Spring 2025']);
  });

  it('gives the passes as they were known at an instant', async () => {
    const old = await enterReading(at('10:00'), reading());
    const first = await logPass(at('10:10'), passAt('2026-05-01T20:00Z', { readingId: old.id }));
    const before = await loadPassRecords(at('11:00'), season.car.id);
    await correctReading(at('12:00'), old.id, { ...reading({ trackTempC: 44 }), reason: 'typo' });
    await excludePass(at('12:01'), first.id, { reason: 'x' });
    await logPass(at('12:02'), passAt('2026-05-01T21:00Z'));
    expect(await loadPassRecords(at('13:00'), season.car.id)).not.toEqual(before);
    expect(await loadPassRecords(at('13:00'), season.car.id, '2026-05-02T11:00:00.000Z')).toEqual(before);
  });

  it("answers 404 for another team's car", async () => {
    await expect(loadPassRecords(contextFor(world, 'owner', 'b'), season.car.id)).rejects.toMatchObject({
      code: 'NOT_FOUND',
    });
  });
});

describe('trainingHash', () => {
  const record = async () => {
    await logPass(at('10:10'), passAt('2026-05-01T20:00Z', { settings: { launch_rpm: 7000, counterweight_g: 11 } }));
    return (await loadPassRecords(at('11:00'), season.car.id))[0] as Awaited<
      ReturnType<typeof loadPassRecords>
    >[number];
  };

  it('is the same for the same values in another key order', async () => {
    const one = await record();
    const turned = { ...one, settings: { counterweight_g: 11, launch_rpm: 7000 } };
    expect(trainingHash([one])).toMatch(/^[0-9a-f]{64}$/);
    expect(trainingHash([turned])).toBe(trainingHash([one]));
  });

  it('changes with any value and with the order of the passes', async () => {
    const one = await record();
    const other = { ...one, slipPct: 15.0001 };
    const hashes = [[one], [other], [one, other], [other, one], []].map(trainingHash);
    expect(new Set(hashes).size).toBe(5);
  });

  it('is SHA-256 of the canonical JSON', () => {
    // sha256("[]"), FIPS 180-4, by the system's sha256sum.
    expect(trainingHash([])).toBe('4f53cda18c2baa0c0354bb5f9a3ecbe5ed12ab4d8e11ba873c2f11161202b945');
  });
});
