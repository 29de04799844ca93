import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { calendarDay, chooseRound, chooseTrack } from '@/components/conditions/where';
import { instantOf, wallClock } from '@/components/conditions/zone';

const now = new Date('2026-05-03T18:00:00Z');
const tracks = [{ id: 'a' }, { id: 'b' }, { id: 'c' }];
const event = (trackId: string, startsOn: string, endsOn: string) => ({
  trackId,
  startsOn,
  endsOn,
  timeZone: 'America/Denver',
});
const none = { tracks, events: [], recent: [], askedTrackId: null, now };

describe('chooseTrack', () => {
  it('prefers the asked one, then the event that is on, then the newest reading, then the first', () => {
    const today = [event('b', '2026-05-02', '2026-05-04')];
    const recent = [{ trackId: 'c' }];
    expect(chooseTrack({ ...none, events: today, recent, askedTrackId: 'a' })).toEqual({
      trackId: 'a',
      trackIsGuess: false,
    });
    expect(chooseTrack({ ...none, events: today, recent })).toEqual({ trackId: 'b', trackIsGuess: false });
    expect(chooseTrack({ ...none, recent })).toEqual({ trackId: 'c', trackIsGuess: true });
    expect(chooseTrack(none)).toEqual({ trackId: 'a', trackIsGuess: true });
    expect(chooseTrack({ ...none, tracks: [] })).toEqual({ trackId: null, trackIsGuess: true });
  });

  it('ignores a track that is none of the list, and an event that is over', () => {
    expect(chooseTrack({ ...none, askedTrackId: 'x', events: [event('b', '2026-05-01', '2026-05-02')] }).trackId).toBe(
      'a',
    );
  });

  it('takes the day at the track, not that of the server', () => {
    const lateEvening = new Date('2026-05-04T03:00:00Z');
    expect(calendarDay(lateEvening, 'America/Denver')).toBe('2026-05-03');
    const last = [event('b', '2026-05-03', '2026-05-03')];
    expect(chooseTrack({ ...none, events: last, now: lateEvening }).trackIsGuess).toBe(false);
  });
});

describe('chooseRound', () => {
  const round = (id: string, plannedAt: string | null, trackId = 'a') => ({ id, trackId, plannedAt });
  it('takes the next planned one of the track; one just due still counts', () => {
    const rounds = [
      round('later', '2026-05-03T20:00:00Z'),
      round('elsewhere', '2026-05-03T18:10:00Z', 'b'),
      round('unplanned', null),
      round('over', '2026-05-03T16:00:00Z'),
    ];
    expect(chooseRound(rounds, 'a', now)).toBe('later');
    expect(chooseRound([...rounds, round('due', '2026-05-03T17:45:00Z')], 'a', now)).toBe('due');
    expect(chooseRound([], 'a', now)).toBeNull();
  });
});

describe('the clock at the track', () => {
  const ZONES = ['America/Denver', 'America/New_York', 'UTC', 'Asia/Kolkata', 'Australia/Adelaide'];

  it('agrees with luxon and comes back, for any minute outside the hour a clock is put back', () => {
    const minute = fc.integer({ min: Date.parse('2015-01-01') / 60_000, max: Date.parse('2035-01-01') / 60_000 });
    fc.assert(
      fc.property(minute, fc.constantFrom(...ZONES), (minutes, zone) => {
        const instant = new Date(minutes * 60_000);
        const local = wallClock(instant, zone);
        expect(local).toBe(DateTime.fromJSDate(instant, { zone }).toFormat("yyyy-MM-dd'T'HH:mm"));
        const back = instantOf(local, zone);
        expect(back && wallClock(new Date(back), zone)).toBe(local);
      }),
      { numRuns: 300 },
    );
  });

  it('knows summer and winter, and refuses what is no time', () => {
    expect(instantOf('2026-07-01T12:00', 'America/Denver')).toBe('2026-07-01T18:00:00.000Z');
    expect(instantOf('2026-01-01T12:00', 'America/Denver')).toBe('2026-01-01T19:00:00.000Z');
    expect(instantOf('', 'America/Denver')).toBeNull();
    expect(instantOf('2026-13-40T99:00', 'America/Denver')).toBeNull();
  });
});
