import { describe, expect, it } from 'vitest';
import { clock, dateSpan, dayAndClock, duration, fromNow, zoneName } from '@/components/site/times';

const NOW = new Date('2026-05-02T15:00:00.000Z');
const DENVER = 'America/Denver';
const MIN = 60_000;

describe('times on screen', () => {
  it('are the clock at the track, through summer time', () => {
    expect(clock('2026-05-02T20:05:00.000Z', DENVER)).toBe('2:05 PM');
    expect(clock('2026-12-02T20:05:00.000Z', DENVER)).toBe('1:05 PM');
    expect(zoneName('2026-05-02T20:05:00.000Z', DENVER)).toBe('MDT');
  });

  it('say the day when it is not today at the track', () => {
    expect(dayAndClock('2026-05-02T20:05:00.000Z', DENVER, NOW)).toBe('2:05 PM');
    // 03:00 UTC on the 3rd is still the 2nd in Denver.
    expect(dayAndClock('2026-05-03T03:00:00.000Z', DENVER, NOW)).toBe('9:00 PM');
    expect(dayAndClock('2026-05-03T20:05:00.000Z', DENVER, NOW)).toBe('Sun, May 3, 2:05 PM');
    expect(dayAndClock('2025-05-03T20:05:00.000Z', DENVER, NOW)).toBe('May 3, 2025, 2:05 PM');
  });

  it.each([
    ['2026-05-02', '2026-05-02', 'May 2, 2026'],
    ['2026-05-02', '2026-05-04', 'May 2 to 4, 2026'],
    ['2026-05-30', '2026-06-01', 'May 30 to Jun 1, 2026'],
    ['2025-12-30', '2026-01-01', 'Dec 30, 2025 to Jan 1, 2026'],
  ])('an event from %s to %s is %s', (start, end, text) => {
    expect(dateSpan(start, end)).toBe(text);
  });

  it.each([
    [0, '0 min'],
    [48 * MIN, '48 min'],
    [89 * MIN, '89 min'],
    [90 * MIN, '1 h 30 min'],
    [120 * MIN, '2 h'],
    [(2 * 60 - 0.4) * MIN, '2 h'],
    [72 * 60 * MIN, '3 days'],
    [-5 * MIN, '0 min'],
  ])('%d ms is %s', (ms, text) => {
    expect(duration(ms)).toBe(text);
  });

  it('tells past from future', () => {
    const shifted = (ms: number) => new Date(NOW.getTime() + ms).toISOString();
    expect(fromNow(shifted(-12 * MIN), NOW)).toBe('12 min ago');
    expect(fromNow(shifted(48 * MIN), NOW)).toBe('in 48 min');
    expect(fromNow(shifted(20_000), NOW)).toBe('just now');
  });
});
