import type { CarView } from '@/lib/server/cars';
import type { ReadingView } from '@/lib/server/readings';
import type { RoundView } from '@/lib/server/rounds';
import type { CurrentSettings, OwnEstimateView } from '@/lib/server/suggestions';

/** Everything the asking form starts from. */
export interface Ask {
  now: Date;
  cars: CarView[];
  car: CarView | null;
  rounds: RoundView[];
  round: RoundView | null;
  readings: ReadingView[];
  current: CurrentSettings;
  runsOnDiscs: number | null;
  minutesLeft: number | null;
  estimate: OwnEstimateView | null;
}
