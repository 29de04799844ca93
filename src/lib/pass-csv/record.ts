import { conditionsFromReading } from '@/lib/domain/air/conditions';
import type { PassRecord } from '@/lib/domain/types';
import type { PassCsvData } from './types';

/** Identity of a pass: importing the same one twice for a car adds nothing. Tracks are the same whatever their case. */
export function passKey(carId: string, row: Pick<PassCsvData, 'passNo' | 'time' | 'track'>): string {
  return JSON.stringify([carId, row.passNo, row.time, row.track.toLowerCase()]);
}

/** A row as the model sees it. An altimeter setting becomes station pressure with the row's altitude, or null without one. */
export function toPassRecord(row: PassCsvData): PassRecord {
  return {
    id: `${row.passNo}@${row.time}`,
    passNo: row.passNo,
    event: row.event,
    track: row.track,
    time: row.time,
    round: row.round,
    lane: row.lane,
    conditions: conditionsFromReading(row),
    settings: row.settings,
    runsOnDiscs: row.runsOnDiscs,
    slipPct: row.slipPct,
    slipSdPct: null,
    sixtyFtS: row.sixtyFtS,
    outcome: row.outcome,
    excluded: row.excluded,
  };
}
