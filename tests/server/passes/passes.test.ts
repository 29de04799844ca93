import { and, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, discSet, pass } from '@/db/schema';
import { PASS_SORTS } from '@/lib/forms/pass';
import { updateAdjustable } from '@/lib/server/cars';
import { correctPass, excludePass, getPass, listPasses, logPass, passHistory, restorePass } from '@/lib/server/passes';
import { enterReading } from '@/lib/server/readings';
import { GET, POST } from '@/pages/api/passes';
import { GET as GET_ONE } from '@/pages/api/passes/[id]';
import { POST as CORRECT } from '@/pages/api/passes/[id]/correct';
import { POST as EXCLUDE } from '@/pages/api/passes/[id]/exclude';
import { POST as RESTORE } from '@/pages/api/passes/[id]/restore';
import {
  callRoute,
  contextFor,
  makeTestDb,
  otherRoles,
  sampleCar,
  sampleEvent,
  sampleRound,
  sampleSeason,
  type World,
} from '../helpers';

let world: World;
let season: Awaited<ReturnType<typeof sampleSeason>>;
beforeEach(async () => {
  world = await makeTestDb();
  season = await sampleSeason(world);
});

const SETTINGS = {
  counterweight_g: 11,
  base_pressure_lb: 200,
  release_delay_s: 0.4,
  launch_rpm: 7200,
  tire_pressure_psi: 6,
};

const values = (change: Record<string, unknown> = {}) => ({
  carId: season.car.id,
  roundId: season.round.id,
  runAt: '2026-05-01T13:30-06:00',
  lane: 'left',
  settings: SETTINGS,
  runsOnDiscs: 2,
  slipPct: 15.2,
  sixtyFtS: 0.912,
  outcome: 'clean',
  notes: 'Good track',
  ...change,
});

const tuner = () => contextFor(world, 'tuner');
const stored = () => world.handle.db.select().from(pass);

