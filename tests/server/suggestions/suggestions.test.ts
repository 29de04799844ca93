import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, suggestion } from '@/db/schema';
import { forecastSettings, suggestFor } from '@/lib/domain/model';
import { decideSuggestion } from '@/lib/server/decisions';
import { excludePass, loadPassRecords, logPass, trainingHash } from '@/lib/server/passes';
import { correctReading, enterReading } from '@/lib/server/readings';
import { createSuggestion, currentSettings, getSuggestion, listSuggestions } from '@/lib/server/suggestions';
import { GET, POST } from '@/pages/api/suggestions';
import { GET as GET_ONE } from '@/pages/api/suggestions/[id]';
import { POST as FORECAST } from '@/pages/api/suggestions/[id]/forecast';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleCar, sampleSeason, type World } from '../helpers';
import { CURRENT, conditions, readyToAsk } from './season';

let world: World;
let ready: Awaited<ReturnType<typeof readyToAsk>>;
beforeEach(async () => {
  world = await makeTestDb();
  ready = await readyToAsk(world);
});

const tuner = (time = '15:00') => contextFor(world, 'tuner', 'a', `2026-05-02T${time}:00.000Z`);
const ask = (change: Record<string, unknown> = {}) => ({ ...ready.ask, ...change });
const stored = () => world.handle.db.select().from(suggestion);

describe('createSuggestion', () => {
  it('stores what the model said with what it was asked', async () => {
    const { status, body } = await callRoute(POST, { as: tuner(), body: ask() });
    expect(status).toBe(201);
    const passes = await loadPassRecords(tuner(), ready.car.id);
    const [row] = await stored();
    expect(row?.inputs).toMatchObject({
      context: {
        event: `${ready.event.name} 2026`,
        track: 'Mesa Flats',
        time: '2026-05-02T18:00:00.000Z',
        round: ready.round.name,
        lane: 'left',
        conditions: { airTempC: 22, relativeHumidity: 0.3, stationPressurePa: 84_300, trackTempC: 36 },
        runsOnDiscs: 1,
      },
      current: CURRENT,
      minutesLeft: 60,
    });
    expect(row?.inputs.adjustables.map(({ key }) => key).sort()).toEqual(Object.keys(CURRENT).sort());
    const { context, adjustables } = row!.inputs;
    const again = suggestFor({
      passes,
      adjustables,
      band: { lowPct: 13, highPct: 17 },
      context,
      current: CURRENT,
      minutesLeft: 60,
    });
    expect(row?.result).toEqual(JSON.parse(JSON.stringify(again)));
    expect(row).toMatchObject({ trainingHash: trainingHash(passes), passesUsed: 40, modelVersion: again.modelVersion });
    expect(body).toMatchObject({
      id: row?.id,
      status: again.status,
      createdByName: 'tuner of Team A',
      ageS: expect.any(Number),
      decision: null,
      ownEstimate: null,
      reading: { id: ready.reading.id },
      stale: { readingCorrected: false, newerReadingId: null, passChanges: 0 },
    });
    expect(body.result.offers.length).toBeGreaterThan(0);
    expect(body).not.toHaveProperty('teamId');
  });

  it('gives a refusal as a result with few passes', async () => {
    const few = await readyToAsk(world, 3, 'b');
    const made = await createSuggestion(contextFor(world, 'tuner', 'b'), few.ask);
    expect(made.status).toBe('too_few_passes');
    expect(made.result.reasons.join(' ')).toMatch(/5 more/);
  });

  it('never changes: the database refuses', async () => {
    const made = await createSuggestion(tuner(), ask());
    const { client } = world.handle;
    await expect(client.execute("UPDATE suggestion SET status = 'hold'")).rejects.toThrow(/never edited/);
    await expect(client.execute('DELETE FROM suggestion')).rejects.toThrow(/never edited/);
    expect(await getSuggestion(tuner(), made.id)).toEqual(made);
  });

  it('uses the correction of a reading, and the time of the reading without a planned one', async () => {
    const fixed = await correctReading(tuner(), ready.reading.id, {
      ...conditions(ready.trackId, { trackTempC: 41 }),
      reason: 'typo',
    });
    const made = await createSuggestion(tuner(), ask());
    expect(made).toMatchObject({ readingId: fixed.id, inputs: { context: { conditions: { trackTempC: 41 } } } });
  });

  it('takes the settings as they stand from the newest pass when none are sent', async () => {
    const { current: _current, ...rest } = ready.ask;
    const made = await createSuggestion(tuner(), rest);
    expect(made.inputs.current).toEqual(ready.imported[0]?.settings);
  });

  it.each([
    [{ current: { ...CURRENT, launch_rpm: undefined } }, ['current.launch_rpm'], /Launch rpm/],
    [{ current: {} }, Object.keys(CURRENT).map((key) => `current.${key}`), /Counterweight.*Tire pressure/],
    [{ current: { ...CURRENT, turbo_psi: 2 } }, ['current.turbo_psi'], /turbo_psi/],
    [{ current: { ...CURRENT, launch_rpm: 'high' } }, ['current.launch_rpm'], /plain number/],
    [{ minutesLeft: -5 }, ['minutesLeft'], /Minutes left/],
    [{ roundId: '' }, ['roundId'], /round/],
    [{ readingId: null }, ['readingId'], /reading/],
  ])('refuses %j naming %j', async (change, fields, message) => {
    const { status, body } = await callRoute(POST, { as: tuner(), body: ask(change) });
    expect(status).toBe(400);
    expect(Object.keys(body.error.fields).sort()).toEqual([...fields].sort());
    expect(body.error.message).toMatch(message);
    expect(await stored()).toEqual([]);
  });

  it('refuses a reading of another track', async () => {
    const other = await sampleSeason(world);
    const reading = await enterReading(tuner(), conditions(other.track.id));
    const refused = createSuggestion(tuner(), ask({ readingId: reading.id }));
    await expect(refused).rejects.toMatchObject({ code: 'VALIDATION', fields: { readingId: expect.any(String) } });
  });

  it("answers 404 for another team's car, round or reading, and stores nothing", async () => {
    const theirs = await readyToAsk(world, 2, 'b');
    for (const name of ['carId', 'roundId', 'readingId'] as const) {
      const { status } = await callRoute(POST, { as: tuner(), body: ask({ [name]: theirs.ask[name] }) });
      expect(status, name).toBe(404);
    }
    expect(await stored()).toEqual([]);
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    await expect(createSuggestion(contextFor(world, role), ask())).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });

  it('leaves one audit row', async () => {
    const made = await createSuggestion(tuner(), ask());
    const rows = await world.handle.db.select().from(auditEvent).where(eq(auditEvent.subjectId, made.id));
    expect(rows.map(({ action }) => action)).toEqual(['suggestion.create']);
  });

  it('cannot be told what only the server knows', async () => {
    const forged = { modelVersion: 'x', trainingHash: 'y', createdBy: 'z', teamId: world.b.team.id, passesUsed: 9999 };
    const made = await createSuggestion(tuner(), ask(forged));
    expect(made).toMatchObject({ passesUsed: 40, createdBy: tuner().user.id });
    expect(await stored()).toMatchObject([{ teamId: world.a.team.id }]);
  });
});

