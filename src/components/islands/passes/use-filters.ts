import { useEffect } from 'react';
import { filterCount, filterText, queryFromParams, type TableQuery } from '@/components/passes/table-query';

/**
 * The filter form is the server's own (it works without script); here its choices count at once, and it follows the query when
 * that is changed elsewhere. A React twin of it would cost the page more script than the table itself.
 */
export function useFilters(query: TableQuery, carId: string, go: (next: TableQuery) => void): void {
  useEffect(() => {
    const form = filterForm();
    if (!form) return;
    const changed = () => go({ ...queryFromParams(paramsOf(form), carId), page: 1 });
    const submitted = (event: Event) => event.preventDefault();
    form.querySelector<HTMLElement>('[data-without-script]')?.setAttribute('hidden', '');
    form.addEventListener('change', changed);
    form.addEventListener('submit', submitted);
    return () => {
      form.removeEventListener('change', changed);
      form.removeEventListener('submit', submitted);
    };
  });
  useEffect(() => show(query), [query]);
}

const filterForm = (): HTMLFormElement | null => document.querySelector('form#pass-filters');

const paramsOf = (form: HTMLFormElement): URLSearchParams =>
  new URLSearchParams([...new FormData(form)].map(([name, value]) => [name, String(value)]));

function show(query: TableQuery): void {
  const form = filterForm();
  for (const control of form?.elements ?? []) {
    if (control instanceof HTMLInputElement && control.type === 'checkbox') control.checked = query.settings;
    else if (control instanceof HTMLInputElement || control instanceof HTMLSelectElement)
      control.value = String(query[control.name as keyof TableQuery]);
  }
  const tag = document.querySelector<HTMLElement>('[data-filter-count]');
  if (!tag) return;
  tag.textContent = filterText(filterCount(query));
  tag.hidden = filterCount(query) === 0;
}
