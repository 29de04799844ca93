/** What the passes table shows, as it stands in the address: filters, order, page. Same on server and in the browser. */
import { instantOf } from '@/components/conditions/zone';

export const PAGE_SIZE = 50;

export interface TableQuery {
  car: string;
  event: string;
  track: string;
  outcome: string;
  /** "false": passes that count; "true": those left out. */
  excluded: string;
  /** Calendar days at the track, yyyy-mm-dd. */
  from: string;
  to: string;
  sort: string;
  dir: 'asc' | 'desc';
  page: number;
  /** Whether the settings of each pass are shown. */
  settings: boolean;
}

export const FILTER_NAMES = ['event', 'track', 'outcome', 'excluded', 'from', 'to'] as const;
export type FilterName = (typeof FILTER_NAMES)[number];

const FIRST_ORDER = { sort: 'runAt', dir: 'desc' } as const;

/** Reads an address; `carId` stands in when none is named. What makes no sense is left for the server to refuse. */
export function queryFromParams(params: URLSearchParams, carId: string): TableQuery {
  const text = (name: string) => params.get(name)?.trim() ?? '';
  const sort = text('sort') || FIRST_ORDER.sort;
  return {
    car: text('car') || carId,
    event: text('event'),
    track: text('track'),
    outcome: text('outcome'),
    excluded: text('excluded'),
    from: text('from'),
    to: text('to'),
    sort,
    dir: params.get('dir') === 'asc' || (params.get('dir') === null && sort !== FIRST_ORDER.sort) ? 'asc' : 'desc',
    page: Math.max(1, Math.floor(Number(text('page')) || 1)),
    settings: text('settings') === '1',
  };
}

/** The address of a query, without what is usual. `carId` is the car shown when none is named. */
export function addressOf(query: TableQuery, carId: string): string {
  const params = new URLSearchParams();
  if (query.car !== carId) params.set('car', query.car);
  for (const name of FILTER_NAMES) if (query[name]) params.set(name, query[name]);
  if (query.sort !== FIRST_ORDER.sort || query.dir !== FIRST_ORDER.dir) {
    params.set('sort', query.sort);
    params.set('dir', query.dir);
  }
  if (query.page > 1) params.set('page', String(query.page));
  if (query.settings) params.set('settings', '1');
  const text = params.toString();
  return text ? `/passes?${text}` : '/passes';
}

/** The same order turned round, or another column in its first order. */
export function sortedBy(query: TableQuery, sort: string): TableQuery {
  const first = sort === FIRST_ORDER.sort ? 'desc' : 'asc';
  const turned = query.dir === 'asc' ? 'desc' : 'asc';
  return { ...query, sort, dir: query.sort === sort ? turned : first, page: 1 };
}

export const filterCount = (query: TableQuery): number => FILTER_NAMES.filter((name) => query[name] !== '').length;

/** "2 filters", for the summary of the form. */
export const filterText = (count: number): string => (count === 1 ? '1 filter' : `${count} filters`);

export const withoutFilters = (query: TableQuery): TableQuery => ({
  ...query,
  ...{ event: '', track: '', outcome: '', excluded: '', from: '', to: '', page: 1 },
});

const LAST_MS_OF_MINUTE = 59_999;

/** What the passes endpoint is asked. Days are those of `timeZone`. */
export function apiParams(query: TableQuery, timeZone: string): Record<string, string> {
  const { car, event, track, outcome, excluded, from, to, sort, dir, page } = query;
  const all = {
    carId: car,
    eventId: event,
    trackId: track,
    outcome,
    excluded,
    from: startOfDay(from, timeZone),
    to: endOfDay(to, timeZone),
    sort,
    dir,
    limit: String(PAGE_SIZE),
    offset: String((page - 1) * PAGE_SIZE),
  };
  return Object.fromEntries(Object.entries(all).filter(([, value]) => value !== ''));
}

// What is no day goes on as it was typed: the server says what is wrong with it.
const startOfDay = (day: string, zone: string): string => instantOf(`${day}T00:00`, zone) ?? day;

function endOfDay(day: string, zone: string): string {
  const lastMinute = instantOf(`${day}T23:59`, zone);
  return lastMinute === null ? day : new Date(Date.parse(lastMinute) + LAST_MS_OF_MINUTE).toISOString();
}
