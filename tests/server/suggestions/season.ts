import { importPasses, listPasses } from '@/lib/server/passes';
import { enterReading } from '@/lib/server/readings';
import { contextFor, sampleCar, sampleEvent, sampleRound, type World } from '../helpers';
import { csv, seasonCells } from '../import/csv';

export const CURRENT = {
  counterweight_g: 11,
  base_pressure_lb: 200,
  release_delay_s: 0.4,
  launch_rpm: 7200,
  tire_pressure_psi: 6,
};

/** A team of some passes, before a round of a new event, with a reading of its conditions. */
export async function readyToAsk(world: World, passes = 40, which: 'a' | 'b' = 'a') {
  const owner = contextFor(world, 'owner', which);
  const car = await sampleCar(owner);
  await importPasses(owner, { carId: car.id, file: csv(seasonCells(passes)) });
  const { passes: imported } = await listPasses(owner, { carId: car.id });
  const trackId = imported.find(({ trackName }) => trackName === 'Mesa Flats')?.trackId ?? '';
  const event = await sampleEvent(owner, { trackId });
  const round = await sampleRound(owner, { eventId: event.id, lane: 'left', plannedAt: '2026-05-02T12:00-06:00' });
  const reading = await enterReading(owner, conditions(trackId));
  const ask = {
    carId: car.id,
    roundId: round.id,
    readingId: reading.id,
    current: CURRENT,
    minutesLeft: 60,
    runsOnDiscs: 1,
  };
  return { car, event, round, reading, trackId, imported, ask };
}

export const conditions = (trackId: string, change: Record<string, unknown> = {}) => ({
  trackId,
  takenAt: '2026-05-02T08:50-06:00',
  airTempC: 22,
  relativeHumidity: 0.3,
  pressurePa: 84_300,
  pressureKind: 'station',
  trackTempC: 36,
  ...change,
});
