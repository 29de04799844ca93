import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, reading } from '@/db/schema';
import { correctReading, enterReading, getReading, latestReading, listReadings } from '@/lib/server/readings';
import { GET, POST } from '@/pages/api/readings';
import { GET as GET_ONE } from '@/pages/api/readings/[id]';
import { POST as CORRECT } from '@/pages/api/readings/[id]/correct';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleSeason, sampleTrack, type World } from '../helpers';

let world: World;
let season: Awaited<ReturnType<typeof sampleSeason>>;
beforeEach(async () => {
  world = await makeTestDb();
  season = await sampleSeason(world);
});

/** A calm spring day at the sample track, 1770 m up. */
const values = (change: Record<string, unknown> = {}) => ({
  trackId: season.track.id,
  takenAt: '2026-05-02T08:40-06:00',
  airTempC: 22,
  relativeHumidity: 0.3,
  pressurePa: 82_000,
  pressureKind: 'station',
  trackTempC: 34,
  ...change,
});

const storedReadings = () => world.handle.db.select().from(reading);

describe('enterReading', () => {
  it('stores SI with the altitude of the track and derives the rest', async () => {
    const body = values({ roundId: season.round.id, windMps: '2,5', windDirDeg: 270 });
    const answer = await callRoute(POST, { as: contextFor(world, 'crew'), body });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      takenAt: '2026-05-02T14:40:00.000Z',
      altitudeM: 1770,
      windMps: 2.5,
      source: 'hand',
      roundName: season.round.name,
      enteredByName: 'crew of Team A',
      conditions: { airTempC: 22, relativeHumidity: 0.3, stationPressurePa: 82_000, trackTempC: 34 },
      warnings: [],
    });
    // 82 000 Pa, 22 degC: about 0.96 kg/m3 by the ideal gas law for dry air (287.05 J/(kg K)), a little less when moist.
    expect(answer.body.air.densityKgM3).toBeGreaterThan(0.955);
    expect(answer.body.air.densityKgM3).toBeLessThan(82_000 / (287.05 * 295.15));
    expect(answer.body.sunElevationDeg).toBeGreaterThan(20);
    expect(answer.body).not.toHaveProperty('teamId');
  });

  it('keeps no derived number in the database', async () => {
    await enterReading(contextFor(world, 'crew'), values({ relativeHumidity: null, dewPointC: 4 }));
    const [row] = await storedReadings();
    expect(row).toMatchObject({ dewPointC: 4, relativeHumidity: null, wetBulbC: null });
  });

  it('takes now when no time is sent', async () => {
    const ctx = contextFor(world, 'crew', 'a', '2026-05-02T10:00:00.000Z');
    const entered = await enterReading(ctx, values({ takenAt: undefined }));
    expect(entered.takenAt).toBe('2026-05-02T10:00:00.000Z');
  });

  it('turns an altimeter setting into station pressure with the altitude kept on the row', async () => {
    const ctx = contextFor(world, 'tuner');
    const entered = await enterReading(ctx, values({ pressurePa: 101_325, pressureKind: 'altimeter' }));
    // ICAO standard atmosphere at 1770 m: 81 790 Pa within 0.2 %.
    expect(Math.abs((entered.conditions.stationPressurePa ?? 0) / 81_790 - 1)).toBeLessThan(0.002);
    expect(entered.pressurePa).toBe(101_325);
  });

  it('refuses an altimeter setting at a track without altitude and says what to do', async () => {
    const track = await sampleTrack(contextFor(world, 'owner'), { altitudeM: null });
    const body = values({ trackId: track.id, pressurePa: 101_325, pressureKind: 'altimeter' });
    const answer = await callRoute(POST, { as: contextFor(world, 'crew'), body });
    expect(answer.status).toBe(400);
    expect(answer.body.error.message).toMatch(/Enter the altitude of the track/);
    expect(await storedReadings()).toEqual([]);
  });

  it('stores an unlikely reading and says what looks wrong', async () => {
    const entered = await enterReading(contextFor(world, 'crew'), values({ pressurePa: 101_325 }));
    expect(entered.warnings).toEqual([
      { field: 'pressurePa', message: expect.stringContaining('sea-level corrected') },
    ]);
    expect(await storedReadings()).toHaveLength(1);
  });

  it.each([
    [{ airTempC: 75 }, ['airTempC']],
    [{ airTempC: 'warm' }, ['airTempC']],
    [{ airTempC: 20, relativeHumidity: null, dewPointC: 25 }, ['dewPointC']],
    [{ relativeHumidity: 45 }, ['relativeHumidity']],
    [{ dewPointC: 4 }, ['dewPointC']],
    [{ pressurePa: 29.2 }, ['pressurePa']],
    [{ pressureKind: null }, ['pressureKind']],
    [{ pressureKind: 'barometer' }, ['pressureKind']],
    [{ trackTempC: 120 }, ['trackTempC']],
    [{ windDirDeg: 90 }, ['windMps']],
    [{ takenAt: '2026-05-02T08:40' }, ['takenAt']],
    [{ takenAt: '2090-06-02T08:40Z' }, ['takenAt']],
    [{ air_temp_f: 71 }, ['body']],
    [{ trackId: '' }, ['trackId']],
    [{ airTempC: null, relativeHumidity: null, pressurePa: null, pressureKind: null, trackTempC: null }, ['airTempC']],
  ])('refuses %j naming %j and stores nothing', async (change, fields) => {
    const answer = await callRoute(POST, { as: contextFor(world, 'crew'), body: values(change) });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toEqual(fields);
    expect(await storedReadings()).toEqual([]);
  });

  it.each(['NaN', 'Infinity', '1e400'])('refuses %s', async (text) => {
    const body = JSON.stringify(values({ airTempC: 0 })).replace('"airTempC":0', `"airTempC":${text}`);
    const answer = await callRoute(POST, { as: contextFor(world, 'crew'), body });
    expect(answer.status).toBe(400);
    expect(await storedReadings()).toEqual([]);
  });

  it('refuses a round of another track', async () => {
    const other = await sampleTrack(contextFor(world, 'owner'));
    const entering = enterReading(contextFor(world, 'crew'), values({ trackId: other.id, roundId: season.round.id }));
    await expect(entering).rejects.toMatchObject({ code: 'VALIDATION', fields: { roundId: expect.any(String) } });
  });

  it("answers 404 for another team's track or round and stores nothing", async () => {
    const theirs = await sampleSeason(world, 'b');
    const ctx = contextFor(world, 'owner');
    await expect(enterReading(ctx, values({ trackId: theirs.track.id }))).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(enterReading(ctx, values({ roundId: theirs.round.id }))).rejects.toMatchObject({ code: 'NOT_FOUND' });
    expect(await storedReadings()).toEqual([]);
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner', 'crew'))('refuses a %s', async (role) => {
    await expect(enterReading(contextFor(world, role), values())).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });

  it('leaves one audit row with the reading', async () => {
    const entered = await enterReading(contextFor(world, 'crew'), values());
    const rows = await world.handle.db.select().from(auditEvent).where(eq(auditEvent.subjectId, entered.id));
    expect(rows).toMatchObject([{ action: 'reading.enter', subjectType: 'reading', teamId: world.a.team.id }]);
  });
});

