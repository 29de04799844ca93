/** Loads what the passes table starts with. */
import type { Band } from '@/lib/domain/types';
import { type CarView, listCars } from '@/lib/server/cars';
import type { ServerContext } from '@/lib/server/context';
import { listEvents } from '@/lib/server/events';
import { listPasses, type PassPage } from '@/lib/server/passes';
import { listTracks } from '@/lib/server/tracks';
import type { SettingLabel } from './pass-text';
import { apiParams, queryFromParams, type TableQuery } from './table-query';

export interface TableCar {
  id: string;
  name: string;
  distanceFt: number;
  band: Band;
  settings: SettingLabel[];
}

interface Choice {
  id: string;
  name: string;
}

/** Plain data for the island. */
export interface TableData {
  cars: TableCar[];
  /** Shown when the address names no car. */
  firstCarId: string;
  events: Choice[];
  tracks: Choice[];
  /** Days of the date filter are days here. */
  timeZone: string;
  query: TableQuery;
  page: PassPage;
}

/** Null without a car. Throws NOT_FOUND for a car that is none of the team's, VALIDATION for a filter that makes no sense. */
export async function loadTable(ctx: ServerContext, params: URLSearchParams): Promise<TableData | null> {
  const [cars, events, tracks] = await Promise.all([listCars(ctx), listEvents(ctx), listTracks(ctx)]);
  const first = cars[0];
  if (!first) return null;
  const query = queryFromParams(params, first.id);
  const newest = await listPasses(ctx, { carId: query.car, limit: 1 });
  const chosen = tracks.find(({ id }) => id === query.track);
  const timeZone = chosen?.timeZone ?? newest.passes[0]?.timeZone ?? 'UTC';
  return {
    cars: cars.map(tableCar),
    firstCarId: first.id,
    events: events.map(({ id, name, startsOn }) => ({
      id,
      name: name.includes(startsOn.slice(0, 4)) ? name : `${name}, ${startsOn.slice(0, 4)}`,
    })),
    tracks: tracks.map(({ id, name }) => ({ id, name })),
    timeZone,
    query,
    page: await listPasses(ctx, apiParams(query, timeZone)),
  };
}

function tableCar({ id, name, distanceFt, bandLowPct, bandHighPct, adjustables }: CarView): TableCar {
  const settings = adjustables.map(({ key, label, unit }) => ({ key, label, unit }));
  return { id, name, distanceFt, band: { lowPct: bandLowPct, highPct: bandHighPct }, settings };
}
