import type { LaterRun, SuggestionView } from '@/lib/server/suggestions';

/** A suggestion as its page shows it. */
export interface Shown {
  suggestion: SuggestionView;
  /** The launch sheet published with its decision; null before that, or when it was kept back. */
  sheet: { id: string; version: number; current: boolean } | null;
  /** The forecast at the planned time; null when the run is soon after the reading, or nothing can be said of it. */
  later: LaterRun | null;
}
