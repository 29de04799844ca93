import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { auditEvent, event, pass, reading, round, track } from '@/db/schema';
import { correctPass, type ImportPlan, importPasses, listPasses, planImport } from '@/lib/server/passes';
import { listReadings } from '@/lib/server/readings';
import { updateTrack } from '@/lib/server/tracks';
import { POST } from '@/pages/api/passes/import';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleCar, sampleTrack, type World } from '../helpers';
import { type Cells, COLUMNS, cells, csv, seasonCells } from './csv';

let world: World;
let carId: string;
beforeEach(async () => {
  world = await makeTestDb();
  carId = (await sampleCar(contextFor(world, 'owner'))).id;
});

const tuner = () => contextFor(world, 'tuner');
const load = (file: string, more: Record<string, unknown> = {}) => importPasses(tuner(), { carId, file, ...more });
const dryRun = (file: string): Promise<ImportPlan> => planImport(tuner(), { carId, file });
const threeRows = (): Cells[] => [cells(1), cells(2, { round: 'Q2' }), cells(3, { round: 'E1', slip_pct: '' })];

/** Everything an import could leave behind. */
async function counts() {
  const { db } = world.handle;
  const audits = await db.select().from(auditEvent).where(eq(auditEvent.action, 'pass.import'));
  const rows = await Promise.all([track, event, round, reading, pass].map((table) => db.select().from(table)));
  const [tracks, events, rounds, readings, passes] = rows.map((list) => list.length);
  return { tracks, events, rounds, readings, passes, audits: audits.length };
}
const NOTHING = { tracks: 0, events: 0, rounds: 0, readings: 0, passes: 0, audits: 0 };

function upload(content: BlobPart, fields: Record<string, string> = {}, name = 'passes.csv') {
  const body = new FormData();
  body.set('file', new File([content], name, { type: 'text/csv' }));
  body.set('carId', carId);
  for (const [key, value] of Object.entries(fields)) body.set(key, value);
  return callRoute(POST, { as: tuner(), body });
}

describe('a dry run', () => {
  it('says what would be added and stores nothing', async () => {
    const { status, body } = await upload(csv(threeRows(), [...COLUMNS, 'crew_mood']), { dryRun: 'true' });
    expect(status).toBe(200);
    expect(body).toMatchObject({
      stored: false,
      counts: { rows: 3, added: 3, refused: 0, duplicates: 0, withoutSlip: 1 },
      refused: [],
      unknownColumns: ['crew_mood'],
      missingColumns: [],
      newTracks: [{ name: 'Mesa Flats', timeZone: 'America/Denver' }],
      newEvents: [{ name: 'Spring Meet', track: 'Mesa Flats', startsOn: '2025-04-11', endsOn: '2025-04-11' }],
      newRounds: [
        { name: 'Q1', event: 'Spring Meet' },
        { name: 'Q2', event: 'Spring Meet' },
        { name: 'E1', event: 'Spring Meet' },
      ],
    });
    expect(body.newTracks[0].altitudeM).toBeCloseTo(4980 * 0.3048, 9);
    expect(body.added.map((row: { passNo: number }) => row.passNo)).toEqual([1, 2, 3]);
    expect(body.notes.join(' ')).toMatch(/Mesa Flats is a new track: altitude 4,980 ft and time zone America\/Denver/);
    expect(await counts()).toEqual(NOTHING);
  });

  it('names the row, the column and the reason of what is refused', async () => {
    const plan = await dryRun(csv([cells(1), cells(2, { air_temp_f: 'hot' }), cells(3, { lane: 'middle' })]));
    expect(plan.counts).toMatchObject({ rows: 3, added: 1, refused: 2 });
    expect(plan.refused.map(({ row, column }) => ({ row, column }))).toEqual([
      { row: 3, column: 'air_temp_f' },
      { row: 4, column: 'lane' },
    ]);
    for (const { reason } of plan.refused) expect(reason.length).toBeGreaterThan(10);
  });

  it('counts what the car has already', async () => {
    await load(csv([cells(1), cells(2)]));
    const plan = await dryRun(csv([cells(1), cells(2), cells(3)]));
    expect(plan.counts).toMatchObject({ rows: 3, added: 1, duplicates: 2 });
    expect(plan.newTracks).toEqual([]);
    expect(plan.newRounds).toEqual([]);
  });

  it('lists missing columns', async () => {
    const plan = await dryRun(
      csv(
        threeRows(),
        COLUMNS.filter((name) => name !== 'wind_mph' && name !== 'launch_rpm'),
      ),
    );
    expect(plan.missingColumns.sort()).toEqual(['launch_rpm', 'wind_mph']);
    expect(plan.counts.added).toBe(3);
  });
});

