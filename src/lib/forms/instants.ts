/** Times cross the edges as ISO 8601 and are stored in UTC; a track's wall clock needs the track's zone. */
import { DateTime } from 'luxon';

const WITH_OFFSET = /^\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(:\d{2}(\.\d{1,9})?)?(Z|[+-]\d{2}:?\d{2})$/i;
const FIRST_YEAR = 1990;
const LAST_YEAR = 2100;

/** An instant with its offset ("2026-05-03T14:05-06:00"), to UTC ISO 8601 with milliseconds and Z. Null when it is not one. */
export function parseInstant(value: string): string | null {
  const trimmed = value.trim();
  if (!WITH_OFFSET.test(trimmed)) return null;
  return utcIso(DateTime.fromISO(trimmed.replace(' ', 'T').toUpperCase(), { setZone: true }));
}

/** A wall-clock time as an `<input type="datetime-local">` posts it, read in an IANA zone, to UTC ISO 8601. Null when not one. */
export function zonedInstant(local: string, timeZone: string): string | null {
  if (!/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2})?$/.test(local.trim())) return null;
  return utcIso(DateTime.fromISO(local.trim(), { zone: timeZone }));
}

/** The reverse, for refilling the input: minutes precision. */
export const localInputValue = (instant: string, timeZone: string): string =>
  DateTime.fromISO(instant, { zone: timeZone }).toFormat("yyyy-MM-dd'T'HH:mm");

function utcIso(time: DateTime): string | null {
  if (!time.isValid || time.toUTC().year < FIRST_YEAR || time.toUTC().year > LAST_YEAR) return null;
  return time.toUTC().toISO();
}
