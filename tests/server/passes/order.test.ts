import { describe, expect, it } from 'vitest';
import { listPasses, logPass } from '@/lib/server/passes';
import { enterReading } from '@/lib/server/readings';
import { contextFor, makeTestDb, sampleSeason } from '../helpers';

/** Three passes: in cool air, in hot air, and one without a reading. */
async function threePasses() {
  const world = await makeTestDb();
  const season = await sampleSeason(world);
  const tuner = contextFor(world, 'tuner');
  const reading = (airTempC: number) =>
    enterReading(tuner, {
      trackId: season.track.id,
      takenAt: '2026-05-01T12:00-06:00',
      airTempC,
      relativeHumidity: 0.3,
      pressurePa: 82_000,
      pressureKind: 'station',
    });
  const log = (hour: number, readingId: string | null, quarterS: number | null) =>
    logPass(tuner, {
      carId: season.car.id,
      roundId: season.round.id,
      runAt: `2026-05-01T${hour}:00-06:00`,
      readingId,
      quarterS,
    });
  await log(13, (await reading(12)).id, 6.2);
  await log(14, (await reading(34)).id, 6.1);
  await log(15, null, null);
  const order = async (query: Record<string, unknown>) =>
    (await listPasses(tuner, { carId: season.car.id, ...query })).passes.map(({ passNo }) => passNo);
  return { order };
}

describe('order of passes', () => {
  it('sorts by density altitude: hot air stands higher, what has none comes last either way', async () => {
    const { order } = await threePasses();
    expect(await order({ sort: 'densityAltitude', dir: 'asc' })).toEqual([1, 2, 3]);
    expect(await order({ sort: 'densityAltitude', dir: 'desc' })).toEqual([2, 1, 3]);
    expect(await order({ sort: 'densityAltitude', dir: 'desc', limit: 1, offset: 1 })).toEqual([1]);
  });

  it('puts what was not measured last either way', async () => {
    const { order } = await threePasses();
    expect(await order({ sort: 'quarterS', dir: 'asc' })).toEqual([2, 1, 3]);
    expect(await order({ sort: 'quarterS', dir: 'desc' })).toEqual([1, 2, 3]);
    expect(await order({ sort: 'trackTempC', dir: 'asc' })).toHaveLength(3);
  });
});