describe('an import', () => {
  it('stores passes with their reading, round, event and track, and one audit row', async () => {
    const { status, body } = await upload(csv(threeRows()));
    expect(status).toBe(200);
    expect(body).toMatchObject({ stored: true, counts: { added: 3 } });
    expect(await counts()).toEqual({ tracks: 1, events: 1, rounds: 3, readings: 3, passes: 3, audits: 1 });
    const { passes } = await listPasses(tuner(), { carId, sort: 'passNo' });
    expect(passes[0]).toMatchObject({
      passNo: 1,
      runAt: '2025-04-11T22:00:00.000Z',
      roundName: 'Q1',
      trackName: 'Mesa Flats',
      lane: 'left',
      settings: {
        counterweight_g: 11,
        base_pressure_lb: 200,
        release_delay_s: 0.4,
        launch_rpm: 7200,
        tire_pressure_psi: 6,
      },
      slipPct: 15,
      source: 'file',
    });
    // 72 degF is 22.2222 degC; 24.9 inHg at 3386.389 Pa (NIST SP 811) is 84 321 Pa.
    expect(passes[0]?.conditions.airTempC).toBeCloseTo(22.2222, 4);
    expect(passes[0]?.conditions.stationPressurePa).toBeCloseTo(84_321.1, 0);
    expect(passes[2]).toMatchObject({ slipPct: null, slipSource: null });
    const [newest] = await listReadings(tuner());
    expect(newest).toMatchObject({ source: 'file', roundName: 'E1', takenAt: passes[2]?.runAt });
  });

  it('adds nothing the second time', async () => {
    const file = csv(threeRows());
    await load(file);
    const before = await counts();
    expect(await load(file)).toMatchObject({ stored: true, counts: { added: 0, duplicates: 3 } });
    expect(await counts()).toEqual(before);
  });

  it('adds nothing the second time although track, number or slip were corrected since', async () => {
    const file = csv(threeRows());
    await load(file);
    const { passes } = await listPasses(tuner(), { carId, sort: 'passNo' });
    await correctPass(tuner(), passes[0]?.id ?? '', { passNo: 40, slipPct: 14, reason: 'typo' });
    await updateTrack(tuner(), passes[0]?.trackId ?? '', { name: 'Mesa Flats Dragway of Ours' });
    const before = await counts();
    expect((await load(file)).counts).toMatchObject({ added: 0, duplicates: 3 });
    expect(await counts()).toEqual(before);
  });

  it('adds the passes once when the same file arrives twice at once', async () => {
    const file = csv(threeRows());
    const both = await Promise.all([load(file), load(file)]);
    expect(both.map((one) => one.counts.added).sort()).toEqual([0, 3]);
    expect((await counts()).passes).toBe(3);
  });

  it('is of one car: another car of the team takes the same file', async () => {
    const other = await sampleCar(contextFor(world, 'owner'));
    await load(csv(threeRows()));
    const result = await importPasses(tuner(), { carId: other.id, file: csv(threeRows()) });
    expect(result.counts.added).toBe(3);
    expect(await counts()).toMatchObject({ passes: 6, rounds: 3, events: 1, tracks: 1 });
  });

  it('finds tracks, events and rounds whatever their case and spaces', async () => {
    await load(csv([cells(1)]));
    await load(csv([cells(2, { track: ' mesa flats', event: 'SPRING MEET ', round: 'q1' })]));
    expect(await counts()).toMatchObject({ tracks: 1, events: 1, rounds: 1, passes: 2 });
  });

  it('keeps apart the same event of two years and of two tracks on one day', async () => {
    const rows = [
      cells(1, { date_time: '2024-04-12T15:00:00-06:00' }),
      cells(2, { date_time: '2025-04-11T15:00:00-06:00' }),
      cells(3, {
        date_time: '2025-04-11T17:00:00-06:00',
        track: 'Pine Hollow',
        altitude_ft: 820,
        station_pressure_inhg: 29,
      }),
    ];
    await load(csv(rows));
    await load(csv([...rows, cells(4, { ...rows[2], pass_no: 4, date_time: '2025-04-11T19:00:00-06:00' })]));
    const events = await world.handle.db.select().from(event);
    expect(events.map(({ name, startsOn }) => `${name} ${startsOn}`).sort()).toEqual([
      'Spring Meet (Pine Hollow) 2025-04-11',
      'Spring Meet 2024-04-12',
      'Spring Meet 2025-04-11',
    ]);
  });

  it('dates an event by the calendar at the track', async () => {
    await load(
      csv([cells(1, { date_time: '2025-04-11T23:30:00-06:00' }), cells(2, { date_time: '2025-04-13T01:00:00-06:00' })]),
    );
    expect(await world.handle.db.select().from(event)).toMatchObject([
      { startsOn: '2025-04-11', endsOn: '2025-04-13' },
    ]);
  });

  it('numbers rounds in the order they were run, after those that are there', async () => {
    await load(csv([cells(2, { round: 'Q2' }), cells(1, { round: 'Q1' })]));
    await load(csv([cells(5, { round: 'E1' })]));
    const rounds = await world.handle.db.select().from(round);
    const order = rounds.sort((a, b) => a.position - b.position).map(({ name }) => name);
    expect(order).toEqual(['Q1', 'Q2', 'E1']);
  });

  it('puts rows without a round into one and says so', async () => {
    const result = await load(csv([cells(1, { round: '' }), cells(2, { round: '' })]));
    expect(result.newRounds).toEqual([{ name: 'Run', event: 'Spring Meet' }]);
    expect(result.notes.join(' ')).toMatch(/without a round \(2\)/);
  });

  it('notes an altitude that does not fit the track, and leaves the track as it is', async () => {
    const mine = await sampleTrack(contextFor(world, 'owner'), { name: 'Mesa Flats', altitudeM: 1200 });
    const result = await load(csv(threeRows()));
    expect(result.notes.join(' ')).toMatch(/The file puts Mesa Flats at 4,980 ft, your team has it at 3,937 ft/);
    expect(await world.handle.db.select().from(track)).toMatchObject([{ id: mine.id, altitudeM: 1200 }]);
  });

  it('takes the altitude of the track for an altimeter setting without one', async () => {
    await sampleTrack(contextFor(world, 'owner'), { name: 'Mesa Flats', altitudeM: 1518 });
    const columns = COLUMNS.filter((name) => name !== 'altitude_ft' && name !== 'station_pressure_inhg');
    await load(csv([cells(1, { altimeter_inhg: 29.92 })], [...columns, 'altimeter_inhg']));
    const [stored] = await listReadings(tuner());
    expect(stored).toMatchObject({ pressureKind: 'altimeter', altitudeM: 1518 });
    // ICAO standard atmosphere at 1518 m: 84 370 Pa within 0.2 %.
    expect(Math.abs((stored?.conditions.stationPressurePa ?? 0) / 84_370 - 1)).toBeLessThan(0.002);
  });

  it('keeps a pass without any condition, without a reading', async () => {
    const row = {
      pass_no: 1,
      event: 'Spring Meet',
      track: 'Mesa Flats',
      date_time: '2025-04-11T15:00:00-06:00',
      slip_pct: 15,
    };
    await load(csv([row]));
    expect(await counts()).toMatchObject({ readings: 0, passes: 1 });
  });

  it.each([
    ['a byte order mark', (text: string) => `\uFEFF${text}`],
    ['CRLF line ends', (text: string) => text.replaceAll('\n', '\r\n')],
    ['a line above the header', (text: string) => `Season notes\n${text}`],
  ])('reads a file with %s', async (_what, change) => {
    const { status } = await upload(change(csv(threeRows())));
    expect(status).toBe(200);
    expect((await counts()).passes).toBe(3);
  });

  it('reads semicolons with decimal commas', async () => {
    const rows = threeRows().map((row) =>
      Object.fromEntries(
        Object.entries(row).map(([name, v]) => [name, typeof v === 'number' ? String(v).replace('.', ',') : v]),
      ),
    );
    await upload(csv(rows, COLUMNS, ';'));
    const { passes } = await listPasses(tuner(), { carId, sort: 'passNo' });
    expect(passes[0]).toMatchObject({ sixtyFtS: 0.91, settings: { release_delay_s: 0.4 } });
  });

  it('reads metric twins', async () => {
    const columns = [
      ...COLUMNS.filter((name) => name !== 'air_temp_f' && name !== 'base_pressure_lb'),
      'air_temp_c',
      'base_pressure_kg',
    ];
    await load(csv([cells(1, { air_temp_c: 20, base_pressure_kg: 90.718474 })], columns));
    const { passes } = await listPasses(tuner(), { carId });
    expect(passes[0]?.conditions.airTempC).toBe(20);
    // One pound is 0.45359237 kg exactly.
    expect(passes[0]?.settings.base_pressure_lb).toBeCloseTo(200, 6);
  });
});

