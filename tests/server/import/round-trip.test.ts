import { beforeEach, describe, expect, it } from 'vitest';
import { createAdjustable, getCar, updateAdjustable } from '@/lib/server/cars';
import { correctPass, excludePass, exportPasses, importPasses, listPasses, logPass } from '@/lib/server/passes';
import { enterReading } from '@/lib/server/readings';
import { GET } from '@/pages/api/passes/export';
import { callRoute, contextFor, makeTestDb, otherRoles, sampleCar, sampleSeason, type World } from '../helpers';
import { COLUMNS, cells, csv, seasonCells } from './csv';

let world: World;
let carId: string;
beforeEach(async () => {
  world = await makeTestDb();
  carId = (await sampleCar(contextFor(world, 'owner'))).id;
});

const tuner = () => contextFor(world, 'tuner');
const theirTuner = () => contextFor(world, 'tuner', 'b');
const exported = async (units?: 'us' | 'metric') => (await exportPasses(tuner(), { carId, units })).csv;

/** Imports a file into an empty car of the other team and exports it from there. */
async function throughAnotherTeam(file: string, units?: 'us' | 'metric'): Promise<string> {
  const car = await sampleCar(contextFor(world, 'owner', 'b'));
  const result = await importPasses(theirTuner(), { carId: car.id, file });
  expect(result.counts).toMatchObject({ refused: 0, duplicates: 0 });
  return (await exportPasses(theirTuner(), { carId: car.id, units })).csv;
}

describe('export and import', () => {
  it.each(['us', 'metric'] as const)('give the same file again, in %s units', async (units) => {
    await importPasses(tuner(), { carId, file: csv(seasonCells(40)) });
    const first = await exported(units);
    expect(first.split('\r\n').filter(Boolean)).toHaveLength(41);
    expect(await throughAnotherTeam(first, units)).toBe(first);
  });

  it('give back the cells of the file that was imported', async () => {
    const rows = seasonCells(12);
    await importPasses(tuner(), { carId, file: csv(rows) });
    const [header, ...lines] = (await exported('us'))
      .trim()
      .split('\r\n')
      .map((line) => line.split(','));
    expect(lines).toHaveLength(12);
    for (const [i, line] of lines.entries()) {
      const row = rows[i] ?? {};
      for (const name of COLUMNS)
        expect(line[header?.indexOf(name) ?? -1], `${name} of row ${i}`).toBe(String(row[name]));
    }
  });

  it('keep passes logged by hand, corrected and left out, with every kind of reading and text', async () => {
    const season = await sampleSeason(world);
    const place = { trackId: season.track.id, takenAt: '2026-05-01T19:00Z' };
    const wet = await enterReading(tuner(), { ...place, airTempC: 21.3, wetBulbC: 12.7, trackTempC: 33.3 });
    const dew = await enterReading(tuner(), {
      ...place,
      takenAt: '2026-05-01T20:00Z',
      airTempC: 23,
      dewPointC: 4.4,
      pressurePa: 101_592,
      pressureKind: 'altimeter',
      windMps: 3.1,
      windDirDeg: 350,
    });
    carId = season.car.id;
    const base = { carId, roundId: season.round.id, settings: { launch_rpm: 7050, release_delay_s: 0.42 } };
    const notes = '=1+1 "quoted", first\nsecond; -5 third';
    const one = await logPass(tuner(), {
      ...base,
      runAt: '2026-05-01T19:30:12.345Z',
      readingId: wet.id,
      slipPct: 14.37,
      notes,
    });
    const two = await logPass(tuner(), {
      ...base,
      runAt: '2026-05-01T20:30Z',
      readingId: dew.id,
      quarterS: 5.1,
      quarterMph: 250,
    });
    await logPass(tuner(), { ...base, runAt: '2026-05-01T21:30Z', outcome: 'aborted', notes: '-5' });
    await correctPass(tuner(), one.id, { slipPct: 14.73, thousandFtS: 4.2, reason: 'digits turned' });
    await excludePass(tuner(), two.id, { reason: '+wheel speed lost' });
    const first = await exported();
    expect(first).toContain('14.73');
    expect(first).not.toContain('14.37');
    expect(await throughAnotherTeam(first)).toBe(first);
  });

  it('keep the offset of the times, summer and winter', async () => {
    const rows = [
      cells(1, { date_time: '2025-01-11T15:00:00-07:00', event: 'Winter' }),
      cells(2, { date_time: '2025-07-11T15:00:00-06:00', event: 'Summer' }),
      cells(3, { date_time: '2025-07-12T15:00:00+05:45', event: 'Far', track: 'Hill Strip' }),
    ];
    await importPasses(tuner(), { carId, file: csv(rows) });
    const first = await exported();
    expect(first).toContain('2025-01-11T15:00:00-07:00');
    expect(first).toContain('2025-07-11T15:00:00-06:00');
    // No zone of the short list has +05:45: the same instant, in UTC.
    expect(first).toContain('2025-07-12T09:15:00Z');
    expect(await throughAnotherTeam(first)).toBe(first);
  });

  it('keep settings of an adjustable that has been archived, while it has any', async () => {
    await importPasses(tuner(), { carId, file: csv([cells(1, { tire_pressure_psi: 6.4 })]) });
    const owner = contextFor(world, 'owner');
    const { adjustables } = await getCar(owner, carId);
    const tire = adjustables.find(({ key }) => key === 'tire_pressure_psi');
    await updateAdjustable(owner, carId, tire?.id ?? '', { archived: true });
    expect(await exported()).toContain('tire_pressure_psi');
    expect(await exported()).toContain('6.4');
  });

  it('know the adjustables of the car', async () => {
    const owner = contextFor(world, 'owner');
    await createAdjustable(owner, carId, {
      key: 'wing_deg',
      label: 'Wing',
      unit: '°',
      step: 0.5,
      low: 0,
      high: 30,
      minutes: 2,
      group: 'launch',
    });
    const result = await importPasses(tuner(), {
      carId,
      file: csv([cells(1, { wing_deg: 12.5 })], [...COLUMNS, 'wing_deg']),
    });
    expect(result.unknownColumns).toEqual([]);
    const { passes } = await listPasses(tuner(), { carId });
    expect(passes[0]?.settings.wing_deg).toBe(12.5);
  });

  it('give a header alone for a car without passes', async () => {
    const lines = (await exported()).trim().split('\r\n');
    expect(lines).toHaveLength(1);
    expect(lines[0]).toMatch(/^pass_no,event,track,date_time/);
  });
});