describe('logPass', () => {
  it('stores a pass with the next number and gives it back with its places', async () => {
    await logPass(tuner(), values({ passNo: 7 }));
    const body = values({ runAt: '2026-05-01T15:00-06:00', eighthMph: 200 });
    const answer = await callRoute(POST, { as: tuner(), body });
    expect(answer.status).toBe(201);
    expect(answer.body).toMatchObject({
      passNo: 8,
      runAt: '2026-05-01T21:00:00.000Z',
      eventName: season.event.name,
      trackName: season.track.name,
      roundName: season.round.name,
      settings: SETTINGS,
      slipSource: 'measured',
      current: true,
      correctsId: null,
      enteredByName: 'tuner of Team A',
      warnings: [],
    });
    expect(answer.body.rootId).toBe(answer.body.id);
    // 1 mph is 0.44704 m/s (NIST SP 811).
    expect(answer.body.eighthMps).toBeCloseTo(89.408, 9);
    expect(answer.body).not.toHaveProperty('teamId');
  });

  it('takes what an HTML form posts: text, blanks, a decimal comma', async () => {
    const settings = { ...SETTINGS, launch_rpm: '7150', counterweight_g: '11,5', tire_pressure_psi: '' };
    const logged = await logPass(tuner(), values({ passNo: '', slipPct: '14,8', sixtyFtS: '', lane: '', settings }));
    const { tire_pressure_psi: _blank, ...known } = SETTINGS;
    expect(logged).toMatchObject({ passNo: 1, slipPct: 14.8, sixtyFtS: null, lane: null });
    expect(logged.settings).toEqual({ ...known, launch_rpm: 7150, counterweight_g: 11.5 });
  });

  it('takes the lane of the round when none is sent', async () => {
    const round = await sampleRound(contextFor(world, 'owner'), { eventId: season.event.id, lane: 'right' });
    expect(await logPass(tuner(), values({ roundId: round.id, lane: null }))).toMatchObject({ lane: 'right' });
  });

  it('shows the conditions of its reading', async () => {
    const reading = await enterReading(tuner(), {
      trackId: season.track.id,
      takenAt: '2026-05-01T19:00Z',
      trackTempC: 33,
    });
    const logged = await logPass(tuner(), values({ readingId: reading.id }));
    expect(logged.conditions).toEqual({
      airTempC: null,
      relativeHumidity: null,
      stationPressurePa: null,
      trackTempC: 33,
    });
  });

  it("says when a setting is outside the team's limits, and stores it", async () => {
    const logged = await logPass(tuner(), values({ settings: { ...SETTINGS, launch_rpm: 9500 } }));
    expect(logged.warnings).toEqual(['Launch rpm 9500 is outside the limits your team set (5500 to 9000 rpm).']);
  });

  it.each([
    [{ carId: '' }, ['carId']],
    [{ runAt: 'yesterday' }, ['runAt']],
    [{ runAt: '2090-05-01T13:30Z' }, ['runAt']],
    [{ lane: 'middle' }, ['lane']],
    [{ slipPct: 900 }, ['slipPct']],
    [{ sixtyFtS: -1 }, ['sixtyFtS']],
    [{ runsOnDiscs: 1.5 }, ['runsOnDiscs']],
    [{ outcome: 'fast' }, ['outcome']],
    [{ settings: { ...SETTINGS, turbo_psi: 3 } }, ['settings.turbo_psi']],
    [{ settings: { ...SETTINGS, launch_rpm: 'high' } }, ['settings.launch_rpm']],
    [{ settings: 'all' }, ['settings']],
    [{ slip_pct: 15 }, ['body']],
  ])('refuses %j naming %j and stores nothing', async (change, fields) => {
    const answer = await callRoute(POST, { as: tuner(), body: values(change) });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toEqual(fields);
    expect(await stored()).toEqual([]);
  });

  it('refuses a reading of another track and discs of another car', async () => {
    const other = await sampleSeason(world);
    const reading = await enterReading(tuner(), { trackId: other.track.id, trackTempC: 33 });
    const discs = { id: 'discs', teamId: world.a.team.id, carId: other.car.id, name: 'Set 1', createdAt: '2026-05-01' };
    await world.handle.db.insert(discSet).values(discs);
    for (const change of [{ readingId: reading.id }, { discSetId: 'discs' }]) {
      const refused = logPass(tuner(), values(change));
      await expect(refused).rejects.toMatchObject({
        code: 'VALIDATION',
        fields: { [Object.keys(change)[0] as string]: expect.any(String) },
      });
    }
  });

  it('adds nothing when sent twice with the same clientId, at once too', async () => {
    const clientId = 'b3b7b4e2-6a55-4b8e-8c0e-0d9f0c9e1a11';
    const [one, two] = await Promise.all([
      logPass(tuner(), values({ clientId })),
      logPass(tuner(), values({ clientId })),
    ]);
    expect(two.id).toBe(one.id);
    expect(await stored()).toHaveLength(1);
    const other = logPass(tuner(), values({ clientId, slipPct: 16 }));
    await expect(other).rejects.toMatchObject({ code: 'CONFLICT', message: expect.stringContaining('slipPct') });
  });

  it('refuses a second pass of the car at the same time', async () => {
    await logPass(tuner(), values());
    await expect(logPass(tuner(), values())).rejects.toMatchObject({ code: 'CONFLICT' });
    expect(await stored()).toHaveLength(1);
  });

  it("answers 404 for another team's car, round and reading, and stores nothing", async () => {
    const theirs = await sampleSeason(world, 'b');
    const reading = await enterReading(contextFor(world, 'crew', 'b'), { trackId: theirs.track.id, trackTempC: 30 });
    for (const change of [{ carId: theirs.car.id }, { roundId: theirs.round.id }, { readingId: reading.id }]) {
      await expect(logPass(tuner(), values(change))).rejects.toMatchObject({ code: 'NOT_FOUND' });
    }
    expect(await stored()).toEqual([]);
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    await expect(logPass(contextFor(world, role), values())).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });
});

