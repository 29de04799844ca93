import type { PressureKind } from '@/lib/domain/air/pressure';
import type { Lane, Outcome, Settings } from '@/lib/domain/types';

/** The part of a pass file's row that says what was read before the pass. SI; null is "not measured". */
export interface PassReading {
  airTempC: number | null;
  /** Fraction 0-1. At most one of the three humidities is set: the one that was read. */
  relativeHumidity: number | null;
  dewPointC: number | null;
  wetBulbC: number | null;
  pressurePa: number | null;
  /** Null exactly when `pressurePa` is. */
  pressureKind: PressureKind | null;
  altitudeM: number | null;
  trackTempC: number | null;
  windMps: number | null;
  /** Degrees from north the wind comes from. */
  windDirDeg: number | null;
}

/** What a pass file holds of one pass: SI, settings in each adjustable's own unit, text as written. */
export interface PassCsvData extends PassReading {
  passNo: number;
  event: string;
  track: string;
  /** UTC instant, ISO 8601 with milliseconds and a Z. */
  time: string;
  /** Offset the time was written with: "Z" or "+hh:mm" / "-hh:mm". */
  utcOffset: string;
  round: string;
  lane: Lane | null;
  /** Own unit of each adjustable; a missing key is "not recorded". */
  settings: Settings;
  runsOnDiscs: number | null;
  slipPct: number | null;
  sixtyFtS: number | null;
  threeThirtyFtS: number | null;
  eighthS: number | null;
  eighthMps: number | null;
  thousandFtS: number | null;
  quarterS: number | null;
  quarterMps: number | null;
  outcome: Outcome | null;
  excluded: boolean;
  excludedReason: string;
  notes: string;
}

export interface PassCsvRow extends PassCsvData {
  /** Line in the file where the row begins; the first line is 1. */
  rowNumber: number;
}

/** Why a row was not read. A row with several faults has one refusal for each column. */
export interface Refusal {
  row: number;
  /** Null when the fault is in the row as a whole. */
  column: string | null;
  reason: string;
}

export interface ParsedPassFile {
  rows: PassCsvRow[];
  refused: Refusal[];
  /** Columns of the file that were ignored, as written. */
  unknownColumns: string[];
  /** Expected columns, adjustables included, that the file does not have. */
  missingColumns: string[];
  /** Plain sentences: how the file was understood. */
  notes: string[];
  /** Set when nothing could be read: the message names the fix. Then there are no rows. */
  fileError: string | null;
}
