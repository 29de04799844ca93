import { GENERATORS, type SimulatedSeason, simulateSeason } from '@/evaluate/generators';
import type { RunContext } from '@/lib/domain/types';

/** A simulated season by generator name; throws on an unknown name. */
export function season(name: string, seed = 1): SimulatedSeason {
  const options = GENERATORS.find((g) => g.name === name);
  if (!options) throw new Error(`No generator ${name}`);
  return simulateSeason(options, seed);
}

/** The circumstances of a pass, as if it were still to be run. */
export function contextOf(s: SimulatedSeason, index: number): RunContext {
  const { event, track, time, round, lane, conditions, runsOnDiscs } = s.passes[index]!;
  return { event, track, time, round, lane, conditions, runsOnDiscs };
}
