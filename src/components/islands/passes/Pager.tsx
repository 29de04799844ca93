import type { TableQuery } from '@/components/passes/table-query';
import type { PassPage } from '@/lib/server/passes';
import { followed } from './follow';

interface PagerProps {
  page: PassPage;
  query: TableQuery;
  hrefOf: (query: TableQuery) => string;
  onPage: (query: TableQuery) => void;
}

/** Steps through the pages; nothing when there is only one. */
export function Pager({ page, query, hrefOf, onPage }: PagerProps) {
  const last = Math.ceil(page.total / page.limit);
  if (last <= 1) return null;
  const step = (to: number, label: string) => {
    const next = { ...query, page: to };
    return (
      <a className="btn btn-quiet" href={hrefOf(next)} onClick={followed(() => onPage(next))}>
        {label}
      </a>
    );
  };
  return (
    <nav className="pager" aria-label="Pages of passes">
      {query.page > 1 ? step(query.page - 1, 'Previous') : <span />}
      <span className="num">
        {page.offset + 1} to {Math.min(page.offset + page.limit, page.total)} of {page.total}
      </span>
      {query.page < last ? step(query.page + 1, 'Next') : <span />}
    </nav>
  );
}
