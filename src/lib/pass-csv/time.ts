const ISO = /^(\d{4})-(\d{2})-(\d{2})[T ](\d{2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?\s?(Z|[+-]\d{2}(?::?\d{2})?)?$/i;
const FIRST_YEAR = 1990;
const LAST_YEAR = 2100;
const MAX_OFFSET_MINUTES = 14 * 60;
const EXAMPLE = '2026-05-03T14:05:00-06:00';

export type TimeReading = { time: string; utcOffset: string } | { reason: string };

/** Reads ISO 8601 with an offset. A time without one is refused: it names no instant. */
export function readTime(cell: string): TimeReading {
  const parts = ISO.exec(cell);
  if (!parts) return { reason: `"${cell.slice(0, 40)}" is not a date and time. Write it as ${EXAMPLE}.` };
  const offset = parts[8]?.toUpperCase();
  if (!offset) return { reason: `"${cell}" has no offset from UTC. Add the track's, e.g. ${EXAMPLE}.` };
  const utcOffset = canonicalOffset(offset);
  const local = localMs(parts);
  const minutes = utcOffset === null ? null : offsetMinutes(utcOffset);
  if (utcOffset === null || minutes === null || local === null) {
    return { reason: `"${cell}" is not a time that exists. Check the day, hour and offset; an example is ${EXAMPLE}.` };
  }
  return { time: new Date(local - minutes * 60_000).toISOString(), utcOffset };
}

/** An instant as local time with its offset: "2026-05-03T14:05:00-06:00"; milliseconds only when there are any. */
export function writeTime(time: string, utcOffset: string): string {
  const minutes = offsetMinutes(utcOffset) ?? 0;
  const local = new Date(Date.parse(time) + minutes * 60_000).toISOString().slice(0, -1);
  return `${local.endsWith('.000') ? local.slice(0, -4) : local}${utcOffset}`;
}

function canonicalOffset(offset: string): string | null {
  if (offset === 'Z') return 'Z';
  const digits = offset.slice(1).replace(':', '').padEnd(4, '0');
  const text = `${offset[0]}${digits.slice(0, 2)}:${digits.slice(2)}`;
  return offsetMinutes(text) === null ? null : text;
}

function offsetMinutes(offset: string): number | null {
  if (offset === 'Z') return 0;
  const hours = Number(offset.slice(1, 3));
  const minutes = Number(offset.slice(4, 6));
  const total = hours * 60 + minutes;
  if (minutes > 59 || total > MAX_OFFSET_MINUTES) return null;
  return offset[0] === '-' ? -total : total;
}

/** Local wall-clock time as if it were UTC, ms; null when the date or time does not exist. */
function localMs(parts: RegExpExecArray): number | null {
  const [year, month, day, hour, minute, second] = parts.slice(1, 7).map((part) => Number(part ?? 0)) as SixNumbers;
  const millis = Number((parts[7] ?? '').slice(0, 3).padEnd(3, '0'));
  if (year < FIRST_YEAR || year > LAST_YEAR || hour > 23 || minute > 59 || second > 59) return null;
  const ms = Date.UTC(year, month - 1, day, hour, minute, second, millis);
  const date = new Date(ms);
  return date.getUTCMonth() === month - 1 && date.getUTCDate() === day ? ms : null;
}

type SixNumbers = [number, number, number, number, number, number];
