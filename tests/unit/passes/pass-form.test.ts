import { describe, expect, it } from 'vitest';
import { columnGuide } from '@/components/passes/column-guide';
import { historyOf } from '@/components/passes/history';
import { changedBody, formOfPass, namedAsInputs, passBody } from '@/components/passes/pass-form';
import { sampleRows } from '@/components/passes/sample-file';
import { DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { exportPassCsv, parsePassCsv } from '@/lib/pass-csv';
import type { PassView } from '@/lib/server/passes';

const rounds = [{ id: 'r1', timeZone: 'America/Denver' }];
const base: PassView = {
  ...{ id: 'row-1', rootId: 'row-1', correctsId: null, carId: 'car', roundId: 'r1', readingId: null, passNo: 7 },
  ...{
    runAt: '2026-05-03T20:05:33.000Z',
    lane: 'left',
    settings: { launch_rpm: 7400 },
    runsOnDiscs: 2,
    discSetId: null,
  },
  ...{ slipPct: 15.2, slipSdPct: null, slipSource: 'measured', sixtyFtS: 0.871, threeThirtyFtS: null, eighthS: 3.1 },
  ...{ eighthMps: 95.1234567, thousandFtS: null, quarterS: null, quarterMps: null, outcome: 'clean', excluded: false },
  ...{ excludedReason: null, correctionReason: null, notes: '', source: 'hand', enteredBy: 'u', clientId: null },
  ...{
    createdAt: '2026-05-03T20:06:00.000Z',
    eventId: 'e',
    eventName: 'Spring Meet',
    trackId: 't',
    trackName: 'Strip',
  },
  ...{ timeZone: 'America/Denver', roundName: 'Q1', enteredByName: 'Ana', current: true },
  conditions: { airTempC: null, relativeHumidity: null, stationPressurePa: null, trackTempC: null },
  densityAltitudeM: null,
} as PassView;

describe('the pass form', () => {
  it('sends the wall clock of the track as an instant', () => {
    const body = passBody({ roundId: 'r1', runAtLocal: '2026-05-03T14:05', slipPct: '15' }, rounds);
    expect(body).toEqual({ roundId: 'r1', slipPct: '15', runAt: '2026-05-03T20:05:00.000Z' });
  });

  it('names the field when round or time is missing', () => {
    expect(() => passBody({ roundId: 'x', runAtLocal: '2026-05-03T14:05' }, rounds)).toThrow('Choose the round');
    expect(() => passBody({ roundId: 'r1', runAtLocal: '' }, rounds)).toThrow('date and time');
    expect(namedAsInputs({ runAt: 'a', slipPct: 'b' })).toEqual({ runAtLocal: 'a', slipPct: 'b' });
  });

  it.each(['us', 'metric'] as const)('a correction of one value changes nothing else, in %s units', (units) => {
    const shown = formOfPass(base, units);
    const { 'settings.launch_rpm': rpm, ...flat } = shown;
    const raw = { ...flat, settings: { launch_rpm: rpm }, slipPct: '14.8', reason: 'misread' };
    expect(changedBody(raw, shown, rounds)).toEqual({ slipPct: '14.8', reason: 'misread' });
  });

  it('sends a changed setting alone, and a cleared one as blank', () => {
    const shown = formOfPass(base, 'us');
    const raw = { settings: { launch_rpm: '' }, runAtLocal: shown.runAtLocal, reason: 'not set' };
    expect(changedBody(raw, shown, rounds)).toEqual({ settings: { launch_rpm: '' }, reason: 'not set' });
  });

  it('refuses a correction that corrects nothing', () => {
    const shown = formOfPass(base, 'us');
    expect(() =>
      changedBody({ ...shown, settings: undefined, 'settings.launch_rpm': '7400', reason: 'x' }, shown, rounds),
    ).toThrow('Nothing differs');
  });
});

describe('historyOf', () => {
  const labels = [{ key: 'launch_rpm', label: 'Launch rpm', unit: 'rpm' }];

  it('tells what happened, the newest first, with what changed', () => {
    const corrected = {
      ...base,
      id: 'row-2',
      correctsId: 'row-1',
      slipPct: 14.8,
      settings: { launch_rpm: 7450 },
      correctionReason: 'misread',
    };
    const out = { ...corrected, id: 'row-3', correctsId: 'row-2', excluded: true, correctionReason: 'wet' };
    const entries = historyOf([base, corrected, out], labels, 'us');
    expect(entries.map(({ what, reason }) => [what, reason])).toEqual([
      ['Left out of the model', 'wet'],
      ['Corrected', 'misread'],
      ['Logged by hand', null],
    ]);
    expect(entries[1]?.changes).toEqual(['Slip from 15.2 % to 14.8 %', 'Launch rpm from 7400 rpm to 7450 rpm']);
    expect(entries[0]?.changes).toEqual([]);
  });

  it('says what was added and taken out', () => {
    const changed = { ...base, id: 'row-2', sixtyFtS: null, quarterS: 6.1, settings: {}, notes: 'x' };
    expect(historyOf([base, changed], labels, 'us')[0]?.changes).toEqual([
      '60 ft 0.871 s taken out',
      '1320 ft 6.100 s added',
      'Notes changed',
      'Launch rpm 7400 rpm taken out',
    ]);
  });
});

describe('what the import page tells about files', () => {
  it.each(['us', 'metric'] as const)('the file to fill in is read back whole, in %s units', (units) => {
    const parsed = parsePassCsv(
      exportPassCsv(sampleRows(DEFAULT_ADJUSTABLES), DEFAULT_ADJUSTABLES, units),
      DEFAULT_ADJUSTABLES,
    );
    expect(parsed).toMatchObject({ refused: [], unknownColumns: [], fileError: null });
    expect(parsed.rows.map(({ passNo, outcome }) => [passNo, outcome])).toEqual([
      [1, 'clean'],
      [2, 'aborted'],
    ]);
  });

  it('explains every column the sample has, the needed ones first', () => {
    const guide = columnGuide(DEFAULT_ADJUSTABLES);
    const header = exportPassCsv([], DEFAULT_ADJUSTABLES, 'us').trim().split(',');
    expect(header.length).toBeGreaterThan(20);
    const named = new Set(guide.flatMap(({ names }) => names));
    expect(header.filter((name) => !named.has(name))).toEqual([]);
    expect(guide.slice(0, 4).every(({ required }) => required)).toBe(true);
  });
});
