/** Which track and round a reading is most likely for. Pure, so that the rule can be read and tested. */
import { wallClock } from './zone';

interface Chooser {
  tracks: readonly { id: string }[];
  events: readonly { trackId: string; startsOn: string; endsOn: string; timeZone: string }[];
  /** Newest first. */
  recent: readonly { trackId: string }[];
  askedTrackId: string | null;
  now: Date;
}

export interface TrackChoice {
  trackId: string | null;
  trackIsGuess: boolean;
}

const DATE_LENGTH = 'yyyy-mm-dd'.length;

/** The calendar day at a place, yyyy-mm-dd. */
export const calendarDay = (now: Date, timeZone: string): string => wallClock(now, timeZone).slice(0, DATE_LENGTH);

/** The track asked for, else of today's event, else of the newest reading, else the first. The last two are guesses. */
export function chooseTrack({ tracks, events, recent, askedTrackId, now }: Chooser): TrackChoice {
  const known = new Set(tracks.map(({ id }) => id));
  const isOn = ({ startsOn, endsOn, timeZone }: Chooser['events'][number]): boolean => {
    const today = calendarDay(now, timeZone);
    return startsOn <= today && today <= endsOn;
  };
  const certain = [askedTrackId, ...events.filter(isOn).map(({ trackId }) => trackId)];
  const guessed = [recent[0]?.trackId, tracks[0]?.id];
  const pick = (ids: readonly (string | null | undefined)[]) => ids.find((id) => id != null && known.has(id)) ?? null;
  return { trackId: pick(certain) ?? pick(guessed), trackIsGuess: pick(certain) === null };
}

const STILL_NEXT_MS = 30 * 60_000;

interface PlannedRound {
  id: string;
  trackId: string;
  plannedAt: string | null;
}

/** The next planned round at a track; one that was due within the last half hour still counts. Null when none is planned. */
export function chooseRound(rounds: readonly PlannedRound[], trackId: string, now: Date): string | null {
  const due = now.getTime() - STILL_NEXT_MS;
  const coming = rounds
    .filter((round) => round.trackId === trackId && round.plannedAt !== null && Date.parse(round.plannedAt) >= due)
    .sort((a, b) => Date.parse(a.plannedAt ?? '') - Date.parse(b.plannedAt ?? ''));
  return coming[0]?.id ?? null;
}
