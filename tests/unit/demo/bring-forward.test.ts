import { describe, expect, test } from 'vitest';
import { generateDemoSeason } from '@/demo';
import { bringForward } from '@/demo/bring-forward';

const season = generateDemoSeason();

describe.each([
  '2026-12-01T00:10:00.000Z',
  '2026-12-01T23:50:00.000Z',
  '2027-06-15T16:00:00.000Z',
  '2026-06-01T12:00:00.000Z',
])('brought to %s', (now) => {
  const moved = bringForward(season, now);
  const open = moved.rounds.find((r) => r.ref === moved.next.roundRef)!;

  test('the open round is soon and its reading is fresh', () => {
    const reading = moved.readings.find((r) => r.ref === moved.next.readingRef)!;
    const age = (Date.parse(now) - Date.parse(reading.takenAt)) / 60_000;
    const left = (Date.parse(open.plannedAt) - Date.parse(now)) / 60_000;
    expect(age).toBe(9);
    expect(left).toBe(48);
  });

  test('nothing that was run lies ahead, and its order and time of day are kept', () => {
    moved.passes.forEach((p, i) => {
      expect(Date.parse(p.runAt)).toBeLessThan(Date.parse(now));
      expect(p.runAt.slice(10)).toBe(new Date(season.passes[i]!.runAt).toISOString().slice(10));
    });
    const later = moved.rounds.filter((r) => r.eventRef === open.eventRef && r.position > open.position);
    expect(later.length).toBeGreaterThan(0);
    for (const r of later) expect(Date.parse(r.plannedAt)).toBeGreaterThan(Date.parse(open.plannedAt));
  });

  test('the open event holds today or begins no later', () => {
    const event = moved.events.find((e) => e.ref === open.eventRef)!;
    expect(event.startsOn <= now.slice(0, 10)).toBe(true);
  });
});
