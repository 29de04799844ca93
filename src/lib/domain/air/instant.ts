// A time without an offset would be read in the zone of whichever machine runs this.
const INSTANT = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:?\d{2})$/;

/** An ISO 8601 instant with offset as a Date; null when it is missing, has no offset or names no real time. */
export function parseInstant(time: string | null | undefined): Date | null {
  if (!time || !INSTANT.test(time)) return null;
  const date = new Date(time);
  return Number.isNaN(date.getTime()) ? null : date;
}

/** Whole or broken minutes between two instants, without sign. */
export function minutesBetween(a: string | null | undefined, b: string | null | undefined): number | null {
  const [first, second] = [parseInstant(a), parseInstant(b)];
  return first && second ? Math.abs(second.getTime() - first.getTime()) / 60_000 : null;
}