describe('an import with refused rows', () => {
  const bad = () => csv([cells(1), cells(2, { slip_pct: 'lots' }), cells(3)]);

  it('stores nothing at all and answers with the plan', async () => {
    const { status, body } = await upload(bad());
    expect(status).toBe(400);
    expect(body.error.code).toBe('VALIDATION');
    expect(body.error.message).toMatch(/1 of 3 rows.*Row 3, slip_pct/);
    expect(body.plan).toMatchObject({ counts: { rows: 3, added: 2, refused: 1 } });
    expect(await counts()).toEqual(NOTHING);
  });

  it('keeps the good rows when that is confirmed', async () => {
    const { status, body } = await upload(bad(), { confirmPartial: 'true' });
    expect(status).toBe(200);
    expect(body).toMatchObject({ stored: true, counts: { added: 2, refused: 1 } });
    expect(await counts()).toMatchObject({ passes: 2, readings: 2, audits: 1 });
  });

  it('cannot be confirmed when no row is good', async () => {
    const { status } = await upload(csv([cells(1, { slip_pct: 'lots' })]), { confirmPartial: 'true' });
    expect(status).toBe(400);
    expect(await counts()).toEqual(NOTHING);
  });

  it('stores nothing when the database refuses one row of many', async () => {
    const file = csv([cells(1), cells(2)]);
    const { client } = world.handle;
    await client.execute(
      "CREATE TRIGGER t BEFORE INSERT ON pass WHEN NEW.pass_no = 2 BEGIN SELECT RAISE(ABORT, 'no'); END",
    );
    await expect(load(file)).rejects.toThrow();
    expect(await counts()).toEqual(NOTHING);
  });
});

