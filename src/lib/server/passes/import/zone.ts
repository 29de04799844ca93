import { DateTime, IANAZone } from 'luxon';
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
  const days = oneADay(stamps);
  if (days.every(({ utcOffset }) => offsetMinutes(utcOffset) === 0)) return 'UTC';
  const fits = (zone: string): boolean =>
    days.every(({ time, utcOffset }) => offsetAt(zone, time) === offsetMinutes(utcOffset));
  const fixed = fixedZone(offsetMinutes(days[0]?.utcOffset ?? 'Z'));
  return [...COMMON_ZONES, ...fixed].find(fits) ?? 'UTC';
}

// Asking a zone for its offset is slow, and one answer a day tells as much as fifty.
function oneADay(stamps: readonly Stamp[]): Stamp[] {
  return [...new Map(stamps.map((stamp) => [`${localDate(stamp)} ${stamp.utcOffset}`, stamp])).values()];
}

/** Calendar date at the track, yyyy-mm-dd, by the offset the time was written with. */
export function localDate({ time, utcOffset }: Stamp): string {
  return new Date(Date.parse(time) + offsetMinutes(utcOffset) * 60_000).toISOString().slice(0, 10);
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
function fixedZone(minutes: number): string[] {
  const hours = minutes / 60;
  return Number.isInteger(hours) ? [`Etc/GMT${hours > 0 ? '-' : '+'}${Math.abs(hours)}`] : [];
}
