import { describe, expect, it } from 'vitest';
import { airLines, type Place, stationNote } from '@/components/conditions/live';
import { problemsOf } from '@/components/conditions/problems';
import { type FormValues, readForm } from '@/components/conditions/reading-form';
import { NO_VALUE } from '@/lib/domain/display';

const place: Place = { name: 'High Strip', altitudeM: 1770, latitudeDeg: 39.6, longitudeDeg: -105.2, previous: null };
const takenAt = '2026-06-20T18:00:00.000Z';
const usual: FormValues = {
  airTempF: '84',
  humidityKind: 'relativeHumidity',
  relativeHumidityPct: '30',
  pressureInHg: '24.4',
  pressureKind: 'station',
  trackTempF: '120',
};

const problems = (change: FormValues) => problemsOf({ ...usual, ...change }, { place, takenAt, units: 'us' });

/** The form after the offered tap. */
function fixed(change: FormValues, key: string): FormValues {
  const fix = problems(change).find((problem) => problem.key === key)?.fix;
  expect(fix, `a fix for ${key}`).toBeTruthy();
  return { ...usual, ...change, ...fix?.set };
}

describe('problemsOf', () => {
  it('asks nothing about an ordinary reading', () => {
    expect(problems({})).toEqual([]);
  });

  it.each([
    [
      'a sea-level pressure taken for the station',
      { pressureInHg: '29.95' },
      'pressurePa',
      { pressureKind: 'altimeter' },
    ],
    [
      'a station pressure taken for an altimeter setting',
      { pressureKind: 'altimeter' },
      'pressurePa',
      { pressureKind: 'station' },
    ],
    ['hPa in a field of inHg', { pressureInHg: '826' }, 'pressurePa', { pressureInHg: '24.3918' }],
    ['°C in a field of °F', { airTempF: '29' }, 'airTempC', { airTempF: '84.2' }],
    [
      'a fraction in a field of percent',
      { relativeHumidityPct: '0.45' },
      'relativeHumidity',
      { relativeHumidityPct: '45' },
    ],
  ])('offers one tap for %s', (_what, change, key, set) => {
    expect(fixed(change, key)).toMatchObject(set);
    expect(problemsOf(fixed(change, key), { place, takenAt, units: 'us' }).filter((one) => one.key === key)).toEqual(
      [],
    );
  });

  it('offers to swap air and track when that settles it', () => {
    expect(fixed({ airTempF: '113', trackTempF: '84' }, 'trackTempC')).toMatchObject({
      airTempF: '84',
      trackTempF: '113',
    });
  });

  it('offers the tap although the reading before was wrong, and none that the reading before speaks against', () => {
    const earlier = {
      ...{ airTempC: 29, relativeHumidity: 0.3, dewPointC: null, wetBulbC: null, trackTempC: 49 },
      ...{ pressurePa: 80_000, pressureKind: 'station' as const, altitudeM: 1770, takenAt: '2026-06-20T17:40:00.000Z' },
    };
    const near = { place: { ...place, previous: earlier }, takenAt, units: 'us' as const };
    const askedWith = (change: FormValues) => problemsOf({ ...usual, ...change }, near);
    expect(askedWith({ pressureInHg: '29.95' })[0]?.fix?.set).toEqual({ pressureKind: 'altimeter' });
    expect(askedWith({ airTempF: '110' }).find(({ key }) => key === 'airTempC')).toMatchObject({
      blocks: false,
      fix: null,
    });
  });

  it('offers nothing where no guess helps', () => {
    const [problem] = problems({ humidityKind: 'dewPointC', dewPointF: '99', airTempF: '84' });
    expect(problem).toMatchObject({ key: 'dewPointC', blocks: true, kind: 'impossible', fix: null });
  });

  it('blocks what is no number and what cannot be, not what is only unlikely', () => {
    expect(problems({ airTempF: 'x' })[0]).toMatchObject({ key: 'airTempC', blocks: true, kind: 'not-a-number' });
    expect(problems({ airTempF: '900' })[0]).toMatchObject({ key: 'airTempC', blocks: true, kind: 'impossible' });
    expect(problems({ pressureInHg: '29.95' })[0]).toMatchObject({ blocks: false, kind: 'unlikely' });
  });
});

describe('what is shown live', () => {
  const lines = (values: FormValues) =>
    Object.fromEntries(
      airLines(readForm(values, 'us').reading, place, takenAt, 'us').map(({ key, value }) => [key, value]),
    );

  it('shows a dash for what the typed values do not give yet', () => {
    const shown = lines({ airTempF: '84' });
    expect(shown).toMatchObject({ densityAltitude: NO_VALUE, grains: NO_VALUE, dewPoint: NO_VALUE });
    expect(shown.sun).toMatch(/^\d\d°$/);
  });

  it('shows every derived number of a whole reading', () => {
    expect(Object.values(lines(usual))).not.toContain(NO_VALUE);
  });

  it('says what an altimeter setting is at the station, and nothing under a station pressure', () => {
    const note = (change: FormValues) => stationNote(readForm({ ...usual, ...change }, 'us').reading, place, 'us');
    expect(note({})).toBe('');
    expect(note({ pressureKind: 'altimeter', pressureInHg: '29.92' })).toBe(
      "= 24.16 inHg at the station, from the track's altitude 5,807 ft.",
    );
  });

  it('asks for the altitude of a track that has none, beside other questions and their fixes', () => {
    const low = { ...place, altitudeM: null };
    const values = { ...usual, pressureKind: 'altimeter', pressureInHg: '29.92', airTempF: '29' };
    expect(stationNote(readForm(values, 'us').reading, low, 'us')).toBe('');
    const found = problemsOf(values, { place: low, takenAt, units: 'us' });
    expect(found.find(({ key }) => key === 'pressurePa')).toMatchObject({ blocks: true, fix: null });
    expect(found.find(({ key }) => key === 'airTempC')?.fix?.set).toEqual({ airTempF: '84.2' });
  });
});
