import { describe, expect, test } from 'vitest';
import { sunElevationDeg } from '@/lib/domain/air/sun';
import { clearShare, sunDrive, UNKNOWN_SKY } from '@/lib/domain/model/sun-drive';
import { covariance, type DrivenReading, foretell } from '@/lib/domain/model/sun-driven';
import { TRACK_ABOVE_AIR, type TrackReading, trackTempAt } from '@/lib/domain/model/track-temperature';
import { normalCdf } from '@/lib/domain/stats/special';
import { diurnalSeason } from '../../helpers/diurnal';
import { integrate } from '../../helpers/integrate';

const PLACE = { latitudeDeg: 33.5, longitudeDeg: -86.2 };
/** Local noon is about 17:45 UTC there. */
const at = (hourUtc: number, day = 15): string => new Date(Date.UTC(2026, 4, day, 0, hourUtc * 60)).toISOString();
const reading = (hourUtc: number, over: Partial<TrackReading> = {}): TrackReading => ({
  ...PLACE,
  track: 'Low',
  time: at(hourUtc),
  airTempC: 26,
  trackTempC: 45,
  cloud: 0.2,
  ...over,
});
const ask = (hourUtc: number, readings: readonly TrackReading[], cloud: number | null = null) =>
  trackTempAt({ ...PLACE, track: 'Low', time: at(hourUtc), cloud }, readings)!;

describe('how hard the sun drives', () => {
  test('cloud lets through what Kasten and Czeplak say, and an unknown sky is their average', () => {
    expect([clearShare(0), clearShare(1)]).toEqual([1, 0.25]);
    const mean = integrate(clearShare, 0, 1);
    expect(UNKNOWN_SKY.mean).toBeCloseTo(mean, 6);
    expect(UNKNOWN_SKY.sd).toBeCloseTo(Math.sqrt(integrate((c) => (clearShare(c) - mean) ** 2, 0, 1)), 6);
  });

  test('nothing at night, most a little after noon, less under cloud', () => {
    const drive = (h: number, cloud: number | null = 0) => sunDrive(at(h), PLACE, cloud, 1)!;
    expect(drive(6).mean).toBe(0);
    const noon = Math.sin((sunElevationDeg(at(17.75), PLACE.latitudeDeg, PLACE.longitudeDeg)! * Math.PI) / 180);
    expect(drive(18.5).mean).toBeGreaterThan(0.97 * noon);
    expect(drive(18.5).mean).toBeLessThan(noon);
    expect(drive(18.5).mean).toBeGreaterThan(drive(15).mean);
    expect(drive(18.5, 0.9).mean).toBeLessThan(0.6 * drive(18.5).mean);
    expect(drive(18.5).sd).toBe(0);
    expect(drive(18.5, null).sd).toBeGreaterThan(0.1);
  });

  test('no place, no answer', () => {
    expect(sunDrive(at(18), { latitudeDeg: null, longitudeDeg: 0 }, 0, 1)).toBeNull();
    expect(trackTempAt({ ...PLACE, latitudeDeg: null, track: 'Low', time: at(18), cloud: null }, [])).toBeNull();
    expect(trackTempAt({ ...PLACE, track: 'Low', time: 'tomorrow', cloud: null }, [])).toBeNull();
  });
});

describe('the conditional normal', () => {
  const priors = TRACK_ABOVE_AIR;
  const point = (track: string, hours: number, mean: number) => ({ track, hours, drive: { mean, sd: 0 } });
  const target = point('A', 14, 0.8);
  const readings: DrivenReading[] = [
    { ...point('A', 10, 0.5), valueC: 14 },
    { ...point('A', 12, 0.75), valueC: 20 },
    { ...point('B', 12, 0.7), valueC: 12 },
  ];
  const expected = (drive: number) => priors.offset + priors.gain * drive;

  test('one reading: the textbook formula', () => {
    const [only] = readings;
    const own = covariance(only!, only!, priors) + priors.readingSd ** 2;
    const link = covariance(only!, target, priors);
    const slope = link / own;
    const away = only!.valueC - expected(0.5);
    const width = Math.sqrt((10 + away ** 2 / own) / 11);
    const got = foretell([only!], target, priors);
    expect(got.meanC).toBeCloseTo(expected(0.8) + slope * away, 10);
    const spread = covariance(target, target, priors) + priors.readingSd ** 2 - slope * link;
    expect(got.sdC).toBeCloseTo(Math.sqrt(spread) * width, 10);
  });

  test('three readings at once equal taking them one after the other', () => {
    // Sequential updating of (readings, target): the joint normal conditioned on one member at a time.
    const members = [...readings, target];
    const size = members.length;
    const cov = members.map((a, i) =>
      members.map((b, j) => covariance(a, b, priors) + (i === j ? priors.readingSd ** 2 : 0)),
    );
    const mean = members.map((m) => expected(m.drive.mean));
    let surprise = 0;
    readings.forEach((r, k) => {
      const error = r.valueC - mean[k]!;
      const variance = cov[k]![k]!;
      surprise += error ** 2 / variance;
      const gain = cov.map((row) => row[k]! / variance);
      for (let i = 0; i < size; i++) mean[i]! += gain[i]! * error;
      const old = cov[k]!.slice();
      for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) cov[i]![j]! -= gain[i]! * old[j]!;
    });
    const got = foretell(readings, target, priors);
    expect(got.meanC).toBeCloseTo(mean[3]!, 9);
    expect(got.sdC).toBeCloseTo(Math.sqrt(cov[3]![3]! * ((10 + surprise) / 13)), 9);
  });
});

