import type { Column } from '@/components/passes/columns';
import { sortedBy, type TableQuery } from '@/components/passes/table-query';
import { followed } from './follow';

interface HeadRowProps {
  columns: readonly Column[];
  query: TableQuery;
  hrefOf: (query: TableQuery) => string;
  onSort: (query: TableQuery) => void;
}

const ARIA_SORT = { asc: 'ascending', desc: 'descending' } as const;
const ARROW = { asc: '↑', desc: '↓' } as const;

/** Every heading sorts: a link, so that it works without script. */
export function HeadRow({ columns, query, hrefOf, onSort }: HeadRowProps) {
  return (
    <thead>
      <tr>
        {columns.map(({ sort, label, unit, numeric }) => {
          const here = query.sort === sort;
          const next = sortedBy(query, sort);
          return (
            <th
              key={sort}
              scope="col"
              className={numeric ? 'num' : undefined}
              aria-sort={here ? ARIA_SORT[query.dir] : undefined}
            >
              <a href={hrefOf(next)} onClick={followed(() => onSort(next))}>
                <span>
                  {label}
                  {unit && <span className="unit"> {unit}</span>}
                </span>
                {here && <span aria-hidden="true">{ARROW[query.dir]}</span>}
              </a>
            </th>
          );
        })}
      </tr>
    </thead>
  );
}
