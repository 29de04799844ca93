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

/** What can be filtered by; only the form needs it. */
export interface TableChoices {
  events: Choice[];
  tracks: Choice[];
}

/** Plain data for the island. */
export interface TableData {
  cars: TableCar[];
  /** Shown when the address names no car. */
  firstCarId: string;
  /** Days of the date filter are days here. */
  timeZone: string;
  query: TableQuery;
  page: PassPage;
}

/** Null without a car. Throws NOT_FOUND for a car that is none of the team's, VALIDATION for a filter that makes no sense. */
export async function loadTable(
  ctx: ServerContext,
  params: URLSearchParams,
): Promise<{ data: TableData; choices: TableChoices } | null> {
  const [cars, events, tracks] = await Promise.all([listCars(ctx), listEvents(ctx), listTracks(ctx)]);
  const first = cars[0];
  if (!first) return null;
  const query = queryFromParams(params, first.id);
  const newest = await listPasses(ctx, { carId: query.car, limit: 1 });
  const chosen = tracks.find(({ id }) => id === query.track);
  const timeZone = chosen?.timeZone ?? newest.passes[0]?.timeZone ?? 'UTC';
  const page = await listPasses(ctx, apiParams(query, timeZone));
  return {
    data: { cars: cars.map(tableCar), firstCarId: first.id, timeZone, query, page },
    choices: { events: events.map(withYear), tracks: tracks.map(({ id, name }) => ({ id, name })) },
  };
}

/** The same meet comes back every year. */
function withYear({ id, name, startsOn }: { id: string; name: string; startsOn: string }): Choice {
  const year = startsOn.slice(0, 4);
  return { id, name: name.includes(year) ? name : `${name}, ${year}` };
}

function tableCar({ id, name, distanceFt, bandLowPct, bandHighPct, adjustables }: CarView): TableCar {
  const settings = adjustables.map(({ key, label, unit }) => ({ key, label, unit }));
  return { id, name, distanceFt, band: { lowPct: bandLowPct, highPct: bandHighPct }, settings };
}