describe('correctPass', () => {
  it('adds a row of the same root; only what was sent changes', async () => {
    const first = await logPass(tuner(), values());
    const change = { slipPct: 16.1, settings: { launch_rpm: 7300, tire_pressure_psi: null }, reason: 'Log read again' };
    const answer = await callRoute(CORRECT, { as: tuner(), params: { id: first.id }, body: change });
    expect(answer.status).toBe(201);
    const { tire_pressure_psi: _out, ...kept } = SETTINGS;
    expect(answer.body).toMatchObject({
      rootId: first.id,
      correctsId: first.id,
      correctionReason: 'Log read again',
      slipPct: 16.1,
      sixtyFtS: 0.912,
      current: true,
    });
    expect(answer.body.settings).toEqual({ ...kept, launch_rpm: 7300 });
    const { passes } = await listPasses(tuner(), { carId: season.car.id });
    expect(passes.map(({ id }) => id)).toEqual([answer.body.id]);
  });

  it('keeps every row in the history, the first first', async () => {
    const first = await logPass(tuner(), values());
    const second = await correctPass(tuner(), first.id, { slipPct: 16, reason: 'one' });
    const third = await excludePass(contextFor(world, 'crew_chief'), second.id, { reason: 'Tire was wet' });
    const history = await passHistory(tuner(), first.rootId);
    expect(history.map(({ id }) => id)).toEqual([first.id, second.id, third.id]);
    expect(history.map(({ slipPct }) => slipPct)).toEqual([15.2, 16, 16]);
    expect(history.map(({ current }) => current)).toEqual([false, false, true]);
    for (const id of [first.id, second.id, third.id]) {
      const { body } = await callRoute(GET_ONE, { as: contextFor(world, 'driver'), params: { id } });
      expect(body.pass.id).toBe(third.id);
      expect(body.history).toHaveLength(3);
    }
  });

  it('tells the second of two at once that the first was there', async () => {
    const first = await logPass(tuner(), values());
    const both = await Promise.allSettled([
      correctPass(tuner(), first.id, { slipPct: 16, reason: 'a' }),
      correctPass(contextFor(world, 'crew_chief'), first.id, { slipPct: 17, reason: 'b' }),
    ]);
    expect(both.map(({ status }) => status)).toEqual(['fulfilled', 'rejected']);
    expect(both[1]).toMatchObject({
      reason: { code: 'CONFLICT', message: expect.stringContaining('tuner of Team A') },
    });
    expect(await stored()).toHaveLength(2);
  });

  it('refuses to correct a row that was replaced', async () => {
    const first = await logPass(tuner(), values());
    await correctPass(tuner(), first.id, { slipPct: 16, reason: 'a' });
    const late = correctPass(tuner(), first.id, { notes: 'x', reason: 'b' });
    await expect(late).rejects.toMatchObject({ code: 'CONFLICT' });
  });

  it.each([
    [{ slipPct: 16 }, 'reason'],
    [{ reason: 'why' }, 'body'],
    [{ reason: 'why', slipPct: 999 }, 'slipPct'],
    [{ reason: 'why', settings: { turbo_psi: 1 } }, 'settings.turbo_psi'],
  ])('refuses %j naming %s', async (change, field) => {
    const first = await logPass(tuner(), values());
    const answer = await callRoute(CORRECT, { as: tuner(), params: { id: first.id }, body: change });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields)).toContain(field);
    expect(await stored()).toHaveLength(1);
  });

  it('refuses a correction in which nothing differs', async () => {
    const first = await logPass(tuner(), values());
    const same = correctPass(tuner(), first.id, { slipPct: 15.2, settings: SETTINGS, reason: 'hm' });
    await expect(same).rejects.toMatchObject({ code: 'VALIDATION' });
  });

  it('keeps a setting whose adjustable has been archived since', async () => {
    const first = await logPass(tuner(), values());
    const tire = season.car.adjustables.find(({ key }) => key === 'tire_pressure_psi');
    await updateAdjustable(contextFor(world, 'owner'), season.car.id, tire?.id ?? '', { archived: true });
    const corrected = await correctPass(tuner(), first.id, {
      settings: { ...SETTINGS, launch_rpm: 7000 },
      reason: 'typo',
    });
    expect(corrected.settings).toEqual({ ...SETTINGS, launch_rpm: 7000 });
  });

  it('cannot take fields that are the server’s', async () => {
    const first = await logPass(tuner(), values());
    const forged = { teamId: world.b.team.id, rootId: 'x', excluded: true, enteredBy: 'y', notes: 'new', reason: 'r' };
    const corrected = await correctPass(tuner(), first.id, forged);
    expect(corrected).toMatchObject({ rootId: first.id, excluded: false, enteredBy: tuner().user.id, notes: 'new' });
    expect(await stored()).toMatchObject([{ teamId: world.a.team.id }, { teamId: world.a.team.id }]);
  });
});

