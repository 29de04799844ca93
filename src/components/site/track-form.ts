import { formatNumber, toInputText, type UnitSystem } from '@/lib/domain/display';
import type { TrackView } from '@/lib/server/tracks';

/** The verbs take the altitude in either unit and store meters. */
export const altitudeField = (units: UnitSystem): 'altitudeFt' | 'altitudeM' =>
  units === 'us' ? 'altitudeFt' : 'altitudeM';

/** A stored track as its form shows it. */
export function trackValues(track: TrackView, units: UnitSystem): Record<string, unknown> {
  const { name, latitudeDeg, longitudeDeg, timeZone } = track;
  return {
    name,
    latitudeDeg,
    longitudeDeg,
    timeZone,
    [altitudeField(units)]: toInputText('altitude', track.altitudeM, units),
  };
}

/** "39.56° N, 105.21° W", or null while the position is open. */
export function positionText({ latitudeDeg, longitudeDeg }: TrackView): string | null {
  if (latitudeDeg === null || longitudeDeg === null) return null;
  return `${degrees(latitudeDeg, 'N', 'S')}, ${degrees(longitudeDeg, 'E', 'W')}`;
}

const degrees = (value: number, positive: string, negative: string): string =>
  `${formatNumber(Math.abs(value), 2)}\u00b0 ${value < 0 ? negative : positive}`;
