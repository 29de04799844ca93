import { describe, expect, it } from 'vitest';
import { addedText, keepGoodLabel, planSummary } from '@/components/passes/import-text';
import { clockAt, dayAt, etOf, settingTexts, slipPlace, slipText } from '@/components/passes/pass-text';
import { roundJustRun } from '@/components/passes/round-just-run';

const band = { lowPct: 13, highPct: 17 };

describe('how a pass reads', () => {
  it('says where a slip lies; the edges belong to the band', () => {
    expect([12.9, 13, 15, 17, 17.1].map((slip) => slipPlace(slip, band))).toEqual([
      'below',
      'band',
      'band',
      'band',
      'above',
    ]);
    expect(slipPlace(null, band)).toBeNull();
    expect(slipText(null)).toBe('—');
  });

  it('writes day and clock at the track', () => {
    expect(dayAt('2026-05-04T05:05:00Z', 'America/Denver')).toBe('May 3, 2026');
    expect(clockAt('2026-05-04T05:05:00Z', 'America/Denver')).toBe('11:05 PM');
    expect(clockAt('2026-05-03T18:00:00Z', 'America/Denver')).toBe('12:00 PM');
    expect(clockAt('2026-05-03T06:00:00Z', 'America/Denver')).toBe('12:00 AM');
  });

  it('keeps a setting the car no longer has', () => {
    const labels = [{ key: 'launch_rpm', label: 'Launch rpm', unit: 'rpm' }];
    expect(settingTexts({ old_key: 3, launch_rpm: 7400 }, labels)).toEqual(['Launch rpm 7400 rpm', 'old_key 3']);
  });

  it('takes the elapsed time of the race distance', () => {
    expect([660, 1000, 1320].map((ft) => etOf(ft).field)).toEqual(['eighthS', 'thousandFtS', 'quarterS']);
  });
});

describe('roundJustRun', () => {
  const now = new Date('2026-05-03T18:00:00Z');
  const round = (name: string, plannedAt: string | null) => ({ name, plannedAt });
  const [q1, q2, q3] = [
    round('Q1', '2026-05-03T15:00:00Z'),
    round('Q2', '2026-05-03T17:30:00Z'),
    round('Q3', '2026-05-03T20:00:00Z'),
  ] as const;

  it('is the one that was due last', () => {
    expect(roundJustRun([q3, q2, q1], now)).toBe(q2);
    expect(roundJustRun([q1, q2, q3], new Date('2026-05-03T19:40:00Z'))).toBe(q3);
  });

  it('is the next one before the first, and the first listed when none is near', () => {
    expect(roundJustRun([q1, q2, q3], new Date('2026-05-03T08:00:00Z'))).toBe(q1);
    expect(roundJustRun([q2, q1], new Date('2026-06-01T08:00:00Z'))).toBe(q2);
    expect(roundJustRun([], now)).toBeNull();
  });
});

describe('an import in words', () => {
  it('counts one and many', () => {
    const counts = { rows: 4, added: 1, refused: 1, duplicates: 2, withoutSlip: 0 };
    expect(planSummary(counts)).toEqual([
      '1 pass will be added.',
      '1 row is refused.',
      '2 passes are in your log already and stay as they are.',
    ]);
    expect(planSummary({ ...counts, added: 0, refused: 0, duplicates: 0 })).toEqual(['Nothing will be added.']);
    expect(keepGoodLabel(counts)).toBe('Add the 1 pass that can be read and leave out the 1 row that cannot');
    expect(addedText(12, 0)).toBe('12 passes added.');
  });
});