describe('reading suggestions', () => {
  it('lists a car, newest first, with the decision', async () => {
    const one = await createSuggestion(tuner('15:00'), ask());
    const two = await createSuggestion(tuner('15:10'), ask());
    await decideSuggestion(contextFor(world, 'crew_chief'), one.id, { choice: 'decline', reason: 'rain' });
    const url = `/api/suggestions?carId=${ready.car.id}`;
    const { body } = await callRoute(GET, { as: contextFor(world, 'crew'), url });
    expect(body.map(({ id, choice }: { id: string; choice: string }) => [id, choice])).toEqual([
      [two.id, null],
      [one.id, 'decline'],
    ]);
    expect(await listSuggestions(tuner(), { carId: ready.car.id, limit: 1 })).toHaveLength(1);
  });

  it('says what has changed since', async () => {
    const made = await createSuggestion(tuner('15:00'), ask());
    const newer = await enterReading(tuner('15:20'), conditions(ready.trackId, { takenAt: '2026-05-02T09:15-06:00' }));
    await excludePass(tuner('15:30'), ready.imported[0]?.id ?? '', { reason: 'x' });
    await correctReading(tuner('15:40'), ready.reading.id, {
      ...conditions(ready.trackId, { trackTempC: 30 }),
      reason: 'x',
    });
    const view = await getSuggestion(tuner('15:50'), made.id);
    expect(view.stale).toEqual({ readingCorrected: true, newerReadingId: newer.id, passChanges: 1 });
    expect(view.ageS).toBe(3000);
    expect(view.result).toEqual(made.result);
  });

  it('is not for drivers nor for another team', async () => {
    const made = await createSuggestion(tuner(), ask());
    await expect(getSuggestion(contextFor(world, 'driver'), made.id)).rejects.toMatchObject({ code: 'FORBIDDEN' });
    const options = { as: contextFor(world, 'owner', 'b'), params: { id: made.id } };
    expect((await callRoute(GET_ONE, options)).status).toBe(404);
    expect((await callRoute(FORECAST, { ...options, body: { settings: CURRENT } })).status).toBe(404);
    const listing = listSuggestions(contextFor(world, 'owner', 'b'), { carId: ready.car.id });
    await expect(listing).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});

describe('the live forecast', () => {
  const forecast = async (id: string, settings: Record<string, unknown>, time = '16:00') =>
    callRoute(FORECAST, { as: tuner(time), params: { id }, body: { settings } });

  it('is that of the model for the settings, and of the suggestion for its own', async () => {
    const made = await createSuggestion(tuner(), ask());
    const { body } = await forecast(made.id, CURRENT);
    expect(body).toMatchObject({ asSuggested: true, warnings: [] });
    expect(body.forecast).toEqual(made.result.noChange);
    const moved = await forecast(made.id, { ...CURRENT, launch_rpm: 7400 });
    const passes = await loadPassRecords(tuner(), ready.car.id);
    const { context, adjustables } = made.inputs;
    const expected = forecastSettings({
      passes,
      adjustables,
      band: made.result.band,
      context,
      settings: { ...CURRENT, launch_rpm: 7400 },
    });
    expect(moved.body.forecast).toEqual(expected);
    expect(moved.body.forecast.meanPct).not.toBe(body.forecast.meanPct);
  });

  it('uses the passes the suggestion had, whatever has come since', async () => {
    const made = await createSuggestion(tuner('15:00'), ask());
    await excludePass(tuner('15:10'), ready.imported[1]?.id ?? '', { reason: 'x' });
    await logPass(tuner('15:20'), {
      carId: ready.car.id,
      roundId: ready.round.id,
      readingId: ready.reading.id,
      runAt: '2026-05-02T15:15Z',
      settings: CURRENT,
      slipPct: 25,
    });
    const { body } = await forecast(made.id, CURRENT);
    expect(body.asSuggested).toBe(true);
    expect(body.forecast).toEqual(made.result.noChange);
    expect(await stored()).toHaveLength(1);
  });

  it('warns outside the limits and refuses what is no setting', async () => {
    const made = await createSuggestion(tuner(), ask());
    const wide = await forecast(made.id, { ...CURRENT, launch_rpm: 9900 });
    expect(wide.body.warnings).toEqual([expect.stringContaining('Launch rpm 9900 is outside')]);
    expect((await forecast(made.id, { launch_rpm: 7000 })).status).toBe(400);
    expect((await forecast(made.id, { ...CURRENT, launch_rpm: null })).status).toBe(400);
  });
});

describe('currentSettings', () => {
  it('are those of the newest pass, then of a newer launch sheet, then of a newer pass', async () => {
    const newest = ready.imported[0];
    expect(await currentSettings(tuner(), ready.car.id)).toEqual({
      settings: newest?.settings,
      from: { kind: 'pass', passNo: newest?.passNo },
      at: newest?.runAt,
    });
    const made = await createSuggestion(tuner(), ask());
    const final = { ...CURRENT, launch_rpm: 7350 };
    const chief = contextFor(world, 'crew_chief', 'a', '2026-05-02T15:30:00.000Z');
    await decideSuggestion(chief, made.id, { choice: 'adjust', finalSettings: final, reason: 'bald spot' });
    expect(await currentSettings(tuner(), ready.car.id)).toMatchObject({
      settings: final,
      from: { kind: 'launch_sheet', version: 1 },
    });
    const run = {
      carId: ready.car.id,
      roundId: ready.round.id,
      runAt: '2026-05-02T16:00Z',
      settings: { launch_rpm: 7300 },
    };
    await logPass(tuner('16:05'), run);
    expect(await currentSettings(tuner(), ready.car.id)).toMatchObject({
      settings: { launch_rpm: 7300 },
      from: { kind: 'pass' },
    });
  });

  it('are unknown for a new car, and no matter of another team', async () => {
    const car = await sampleCar(contextFor(world, 'owner'));
    expect(await currentSettings(tuner(), car.id)).toEqual({ settings: {}, from: null, at: null });
    await expect(currentSettings(contextFor(world, 'owner', 'b'), car.id)).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
