import type { pass } from '@/db/schema';
import { airSummary, conditionsFromReading } from '@/lib/domain/air/conditions';
import type { Conditions } from '@/lib/domain/types';
import type { ReadingRow } from '../lookup';
import type { JoinedPass } from './select';

export type PassRow = typeof pass.$inferSelect;

/** A pass as the screens and the API get it: SI, settings in each adjustable's own unit. `rootId` names it for good. */
export interface PassView extends Omit<PassRow, 'teamId'> {
  eventId: string;
  eventName: string;
  trackId: string;
  trackName: string;
  timeZone: string;
  roundName: string;
  enteredByName: string | null;
  /** False for a row that a later one has replaced. */
  current: boolean;
  conditions: Conditions;
  /** Of those conditions; derived each time, never stored. */
  densityAltitudeM: number | null;
}

export const NOT_MEASURED: Conditions = {
  airTempC: null,
  relativeHumidity: null,
  stationPressurePa: null,
  trackTempC: null,
};

export const conditionsOf = (reading: ReadingRow | null): Conditions =>
  reading ? conditionsFromReading(reading) : NOT_MEASURED;

export function passView(joined: JoinedPass): PassView {
  const { teamId: _team, ...row } = joined.pass;
  const conditions = conditionsOf(joined.reading);
  return {
    ...row,
    eventId: joined.event.id,
    eventName: joined.event.name,
    trackId: joined.track.id,
    trackName: joined.track.name,
    timeZone: joined.track.timeZone,
    roundName: joined.round.name,
    enteredByName: joined.enteredByName,
    current: joined.successorId === null,
    conditions,
    densityAltitudeM: airSummary(conditions).densityAltitudeM,
  };
}