describe('GET /api/passes/export', () => {
  it('is an attachment under our own name, not sniffed, not cached', async () => {
    const car = await sampleCar(contextFor(world, 'owner'), { name: '../<Évil> "car"\u2028 2' });
    const url = `/api/passes/export?carId=${car.id}`;
    const { status, headers, body } = await callRoute(GET, { as: tuner(), url });
    expect(status).toBe(200);
    expect(headers.get('content-type')).toBe('text/csv; charset=utf-8');
    expect(headers.get('content-disposition')).toBe('attachment; filename="passes-e-vil-car-2.csv"');
    expect(headers.get('x-content-type-options')).toBe('nosniff');
    expect(headers.get('cache-control')).toBe('no-store');
    expect(body).toMatch(/^pass_no/);
  });

  it('guards cells that a spreadsheet would run, and leaves numbers alone', async () => {
    await importPasses(tuner(), {
      carId,
      file: csv([cells(1, { notes: '=HYPERLINK("x")', event: '@home', slip_pct: -0.5 })]),
    });
    const text = await exported();
    expect(text).toContain("'=HYPERLINK");
    expect(text).toContain("'@home");
    expect(text).toMatch(/,-0\.5,/);
  });

  it.each(otherRoles('owner', 'crew_chief', 'tuner'))('refuses a %s', async (role) => {
    const url = `/api/passes/export?carId=${carId}`;
    expect((await callRoute(GET, { as: contextFor(world, role), url })).status).toBe(403);
  });

  it("answers 404 for another team's car and 400 without one", async () => {
    const url = `/api/passes/export?carId=${carId}`;
    expect((await callRoute(GET, { as: theirTuner(), url })).status).toBe(404);
    expect((await callRoute(GET, { as: tuner(), url: '/api/passes/export' })).status).toBe(400);
  });
});
