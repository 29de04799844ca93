import type { SuggestionView } from '@/lib/server/suggestions';

/** A suggestion as its page shows it. */
export interface Shown {
  suggestion: SuggestionView;
  /** The launch sheet published with its decision; null before that, or when it was kept back. */
  sheet: { id: string; version: number; current: boolean } | null;
}
