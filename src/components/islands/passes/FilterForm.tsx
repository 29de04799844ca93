import { type FormEvent, useEffect, useState } from 'react';
import { OUTCOME_LABEL } from '@/components/passes/pass-text';
import type { TableData } from '@/components/passes/table-data';
import { filterCount, type TableQuery } from '@/components/passes/table-query';
import { Field } from '@/components/ui/react/Field';
import { Select } from '@/components/ui/react/Select';
import type { Column } from './columns';

interface FilterFormProps {
  data: TableData;
  query: TableQuery;
  columns: readonly Column[];
  onChange: (query: TableQuery) => void;
}

const OUTCOMES = Object.entries(OUTCOME_LABEL).map(([value, label]) => ({ value, label }));
const COUNTS = [
  { value: 'false', label: 'Passes that count' },
  { value: 'true', label: 'Left out' },
];
const DIRECTIONS = [
  { value: 'asc', label: 'Ascending' },
  { value: 'desc', label: 'Descending' },
];

const named = (list: readonly { id: string; name: string }[]) =>
  list.map(({ id, name }) => ({ value: id, label: name }));

/** A GET form: with script each choice counts at once, without it the button sends them. */
export function FilterForm({ data, query, columns, onChange }: FilterFormProps) {
  const live = useHydrated();
  const set = (event: FormEvent<HTMLFormElement>) => {
    const { name, value, checked } = event.target as HTMLInputElement;
    onChange({ ...query, [name]: name === 'settings' ? checked : value, page: 1 });
  };
  const count = filterCount(query);
  // Only at first: a form that folds itself away while it is used is a nuisance.
  const [open] = useState(count > 0);
  return (
    <details className="filters" open={open}>
      <summary>
        Filter and sort
        {count > 0 && <span className="tag tag-strong">{count === 1 ? '1 filter' : `${count} filters`}</span>}
      </summary>
      <form
        method="get"
        action="/passes"
        onChange={set}
        onSubmit={live ? (event) => event.preventDefault() : undefined}
      >
        {data.cars.length > 1 && (
          <Select name="car" label="Car" options={named(data.cars)} value={query.car} onChange={none} />
        )}
        <Select
          name="event"
          label="Event"
          empty="All events"
          options={named(data.events)}
          value={query.event}
          onChange={none}
        />
        <Select
          name="track"
          label="Track"
          empty="All tracks"
          options={named(data.tracks)}
          value={query.track}
          onChange={none}
        />
        <Select name="outcome" label="Outcome" empty="Any" options={OUTCOMES} value={query.outcome} onChange={none} />
        <Select
          name="excluded"
          label="Counts in the model"
          empty="All"
          options={COUNTS}
          value={query.excluded}
          onChange={none}
        />
        <Field name="from" label="From" type="date" value={query.from} onChange={none} />
        <Field name="to" label="To" type="date" value={query.to} onChange={none} />
        <Select
          name="sort"
          label="Sort by"
          options={columns.map(({ sort, label }) => ({ value: sort, label }))}
          value={query.sort}
          onChange={none}
        />
        <Select name="dir" label="Order" options={DIRECTIONS} value={query.dir} onChange={none} />
        <label className="choice">
          <input type="checkbox" name="settings" value="1" checked={query.settings} onChange={none} />
          Show settings
        </label>
        {!live && (
          <button type="submit" className="btn">
            Show
          </button>
        )}
      </form>
    </details>
  );
}

// The form listens for all of them; React wants to hear that a value may change.
const none = () => undefined;

function useHydrated(): boolean {
  const [hydrated, setHydrated] = useState(false);
  useEffect(() => setHydrated(true), []);
  return hydrated;
}
