import { can, type Right, type Role } from '@/lib/domain/permissions';

export type IconName =
  | 'today'
  | 'conditions'
  | 'passes'
  | 'suggestion'
  | 'sheet'
  | 'car'
  | 'track'
  | 'event'
  | 'team'
  | 'more';

export interface NavEntry {
  href: string;
  label: string;
  icon: IconName;
  right: Right;
}

const ENTRIES: readonly NavEntry[] = [
  { href: '/', label: 'Today', icon: 'today', right: 'team:view' },
  { href: '/conditions', label: 'Conditions', icon: 'conditions', right: 'reading:enter' },
  { href: '/passes', label: 'Passes', icon: 'passes', right: 'pass:view' },
  { href: '/suggestions', label: 'Suggestion', icon: 'suggestion', right: 'suggestion:view' },
  { href: '/sheet', label: 'Launch sheet', icon: 'sheet', right: 'sheet:view' },
  { href: '/events', label: 'Events', icon: 'event', right: 'team:view' },
  { href: '/cars', label: 'Cars', icon: 'car', right: 'car:view' },
  { href: '/tracks', label: 'Tracks', icon: 'track', right: 'team:view' },
  { href: '/team', label: 'Team', icon: 'team', right: 'team:view' },
];

const BAR_PLACES = 4;
/** What a driver does most comes first on the phone bar. */
const DRIVER_FIRST = ['/', '/sheet'];

/** Everything this role may open, in working order. */
export function navEntries(role: Role): NavEntry[] {
  return ENTRIES.filter((entry) => can(role, entry.right));
}

/** The phone bar holds four; the rest goes under "More". */
export function splitForBar(role: Role): { bar: NavEntry[]; more: NavEntry[] } {
  const entries = role === 'driver' ? driverOrder(navEntries(role)) : navEntries(role);
  return { bar: entries.slice(0, BAR_PLACES), more: entries.slice(BAR_PLACES) };
}

function driverOrder(entries: NavEntry[]): NavEntry[] {
  const first = entries.filter((entry) => DRIVER_FIRST.includes(entry.href));
  return [...first, ...entries.filter((entry) => !first.includes(entry))];
}

/** Whether a page belongs to an entry: /cars/abc belongs to Cars, but only / is Today. */
export function isCurrent(entry: NavEntry, pathname: string): boolean {
  if (entry.href === '/') return pathname === '/';
  return pathname === entry.href || pathname.startsWith(`${entry.href}/`);
}
