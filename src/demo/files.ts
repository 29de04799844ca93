import { adjustablesToJson, DEFAULT_ADJUSTABLES } from '@/lib/domain/default-adjustables';
import { cToF, mpsToMph, mToFt, paToInHg } from '@/lib/domain/units';
import { exportPassCsv, type PassCsvData } from '@/lib/pass-csv';
import { writeTime } from '@/lib/pass-csv/time';
import type { DemoReading, DemoSeason } from './types';

const SMALL_PASSES = 24;

/** The passes of the demo season as a pass file holds them. */
export function demoPassRows(season: DemoSeason): PassCsvData[] {
  const rounds = byRef(season.rounds);
  const events = byRef(season.events);
  const tracks = byRef(season.tracks);
  const readings = byRef(season.readings);
  return season.passes.map((pass) => {
    const round = found(rounds, pass.roundRef);
    const event = found(events, round.eventRef);
    const {
      airTempC,
      relativeHumidity,
      dewPointC,
      wetBulbC,
      pressurePa,
      pressureKind,
      altitudeM,
      trackTempC,
      windMps,
      windDirDeg,
    } = found(readings, pass.readingRef);
    const {
      ref: _,
      roundRef: __,
      readingRef: ___,
      runAt,
      discSetRef: ____,
      slipSource: _____,
      source: ______,
      ...rest
    } = pass;
    return {
      ...rest,
      ...{
        airTempC,
        relativeHumidity,
        dewPointC,
        wetBulbC,
        pressurePa,
        pressureKind,
        altitudeM,
        trackTempC,
        windMps,
        windDirDeg,
      },
      event: event.name,
      track: found(tracks, event.trackRef).name,
      time: runAt,
      round: round.name,
      quarterS: null,
      quarterMps: null,
      excludedReason: pass.excludedReason ?? '',
    };
  });
}

/** Example files made from a season: name to content. */
export function demoFiles(season: DemoSeason): Record<string, string> {
  const rows = demoPassRows(season);
  return {
    'demo-season.csv': exportPassCsv(rows, season.adjustables, 'us'),
    'sample-small.csv': exportPassCsv(rows.slice(0, SMALL_PASSES), season.adjustables, 'us'),
    'conditions.json': jsonText(conditionsJson(season)),
    'adjustables.json': jsonText(adjustablesToJson(DEFAULT_ADJUSTABLES)),
  };
}

const jsonText = (data: unknown): string => `${JSON.stringify(data, null, 2)}\n`;

/** The conditions file of the suggest command for the round the demo waits for. */
function conditionsJson(season: DemoSeason): Record<string, unknown> {
  const { next } = season;
  const round = found(byRef(season.rounds), next.roundRef);
  const event = found(byRef(season.events), round.eventRef);
  return {
    event: event.name,
    track: found(byRef(season.tracks), event.trackRef).name,
    date_time: writeTime(next.at, next.utcOffset),
    round: round.name,
    lane: round.lane,
    ...readingJson(found(byRef(season.readings), next.readingRef)),
    runs_on_discs: next.runsOnDiscs,
    current: next.current,
    minutes_left: next.minutesLeft,
  };
}

function readingJson(reading: DemoReading): Record<string, number | null> {
  const rounded = (value: number | null, convert: (si: number) => number, decimals: number) =>
    value === null ? null : Number(convert(value).toFixed(decimals));
  return {
    air_temp_f: rounded(reading.airTempC, cToF, 1),
    relative_humidity_pct: rounded(reading.relativeHumidity, (fraction) => fraction * 100, 0),
    station_pressure_inhg: rounded(reading.pressurePa, paToInHg, 2),
    altitude_ft: rounded(reading.altitudeM, mToFt, 0),
    track_temp_f: rounded(reading.trackTempC, cToF, 1),
    wind_mph: rounded(reading.windMps, mpsToMph, 0),
    wind_dir_deg: reading.windDirDeg,
  };
}

const byRef = <T extends { ref: string }>(items: readonly T[]): Map<string, T> =>
  new Map(items.map((item) => [item.ref, item]));

function found<T>(items: ReadonlyMap<string, T>, ref: string): T {
  const item = items.get(ref);
  if (!item) throw new Error(`The season names something that is not in it: ${ref}`);
  return item;
}