describe('excludePass and restorePass', () => {
  it('are rows with their reasons, and audited', async () => {
    const first = await logPass(tuner(), values());
    const out = await callRoute(EXCLUDE, { as: tuner(), params: { id: first.id }, body: { reason: 'Oil on track' } });
    expect(out.status).toBe(201);
    expect(out.body).toMatchObject({ excluded: true, excludedReason: 'Oil on track', correctsId: first.id });
    const back = await callRoute(RESTORE, { as: tuner(), params: { id: out.body.id }, body: { reason: 'Other lane' } });
    expect(back.body).toMatchObject({ excluded: false, excludedReason: null, correctionReason: 'Other lane' });
    const rows = await world.handle.db
      .select()
      .from(auditEvent)
      .where(and(eq(auditEvent.subjectType, 'pass'), eq(auditEvent.subjectId, first.rootId)));
    expect(rows.map(({ action }) => action)).toEqual(['pass.log', 'pass.exclude', 'pass.restore']);
    expect(rows[1]?.detail).toMatchObject({ reason: 'Oil on track' });
  });

  it('need a reason and a pass in the other state', async () => {
    const first = await logPass(tuner(), values());
    await expect(excludePass(tuner(), first.id, {})).rejects.toThrow(/reason/);
    await expect(restorePass(tuner(), first.id, { reason: 'x' })).rejects.toMatchObject({ code: 'CONFLICT' });
    const out = await excludePass(tuner(), first.id, { reason: 'x' });
    await expect(excludePass(tuner(), out.id, { reason: 'x' })).rejects.toMatchObject({ code: 'CONFLICT' });
    expect(await stored()).toHaveLength(2);
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuse a %s', async (role) => {
    const first = await logPass(tuner(), values());
    const ctx = contextFor(world, role);
    await expect(excludePass(ctx, first.id, { reason: 'x' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(restorePass(ctx, first.id, { reason: 'x' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
    await expect(correctPass(ctx, first.id, { notes: 'x', reason: 'x' })).rejects.toMatchObject({ code: 'FORBIDDEN' });
  });

  it("answer 404 for another team's pass and change nothing", async () => {
    const first = await logPass(tuner(), values());
    const theirs = contextFor(world, 'owner', 'b');
    const missing = { code: 'NOT_FOUND' };
    await expect(excludePass(theirs, first.id, { reason: 'x' })).rejects.toMatchObject(missing);
    await expect(restorePass(theirs, first.id, { reason: 'x' })).rejects.toMatchObject(missing);
    await expect(correctPass(theirs, first.id, { notes: 'x', reason: 'x' })).rejects.toMatchObject(missing);
    await expect(getPass(theirs, first.id)).rejects.toMatchObject(missing);
    await expect(passHistory(theirs, first.rootId)).rejects.toMatchObject(missing);
    expect(await stored()).toHaveLength(1);
  });
});

describe('listPasses', () => {
  const logThree = async () => {
    const owner = contextFor(world, 'owner');
    const event = await sampleEvent(owner, { name: 'Autumn', startsOn: '2026-04-10', endsOn: '2026-04-12' });
    const round = await sampleRound(owner, { eventId: event.id });
    const hot = await enterReading(tuner(), { trackId: event.trackId, takenAt: '2026-04-10T20:00Z', trackTempC: 50 });
    const a = await logPass(tuner(), values({ slipPct: 18, outcome: 'smoke' }));
    const b = await logPass(tuner(), values({ slipPct: 12, outcome: 'shake', runAt: '2026-05-02T09:00-06:00' }));
    const c = await logPass(
      tuner(),
      values({ slipPct: 15, roundId: round.id, readingId: hot.id, runAt: '2026-04-10T23:30:00.500Z' }),
    );
    await excludePass(tuner(), b.id, { reason: 'x' });
    return { event, round, numbers: { [a.rootId]: 'a', [b.rootId]: 'b', [c.rootId]: 'c' } as Record<string, string> };
  };

  const asked = async (query: Record<string, string>, names: Record<string, string>) => {
    const url = `/api/passes?${new URLSearchParams({ carId: season.car.id, ...query })}`;
    const { body } = await callRoute(GET, { as: contextFor(world, 'driver'), url });
    return body.passes.map((row: { rootId: string }) => names[row.rootId]).join('');
  };

  it('filters and sorts', async () => {
    const { event, numbers } = await logThree();
    expect(await asked({}, numbers)).toBe('bac');
    expect(await asked({ sort: 'slipPct' }, numbers)).toBe('bca');
    expect(await asked({ sort: 'slipPct', dir: 'desc' }, numbers)).toBe('acb');
    expect(await asked({ eventId: event.id }, numbers)).toBe('c');
    expect(await asked({ trackId: season.track.id }, numbers)).toBe('ba');
    expect(await asked({ outcome: 'smoke' }, numbers)).toBe('a');
    expect(await asked({ excluded: 'true' }, numbers)).toBe('b');
    expect(await asked({ excluded: 'false' }, numbers)).toBe('ac');
    expect(await asked({ from: '2026-05-01', to: '2026-05-01' }, numbers)).toBe('a');
    expect(await asked({ to: '2026-04-10' }, numbers)).toBe('c');
    expect(await asked({ from: '2026-05-02T14:00Z' }, numbers)).toBe('b');
  });

  it('sorts by every key both ways without losing a row', async () => {
    const { numbers } = await logThree();
    for (const sort of PASS_SORTS) {
      for (const dir of ['asc', 'desc']) {
        const order = await asked({ sort, dir }, numbers);
        expect([...order].sort().join(''), `${sort} ${dir}`).toBe('abc');
      }
    }
  });

  it('pages with the total of all pages', async () => {
    const { numbers } = await logThree();
    const page = await listPasses(tuner(), { carId: season.car.id, limit: 2, offset: 2 });
    expect(page).toMatchObject({ total: 3, limit: 2, offset: 2 });
    expect(page.passes.map(({ rootId }) => numbers[rootId])).toEqual(['c']);
    expect((await listPasses(tuner(), { carId: season.car.id, outcome: 'smoke', limit: 1 })).total).toBe(1);
  });

  it.each<Record<string, string>>([
    { sort: 'slip_pct; drop table pass' },
    { sort: 'teamId' },
    { dir: 'up' },
    { outcome: "' OR 1=1 --" },
    { limit: '100000' },
    { from: "' OR 1=1 --" },
  ])('refuses %j', async (query) => {
    await expect(listPasses(tuner(), { carId: season.car.id, ...query })).rejects.toThrow();
    const url = `/api/passes?${new URLSearchParams({ carId: season.car.id, ...query })}`;
    expect((await callRoute(GET, { as: tuner(), url })).status).toBe(400);
  });

  it("shows nothing of another team's car", async () => {
    await logPass(tuner(), values());
    const theirs = contextFor(world, 'owner', 'b');
    await expect(listPasses(theirs, { carId: season.car.id })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    const own = await sampleCar(theirs);
    expect(await listPasses(theirs, { carId: own.id })).toMatchObject({ passes: [], total: 0 });
  });
});
