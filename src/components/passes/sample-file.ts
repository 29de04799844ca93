/** Two invented rows in the car's own columns: a file to fill in. */
import type { Adjustable } from '@/lib/domain/types';
import type { PassCsvData } from '@/lib/pass-csv';

const FIRST: Omit<PassCsvData, 'settings'> = {
  passNo: 1,
  event: 'Sample Meet',
  track: 'Sample Dragway',
  time: '2026-05-02T20:05:00.000Z',
  utcOffset: '-06:00',
  round: 'Q1',
  lane: 'left',
  airTempC: 26,
  relativeHumidity: 0.35,
  dewPointC: null,
  wetBulbC: null,
  pressurePa: 84_500,
  pressureKind: 'station',
  altitudeM: 1500,
  trackTempC: 45,
  windMps: null,
  windDirDeg: null,
  runsOnDiscs: 2,
  slipPct: 14.6,
  sixtyFtS: 0.872,
  threeThirtyFtS: 2.21,
  eighthS: 3.14,
  eighthMps: 125.2,
  thousandFtS: null,
  quarterS: null,
  quarterMps: null,
  outcome: 'clean',
  excluded: false,
  excludedReason: '',
  notes: 'Invented: replace these rows with your own',
};

/** The second was aborted, so most of its cells are blank: blank is "not measured". */
export function sampleRows(adjustables: readonly Adjustable[]): PassCsvData[] {
  const settings = Object.fromEntries(adjustables.map((one) => [one.key, middle(one)]));
  const second = {
    ...FIRST,
    ...{ passNo: 2, round: 'Q2', time: '2026-05-02T22:40:00.000Z', lane: 'right' as const, runsOnDiscs: 3, notes: '' },
    ...{ slipPct: null, sixtyFtS: null, threeThirtyFtS: null, eighthS: null, eighthMps: null },
    outcome: 'aborted' as const,
  };
  return [
    { ...FIRST, settings },
    { ...second, settings },
  ];
}

function middle({ low, high, step }: Adjustable): number {
  const steps = Math.round((high - low) / 2 / step);
  return Number((low + steps * step).toFixed(6));
}
