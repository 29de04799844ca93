import { DateTime } from 'luxon';

/** Times as a person at the track reads them: always in the track's zone, American style, and said when it is not today. */

const at = (instant: string, zone: string): DateTime => DateTime.fromISO(instant, { zone }).setLocale('en-US');

/** "2:35 PM" */
export const clock = (instant: string, zone: string): string => at(instant, zone).toFormat('h:mm a');

/** "Saturday, May 3" in a zone. */
export const today = (now: Date, zone: string): string =>
  DateTime.fromJSDate(now, { zone }).setLocale('en-US').toFormat('cccc, LLL d');

/** "2:35 PM" on the day itself, else "Sat, May 3, 2:35 PM", with the year when it is another. */
export function dayAndClock(instant: string, zone: string, now: Date): string {
  const time = at(instant, zone);
  const today = DateTime.fromJSDate(now, { zone });
  if (time.hasSame(today, 'day')) return time.toFormat('h:mm a');
  return time.toFormat(time.hasSame(today, 'year') ? 'ccc, LLL d, h:mm a' : 'LLL d, yyyy, h:mm a');
}

/** The zone as letters when it has them ("MDT"), else its offset. */
export const zoneName = (instant: string, zone: string): string => at(instant, zone).toFormat('ZZZZ');

/** Calendar dates of an event: "May 2, 2026", "May 2 to 4, 2026", "May 30 to Jun 1, 2026". */
export function dateSpan(startsOn: string, endsOn: string): string {
  const [start, end] = [at(startsOn, 'utc'), at(endsOn, 'utc')];
  if (startsOn === endsOn) return start.toFormat('LLL d, yyyy');
  if (!start.hasSame(end, 'year')) return `${start.toFormat('LLL d, yyyy')} to ${end.toFormat('LLL d, yyyy')}`;
  const endFormat = start.hasSame(end, 'month') ? 'd, yyyy' : 'LLL d, yyyy';
  return `${start.toFormat('LLL d')} to ${end.toFormat(endFormat)}`;
}

/** A length of time in the largest units that matter: "48 min", "3 h 5 min", "12 days". */
export function duration(ms: number): string {
  const minutes = Math.max(0, Math.round(ms / 60_000));
  if (minutes < 90) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  if (hours < 48) return minutes % 60 === 0 ? `${hours} h` : `${hours} h ${minutes % 60} min`;
  return `${Math.round(hours / 24)} days`;
}

/** "12 min ago", "in 48 min", "just now". */
export function fromNow(instant: string, now: Date): string {
  const ms = Date.parse(instant) - now.getTime();
  if (Math.abs(ms) < 60_000) return 'just now';
  return ms > 0 ? `in ${duration(ms)}` : `${duration(-ms)} ago`;
}