describe('a reading sent twice', () => {
  const clientId = '6f1f4f0e-1d0b-4d52-9b55-2f4b8f6f7a10';

  it('adds nothing with the same values and gives the first one back', async () => {
    const first = await enterReading(contextFor(world, 'crew'), values({ clientId }));
    const again = await enterReading(contextFor(world, 'tuner', 'a', '2026-05-02T16:00:00.000Z'), values({ clientId }));
    expect(again.id).toBe(first.id);
    expect(again.warnings).toEqual(first.warnings);
    expect(await storedReadings()).toHaveLength(1);
  });

  it('adds one when both arrive at once', async () => {
    const ctx = contextFor(world, 'crew');
    const [one, two] = await Promise.all([
      enterReading(ctx, values({ clientId })),
      enterReading(ctx, values({ clientId })),
    ]);
    expect(one.id).toBe(two.id);
    expect(await storedReadings()).toHaveLength(1);
  });

  it('is the same reading although the time was left to the server', async () => {
    const body = values({ clientId, takenAt: undefined });
    const first = await enterReading(contextFor(world, 'crew', 'a', '2026-05-02T15:00:00.000Z'), body);
    const again = await enterReading(contextFor(world, 'crew', 'a', '2026-05-02T15:09:00.000Z'), body);
    expect(again).toMatchObject({ id: first.id, takenAt: first.takenAt });
  });

  it('is a conflict with other values', async () => {
    const ctx = contextFor(world, 'crew');
    await enterReading(ctx, values({ clientId }));
    const other = enterReading(ctx, values({ clientId, trackTempC: 35 }));
    await expect(other).rejects.toMatchObject({ code: 'CONFLICT', message: expect.stringContaining('trackTempC') });
    expect(await storedReadings()).toHaveLength(1);
  });

  it('is no matter of another team', async () => {
    const theirs = await sampleSeason(world, 'b');
    await enterReading(contextFor(world, 'crew'), values({ clientId }));
    const entered = await enterReading(contextFor(world, 'crew', 'b'), values({ clientId, trackId: theirs.track.id }));
    expect(entered.trackId).toBe(theirs.track.id);
    expect(await storedReadings()).toHaveLength(2);
  });
});