describe('what is not a pass file', () => {
  const PNG = new Uint8Array([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 0x0d, 0x49, 0x48, 0x44, 0x52]);

  it.each<[string, BlobPart]>([
    ['a PNG', PNG],
    ['text with NUL bytes', csv([cells(1)]).replace('Spring', 'Spr\0ing')],
    ['an empty file', ''],
    ['prose', 'Dear crew,\nthe season went well.\n'],
    ['a header alone', csv([])],
    [
      'a file without the required columns',
      csv(
        [cells(1)],
        COLUMNS.filter((name) => name !== 'date_time'),
      ),
    ],
    ['a quotation mark that never closes', `${csv([cells(1)])}2,"Spring`],
  ])('refuses %s with a message and stores nothing', async (_what, content) => {
    const { status, body } = await upload(content, {}, '../../x.csv');
    expect(status).toBe(400);
    expect(body.error.message).not.toMatch(/Error|undefined|at .*\.ts/);
    expect(body.error.message.length).toBeGreaterThan(10);
    expect(await counts()).toEqual(NOTHING);
  });

  it('refuses a body over the limit, and a file over it', async () => {
    const big = `${csv([cells(1)])}${' '.repeat(21 * 1024 * 1024)}`;
    expect((await upload(big)).status).toBe(413);
    await expect(load(big)).rejects.toMatchObject({ code: 'TOO_LARGE' });
    expect(await counts()).toEqual(NOTHING);
  });

  it('refuses a body that is no form and a form without a file', async () => {
    const json = await callRoute(POST, { as: tuner(), body: { carId, file: 'x' } });
    expect(json.status).toBe(400);
    const body = new FormData();
    body.set('carId', carId);
    expect((await callRoute(POST, { as: tuner(), body })).body.error.fields).toHaveProperty('file');
  });
});

describe('who may import', () => {
  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('not a %s', async (role) => {
    const refused = importPasses(contextFor(world, role), { carId, file: csv(threeRows()) });
    await expect(refused).rejects.toMatchObject({ code: 'FORBIDDEN' });
    expect(await counts()).toEqual(NOTHING);
  });

  it('nobody into the car of another team', async () => {
    const theirs = contextFor(world, 'owner', 'b');
    await expect(importPasses(theirs, { carId, file: csv(threeRows()) })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    await expect(planImport(theirs, { carId, file: csv(threeRows()) })).rejects.toMatchObject({ code: 'NOT_FOUND' });
    expect(await counts()).toEqual(NOTHING);
  });

  it('and tracks of the same name of two teams stay apart', async () => {
    const own = await sampleCar(contextFor(world, 'owner', 'b'));
    await load(csv(threeRows()));
    await importPasses(contextFor(world, 'tuner', 'b'), { carId: own.id, file: csv(threeRows()) });
    const tracks = await world.handle.db.select().from(track);
    expect(new Set(tracks.map(({ teamId }) => teamId))).toEqual(new Set([world.a.team.id, world.b.team.id]));
  });
});

describe('a large file', () => {
  it('of 10 000 rows is stored whole, once', async () => {
    const file = csv(seasonCells(10_000));
    expect(await load(file)).toMatchObject({ stored: true, counts: { added: 10_000, refused: 0 } });
    expect(await counts()).toMatchObject({ passes: 10_000, readings: 10_000, tracks: 3, events: 1250, rounds: 10_000 });
    expect((await listPasses(tuner(), { carId, limit: 1 })).total).toBe(10_000);
    expect((await load(file)).counts).toMatchObject({ added: 0, duplicates: 10_000 });
  });
});
