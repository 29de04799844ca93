import { DateTime, FixedOffsetZone, IANAZone } from 'luxon';
import type { PassCsvRow } from '@/lib/pass-csv';

type Stamp = Pick<PassCsvRow, 'time' | 'utcOffset'>;

/** Tried in this order: the first whose offset is that of the file at every pass. */
const COMMON_ZONES = [
  'America/New_York',
  'America/Chicago',
  'America/Denver',
  'America/Los_Angeles',
  'America/Phoenix',
  'America/Halifax',
  'America/Anchorage',
  'Pacific/Honolulu',
  'Europe/London',
  'Europe/Berlin',
  'Europe/Helsinki',
  'Asia/Riyadh',
  'Asia/Dubai',
  'Asia/Tokyo',
  'Australia/Perth',
  'Australia/Brisbane',
  'Australia/Sydney',
  'Australia/Adelaide',
  'Pacific/Auckland',
] as const;

/** A zone in which every time of a track's rows has the offset it was written with; UTC when there is none. A guess to check. */
export function guessTimeZone(stamps: readonly Stamp[]): string {
  const minutes = stamps.map(({ utcOffset }) => offsetMinutes(utcOffset));
  if (minutes.every((offset) => offset === 0)) return 'UTC';
  const fits = (zone: string): boolean => stamps.every(({ time }, i) => offsetAt(zone, time) === minutes[i]);
  return COMMON_ZONES.find(fits) ?? [fixedZone(minutes[0] ?? 0)].find((zone) => zone && fits(zone)) ?? 'UTC';
}

/** Calendar date at the track, yyyy-mm-dd, by the offset the time was written with. */
export function localDate({ time, utcOffset }: Stamp): string {
  const zone = FixedOffsetZone.instance(offsetMinutes(utcOffset));
  return DateTime.fromISO(time, { zone }).toFormat('yyyy-MM-dd');
}

/** Offset of a zone at an instant, as "-06:00" or "Z". */
export function utcOffsetAt(zone: string, time: string): string {
  const local = DateTime.fromISO(time, { zone });
  return !local.isValid || local.offset === 0 ? 'Z' : local.toFormat('ZZ');
}

const offsetAt = (zone: string, time: string): number => IANAZone.create(zone).offset(Date.parse(time));

function offsetMinutes(utcOffset: string): number {
  if (utcOffset === 'Z') return 0;
  const size = Number(utcOffset.slice(1, 3)) * 60 + Number(utcOffset.slice(4, 6));
  return utcOffset.startsWith('-') ? -size : size;
}

// In these names the sign is the other way round: Etc/GMT+6 is six hours behind UTC.
function fixedZone(minutes: number): string | null {
  const hours = minutes / 60;
  if (!Number.isInteger(hours)) return null;
  return `Etc/GMT${hours > 0 ? '-' : '+'}${Math.abs(hours)}`;
}