describe('correctReading', () => {
  it('adds a row that points at the old and leaves the old as it was', async () => {
    const ctx = contextFor(world, 'crew');
    const old = await enterReading(ctx, values({ roundId: season.round.id }));
    const { trackId: _track, takenAt: _at, ...again } = values({ trackTempC: 41, reason: 'Read in the wrong lane' });
    const options = { as: ctx, params: { id: old.id }, body: again };
    const { status, body } = await callRoute(CORRECT, options);
    expect(status).toBe(201);
    expect(body).toMatchObject({
      correctsId: old.id,
      trackTempC: 41,
      takenAt: old.takenAt,
      trackId: old.trackId,
      roundId: old.roundId,
    });
    expect(await getReading(ctx, old.id)).toMatchObject({ trackTempC: 34, correctedById: body.id });
    expect((await listReadings(ctx)).map(({ id }) => id)).toEqual([body.id]);
    expect(await listReadings(ctx, { all: 'true' })).toHaveLength(2);
  });

  it('follows a chain: a correction can be corrected', async () => {
    const ctx = contextFor(world, 'crew');
    const first = await enterReading(ctx, values());
    const second = await correctReading(ctx, first.id, { ...values({ trackTempC: 36 }), reason: 'typo' });
    const third = await correctReading(ctx, second.id, { ...values({ trackTempC: 38 }), reason: 'typo again' });
    expect(await latestReading(ctx, season.track.id)).toMatchObject({ id: third.id, trackTempC: 38 });
  });

  it('lets one of two corrections at once win', async () => {
    const ctx = contextFor(world, 'crew');
    const old = await enterReading(ctx, values());
    const both = await Promise.allSettled([
      correctReading(ctx, old.id, { ...values({ trackTempC: 36 }), reason: 'a' }),
      correctReading(ctx, old.id, { ...values({ trackTempC: 38 }), reason: 'b' }),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(both.find(({ status }) => status === 'rejected')).toMatchObject({ reason: { code: 'CONFLICT' } });
    expect(await storedReadings()).toHaveLength(2);
  });

  it('needs a reason', async () => {
    const ctx = contextFor(world, 'crew');
    const old = await enterReading(ctx, values());
    await expect(correctReading(ctx, old.id, values())).rejects.toThrow(/reason/);
    expect(await storedReadings()).toHaveLength(1);
  });

  it("answers 404 for another team's reading", async () => {
    const old = await enterReading(contextFor(world, 'crew'), values());
    const options = { as: contextFor(world, 'owner', 'b'), params: { id: old.id } };
    expect((await callRoute(CORRECT, { ...options, body: { ...values(), reason: 'x' } })).status).toBe(404);
    expect((await callRoute(GET_ONE, options)).status).toBe(404);
    expect(await storedReadings()).toHaveLength(1);
  });
});

describe('listReadings', () => {
  it('gives the newest first, of one track or round, up to a limit', async () => {
    const ctx = contextFor(world, 'crew');
    const other = await sampleTrack(contextFor(world, 'owner'));
    const early = await enterReading(ctx, values({ takenAt: '2026-05-02T08:00-06:00', roundId: season.round.id }));
    const late = await enterReading(ctx, values({ takenAt: '2026-05-02T08:30-06:00' }));
    await enterReading(ctx, values({ trackId: other.id }));
    const ids = async (query: string) =>
      (await callRoute(GET, { as: contextFor(world, 'driver'), url: `/api/readings?${query}` })).body.map(
        (row: { id: string }) => row.id,
      );
    expect(await ids(`trackId=${season.track.id}`)).toEqual([late.id, early.id]);
    expect(await ids(`trackId=${season.track.id}&limit=1`)).toEqual([late.id]);
    expect(await ids(`roundId=${season.round.id}`)).toEqual([early.id]);
    expect(await ids('')).toHaveLength(3);
  });

  it('shows nothing to another team', async () => {
    await enterReading(contextFor(world, 'crew'), values());
    expect(await listReadings(contextFor(world, 'owner', 'b'))).toEqual([]);
    const asked = listReadings(contextFor(world, 'owner', 'b'), { trackId: season.track.id });
    await expect(asked).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });

  it.each(["' OR 1=1 --", '-1', 'many'])('refuses the limit %s', async (limit) => {
    await expect(listReadings(contextFor(world, 'crew'), { limit })).rejects.toThrow(/limit/);
  });
});
