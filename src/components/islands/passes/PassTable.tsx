import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { columnsOf } from '@/components/passes/columns';
import { etOf } from '@/components/passes/pass-text';
import type { TableData } from '@/components/passes/table-data';
import {
  addressOf,
  apiParams,
  queryFromParams,
  type TableQuery,
  withoutFilters,
} from '@/components/passes/table-query';
import { Button } from '@/components/ui/react/Button';
import { Notice } from '@/components/ui/react/Notice';
import type { UnitSystem } from '@/lib/domain/display';
import type { Band } from '@/lib/domain/types';
import type { PassPage } from '@/lib/server/passes';
import { api } from '../api';
import { errorText, Providers } from '../query';
import { HeadRow } from './HeadRow';
import { Pager } from './Pager';
import { PassRows } from './PassRows';
import { useFilters } from './use-filters';

interface PassTableProps {
  data: TableData;
  units: UnitSystem;
}

/** Every pass of a car, sorted and filtered without leaving the page. The server draws the same table for a page without script. */
export function PassTable(props: PassTableProps) {
  return (
    <Providers>
      <Table {...props} />
    </Providers>
  );
}

function Table({ data, units }: PassTableProps) {
  const [query, setQuery] = useAddress(data);
  const passes = usePasses(query, data);
  useFilters(query, data.firstCarId, setQuery);
  const car = data.cars.find(({ id }) => id === query.car) ?? data.cars[0]!;
  const columns = columnsOf(etOf(car.distanceFt), units);
  const top = useRef<HTMLDivElement>(null);
  const turn = (next: TableQuery) => {
    setQuery(next);
    top.current?.scrollIntoView();
  };
  const hrefOf = (next: TableQuery) => addressOf(next, data.firstCarId);
  return (
    <div ref={top} className="pass-view" aria-busy={passes.isFetching}>
      {passes.isError && (
        <Notice kind="danger" title="Not loaded">
          <p>{errorText(passes.error)}</p>
          <Button onClick={() => passes.refetch()}>Try again</Button>
        </Notice>
      )}
      <p className="pass-count" role="status">
        {countText(passes.data, car.band)}
      </p>
      {passes.data?.total === 0 ? (
        <Nothing href={hrefOf(withoutFilters(query))} onClear={() => setQuery(withoutFilters(query))} />
      ) : (
        <table className={`table pass-table${query.settings ? ' with-settings' : ''}`}>
          <caption className="visually-hidden">Passes of {car.name}</caption>
          <HeadRow columns={columns} query={query} hrefOf={hrefOf} onSort={setQuery} />
          <PassRows passes={passes.data?.passes ?? []} car={car} units={units} withSettings={query.settings} />
        </table>
      )}
      {passes.data && <Pager page={passes.data} query={query} hrefOf={hrefOf} onPage={turn} />}
    </div>
  );
}

function countText(page: PassPage | undefined, { lowPct, highPct }: Band): string {
  if (!page) return '';
  return `${page.total === 1 ? '1 pass' : `${page.total} passes`}. The band is ${lowPct} to ${highPct} %.`;
}

function Nothing({ href, onClear }: { href: string; onClear: () => void }) {
  return (
    <div className="empty">
      <p>No pass of this car is like that.</p>
      <p>
        <a
          className="btn"
          href={href}
          onClick={(event) => {
            event.preventDefault();
            onClear();
          }}
        >
          Show all passes
        </a>
      </p>
    </div>
  );
}

function usePasses(query: TableQuery, data: TableData) {
  const params = apiParams(query, data.timeZone);
  const first = JSON.stringify(params) === JSON.stringify(apiParams(data.query, data.timeZone));
  return useQuery({
    queryKey: ['passes', params],
    queryFn: ({ signal }) => api<PassPage>(`/api/passes?${new URLSearchParams(params)}`, { signal }),
    placeholderData: keepPreviousData,
    ...(first ? { initialData: data.page } : {}),
  });
}

/** The query lives in the address: it can be sent to someone, and Back works. */
function useAddress(data: TableData): [TableQuery, (next: TableQuery) => void] {
  const [query, setQuery] = useState(data.query);
  useEffect(() => {
    const follow = () => setQuery(queryFromParams(new URLSearchParams(location.search), data.firstCarId));
    // Back may have been pressed before this page came alive.
    follow();
    addEventListener('popstate', follow);
    return () => removeEventListener('popstate', follow);
  }, [data.firstCarId]);
  const go = (next: TableQuery) => {
    history.pushState(null, '', addressOf(next, data.firstCarId));
    setQuery(next);
  };
  return [query, go];
}