describe('works with little', () => {
  test('no history: the assumptions alone, widely', () => {
    const none = ask(18.5, []);
    expect(none.latest).toBeNull();
    expect(none.leadHours).toBeNull();
    expect(none.readingsUsed).toBe(0);
    expect(none.sdC).toBeGreaterThan(9);
    expect(none.meanC).toBeGreaterThan(25);
    expect(none.meanC).toBeLessThan(60);
    expect(none.meanC - none.airMeanC).toBeGreaterThan(ask(8, []).meanC - ask(8, []).airMeanC + 8);
  });

  test('one reading today carries most of what can be known for an hour', () => {
    const one = ask(18.5, [reading(17.5)]);
    expect(one.sdC).toBeLessThan(0.45 * ask(18.5, []).sdC);
    expect(one.leadHours).toBeCloseTo(1, 9);
    expect(Math.abs(one.meanC - 45)).toBeLessThan(3);
    expect(one.latest!.trackTempC).toBe(45);
  });

  test('readings without track temperature, air temperature or a place are passed over', () => {
    const poor = [
      reading(16, { trackTempC: null }),
      reading(16.2, { airTempC: null }),
      reading(16.4, { latitudeDeg: null }),
    ];
    expect(ask(18, poor).readingsUsed).toBe(0);
    expect(Number.isFinite(ask(18, poor).meanC)).toBe(true);
  });

  test('nothing read after the planned time counts', () => {
    const before = [reading(16)];
    expect(ask(18, [...before, reading(18.5, { trackTempC: 60 }), reading(20)])).toEqual(ask(18, before));
  });

  test('the same instant, elsewhere in the day: another track counts only through what tracks share', () => {
    const here = ask(18, [reading(17, { trackTempC: 56 })]).meanC;
    const there = ask(18, [reading(17, { trackTempC: 56, track: 'High' })]).meanC;
    const none = ask(18, []).meanC;
    expect(here).toBeGreaterThan(there + 2);
    expect(there).toBeGreaterThan(none);
  });
});

describe('as the lead time grows', () => {
  const history = diurnalSeason(5, 12);
  const readings = [...history.filter((r) => r.time < at(0)), reading(15.5)];

  test.each([
    ['with history', readings],
    ['with one reading', [reading(15.5)]],
  ])('sd grows, %s', (_, known) => {
    const sds = [15.75, 16, 16.5, 17, 18, 19, 20].map((h) => ask(h, known).sdC);
    expect([...sds].sort((a, b) => a - b)).toEqual(sds);
    expect(sds[6]! / sds[0]!).toBeGreaterThan(1.3);
  });

  test("today's departure fades", () => {
    const hot = [...history.filter((r) => r.time < at(0)), reading(15.5, { trackTempC: 55 })];
    const departure = [15.75, 17, 19, 21].map((h) => ask(h, hot).meanC - ask(h, readings).meanC);
    expect(departure[0]).toBeGreaterThan(6);
    expect([...departure].sort((a, b) => b - a)).toEqual(departure);
  });

  test('morning to noon warms, afternoon to night cools', () => {
    expect(ask(18.5, [reading(14.5, { trackTempC: 34, airTempC: 22 })]).meanC).toBeGreaterThan(37);
    expect(ask(26, [reading(20, { trackTempC: 50, airTempC: 31 })]).meanC).toBeLessThan(38);
  });

  test('cloud coming up cools', () => {
    expect(ask(18.5, readings, 1).meanC).toBeLessThan(ask(18.5, readings, 0).meanC - 4);
    expect(ask(18.5, readings)).toEqual(ask(18.5, readings, 0.2));
  });
});

describe('on simulated days the range holds', () => {
  const results = [1, 2, 3, 4].flatMap((seed) => {
    const season = diurnalSeason(seed, 22, seed % 2 === 0);
    return season.flatMap((target, i) =>
      [1, 2].flatMap((back) => {
        const past = season.slice(0, Math.max(0, i - back + 1));
        const forecast = trackTempAt({ ...target, cloud: null }, past)!;
        if (!forecast.latest || i < 10) return [];
        const error = target.trackTempC! - forecast.meanC;
        return [
          { share: normalCdf(error / forecast.sdC), error, stay: target.trackTempC! - forecast.latest.trackTempC! },
        ];
      }),
    );
  });
  const within = (width: number) => results.filter((r) => Math.abs(r.share - 0.5) < width / 2).length / results.length;
  const rms = (values: number[]) => Math.sqrt(values.reduce((s, v) => s + v * v, 0) / values.length);

  test('50, 80 and 95 % ranges, a little on the wide side', () => {
    expect(results.length).toBeGreaterThan(400);
    expect(within(0.5)).toBeGreaterThan(0.46);
    expect(within(0.5)).toBeLessThan(0.66);
    expect(within(0.8)).toBeGreaterThan(0.77);
    expect(within(0.8)).toBeLessThan(0.93);
    expect(within(0.95)).toBeGreaterThan(0.93);
  });
  test('errors are well under half of those of "as it was at the last reading"', () => {
    expect(rms(results.map((r) => r.error))).toBeLessThan(0.45 * rms(results.map((r) => r.stay)));
  });
});
