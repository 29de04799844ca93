import { describe, expect, it } from 'vitest';
import {
  addressOf,
  apiParams,
  filterCount,
  queryFromParams,
  sortedBy,
  withoutFilters,
} from '@/components/passes/table-query';

const read = (search: string) => queryFromParams(new URLSearchParams(search), 'car-1');

describe('the table in the address', () => {
  it.each([
    '/passes',
    '/passes?car=car-2',
    '/passes?outcome=smoke&excluded=true&from=2026-05-01&to=2026-05-03',
    '/passes?sort=slipPct&dir=asc&page=3&settings=1',
  ])('%s comes back the same', (address) => {
    expect(addressOf(read(address.split('?')[1] ?? ''), 'car-1')).toBe(address);
  });

  it('starts with the newest, and with the smallest of any other column', () => {
    expect(read('')).toMatchObject({ sort: 'runAt', dir: 'desc', page: 1, car: 'car-1' });
    expect(read('sort=slipPct')).toMatchObject({ sort: 'slipPct', dir: 'asc' });
    expect(read('page=-4').page).toBe(1);
    expect(read('page=x').page).toBe(1);
  });

  it('turns the order of the same column and starts another one on page 1', () => {
    const slip = sortedBy({ ...read(''), page: 4 }, 'slipPct');
    expect(slip).toMatchObject({ sort: 'slipPct', dir: 'asc', page: 1 });
    expect(sortedBy(slip, 'slipPct').dir).toBe('desc');
    expect(sortedBy(slip, 'runAt').dir).toBe('desc');
  });

  it('counts and clears filters, keeping car and order', () => {
    const query = read('car=car-2&event=e&outcome=smoke&sort=slipPct');
    expect(filterCount(query)).toBe(2);
    expect(withoutFilters(query)).toMatchObject({ car: 'car-2', event: '', outcome: '', sort: 'slipPct' });
    expect(filterCount(withoutFilters(query))).toBe(0);
  });
});

describe('apiParams', () => {
  it('asks for whole days at the track and for one page', () => {
    const params = apiParams(read('from=2026-05-01&to=2026-05-01&page=2'), 'America/Denver');
    expect(params).toMatchObject({
      carId: 'car-1',
      from: '2026-05-01T06:00:00.000Z',
      to: '2026-05-02T05:59:59.999Z',
      limit: '50',
      offset: '50',
    });
    expect(params).not.toHaveProperty('eventId');
  });

  it('hands on a day that is none, so that the server names the fault', () => {
    expect(apiParams(read("from=' OR 1=1"), 'America/Denver').from).toBe("' OR 1=1");
  });
});
