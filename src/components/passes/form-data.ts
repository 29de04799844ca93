/** Loads what the pass forms offer to choose from, and what a new pass most likely is. */
import { dayAndClock } from '@/components/site/times';
import type { UnitSystem } from '@/lib/domain/display';
import { localInputValue } from '@/lib/forms/instants';
import { type CarView, listCars } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { notFound } from '@/lib/server/errors';
import { listPasses } from '@/lib/server/passes';
import { listReadings, type ReadingView } from '@/lib/server/readings';
import { listRounds, type RoundView } from '@/lib/server/rounds';
import { type CurrentSettings, currentSettings } from '@/lib/server/suggestions';
import { shortText } from '../conditions/stored';
import { roundJustRun } from './round-just-run';

const READINGS = 20;

export interface NewPassData {
  car: CarView;
  cars: CarView[];
  rounds: RoundView[];
  readings: ReadingView[];
  current: CurrentSettings;
  units: UnitSystem;
  now: Date;
  initial: Record<string, string>;
}

/** Null without a car. Throws NOT_FOUND for one that is none of the team's. */
export async function loadNewPass(ctx: ServerContext, carId: string | null): Promise<NewPassData | null> {
  const cars = await listCars(ctx);
  const car = carId ? cars.find(({ id }) => id === carId) : cars[0];
  if (!car) {
    if (carId) throw notFound('car');
    return null;
  }
  const [rounds, readings, current] = await Promise.all([
    listRounds(ctx),
    listReadings(ctx, { limit: READINGS }),
    currentSettings(ctx, car.id),
  ]);
  const choices = { car, cars, rounds, readings, current, units: ctx.team.units, now: ctx.now() };
  return { ...choices, initial: await mostLikely(ctx, choices) };
}

async function mostLikely(ctx: ServerContext, data: Omit<NewPassData, 'initial'>): Promise<Record<string, string>> {
  const { car, rounds, readings, current, now } = data;
  const last = (await listPasses(ctx, { carId: car.id, limit: 1 })).passes[0] ?? null;
  const round = roundJustRun(rounds, now);
  const reading =
    round && readings.find(({ trackId, takenAt }) => trackId === round.trackId && Date.parse(takenAt) <= now.getTime());
  const settings = Object.entries(current.settings).map(([key, value]) => [`settings.${key}`, String(value)]);
  return {
    ...Object.fromEntries(settings),
    clientId: crypto.randomUUID(),
    roundId: round?.id ?? '',
    readingId: reading?.id ?? '',
    lane: round?.lane ?? '',
    runAtLocal: round ? localInputValue(now.toISOString(), round.timeZone) : '',
    runsOnDiscs: last?.runsOnDiscs == null ? '' : String(last.runsOnDiscs + 1),
    discSetId: last?.discSetId ?? '',
  };
}

/** "2:35 PM, 84.2 °F ...": readings of a track to choose from. */
export function readingOptions(
  readings: readonly ReadingView[],
  rounds: readonly RoundView[],
  units: UnitSystem,
  now: Date,
) {
  const zones = new Map(rounds.map(({ trackId, timeZone }) => [trackId, timeZone]));
  return readings.map((reading) => ({
    value: reading.id,
    label: `${dayAndClock(reading.takenAt, zones.get(reading.trackId) ?? 'UTC', now)}, ${reading.trackName}: ${shortText(reading, units)}`,
  }));
}
