/** Wall clock at the track in the browser: what datetime-local inputs show and post. The server uses luxon for the same. */

const PARTS: Intl.DateTimeFormatOptions = {
  year: 'numeric',
  month: '2-digit',
  day: '2-digit',
  hour: '2-digit',
  minute: '2-digit',
  second: '2-digit',
  hourCycle: 'h23',
};

/** "2026-05-03T14:05" at the track. */
export function wallClock(instant: Date, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-CA', { ...PARTS, timeZone }).formatToParts(instant);
  const get = (type: string) => parts.find((part) => part.type === type)?.value ?? '00';
  return `${get('year')}-${get('month')}-${get('day')}T${get('hour')}:${get('minute')}`;
}

/** The instant of a wall clock at the track, UTC ISO 8601; null when it is no date and time. */
export function instantOf(local: string, timeZone: string): string | null {
  const asUtc = Date.parse(`${local.slice(0, 16)}:00Z`);
  if (!/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}/.test(local) || Number.isNaN(asUtc)) return null;
  // The offset is asked twice: the first guess may fall on the other side of a clock change.
  const guess = asUtc - offsetMs(asUtc, timeZone);
  return new Date(asUtc - offsetMs(guess, timeZone)).toISOString();
}

function offsetMs(instantMs: number, timeZone: string): number {
  return Date.parse(`${wallClock(new Date(instantMs), timeZone)}:00Z`) - Math.floor(instantMs / 60_000) * 60_000;
}
