import type { CarView } from '@/lib/server/cars';
import type { SheetSummary, SheetView } from '@/lib/server/sheets';
import type { SuggestionView } from '@/lib/server/suggestions';

/** What a launch sheet page shows. */
export interface SheetShown {
  sheet: SheetView | null;
  sheets: SheetSummary[];
  /** For roles that may see odds; null for the driver. */
  suggestion: SuggestionView | null;
  cars: CarView[];
  car: CarView | null;
}
