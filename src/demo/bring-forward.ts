import type { DemoReading, DemoRound, DemoSeason } from './types';

const MINUTE_MS = 60_000;
const DAY_MS = 24 * 60 * MINUTE_MS;
/** How old the open round's reading is when the demo begins, and how long until the round is run. */
const READING_AGE_MIN = 9;
const TIME_TO_RUN_MIN = 48;

/**
 * The same season, moved by whole days so that its open round is today's: whoever starts the demo meets a fresh reading and a
 * round to run soon. Times of day of what has been run stay as they were.
 * @param now UTC instant, ISO 8601
 */
export function bringForward(season: DemoSeason, now: string): DemoSeason {
  const { next, passes } = season;
  const nowMs = Date.parse(now);
  const newest = Math.max(...passes.map((p) => Date.parse(p.runAt)));
  const days = wholeDays(next.at, nowMs, newest);
  const shifted = (iso: string): string => instant(Date.parse(iso) + days * DAY_MS);
  const readingAt = instant(nowMs - READING_AGE_MIN * MINUTE_MS);
  const planned = plannedTimes(season, nowMs + TIME_TO_RUN_MIN * MINUTE_MS, shifted);
  return {
    ...season,
    events: season.events.map((e) => ({
      ...e,
      startsOn: dayAfter(e.startsOn, days),
      endsOn: dayAfter(e.endsOn, days),
    })),
    rounds: season.rounds.map((r) => ({ ...r, plannedAt: planned(r) })),
    readings: season.readings.map(
      (r): DemoReading => ({ ...r, takenAt: r.ref === next.readingRef ? readingAt : shifted(r.takenAt) }),
    ),
    passes: passes.map((p) => ({ ...p, runAt: shifted(p.runAt) })),
    next: { ...next, at: now },
  };
}

/** As many days as bring the open round to today, and never a pass into the future. */
function wholeDays(openAt: string, nowMs: number, newestPassMs: number): number {
  const days = Math.floor(nowMs / DAY_MS) - Math.floor(Date.parse(openAt) / DAY_MS);
  const latest = nowMs - READING_AGE_MIN * MINUTE_MS;
  return Math.min(days, Math.floor((latest - newestPassMs) / DAY_MS));
}

/** Rounds still to be run keep their distances from the open one; the others move by days. */
function plannedTimes(
  season: DemoSeason,
  openMs: number,
  shifted: (iso: string) => string,
): (round: DemoRound) => string {
  const open = season.rounds.find((r) => r.ref === season.next.roundRef);
  if (!open) throw new Error('The open round is missing from the demo season.');
  return (round) => {
    const toRun = round.eventRef === open.eventRef && round.position >= open.position;
    return toRun
      ? instant(openMs + Date.parse(round.plannedAt) - Date.parse(open.plannedAt))
      : shifted(round.plannedAt);
  };
}

const instant = (ms: number): string => new Date(ms).toISOString();

const dayAfter = (day: string, days: number): string =>
  instant(Date.parse(`${day}T00:00:00Z`) + days * DAY_MS).slice(0, 10);
