import { MIN_PASSES } from '@/lib/domain/model/constants';
import { experienceOf } from '@/lib/domain/model/experience';
import { roundOfContext, runFeatures, trains } from '@/lib/domain/model/features';
import { type SessionPlan, sessionPlan, type TestRun, testRuns } from '@/lib/domain/model/session-design';
import { preparePasses, type TrainedModel, trainModel } from '@/lib/domain/model/train';
import type { Adjustable, RunContext, Settings } from '@/lib/domain/types';
import { suggestionInput } from '@/lib/forms/suggestion';
import { requireCan, type ServerContext } from '../context';
import { activeAdjustables, teamCar } from '../lookup';
import { loadPassRecords } from '../passes';
import { runContext } from './context';
import { settingsAsTheyStand } from './create';

/** What would teach most about the effects of a car's adjustables. */
export interface TestSession {
  passesUsed: number;
  passesNeeded: number;
  adjustables: Adjustable[];
  /** Plain names of conditions that the passes do not cover; then no run is proposed. */
  outsideVariables: readonly string[];
  /** Null with too few passes, or outside experience. */
  design: TestDesign | null;
}

export interface TestDesign {
  /** Single runs that teach most, best first; `hold` is a run as the car stands. */
  ranked: TestRun[];
  hold: TestRun;
  plan: SessionPlan;
}

/** Test runs for the circumstances and settings a suggestion would be asked for. Stores nothing. Throws NOT_FOUND or VALIDATION. */
export async function testSession(ctx: ServerContext, raw: unknown): Promise<TestSession> {
  requireCan(ctx, 'suggestion:view');
  const input = suggestionInput.parse(raw);
  const car = await teamCar(ctx, input.carId);
  const adjustables = await activeAdjustables(ctx, car.id);
  const current = await settingsAsTheyStand(ctx, input, adjustables);
  const { context } = await runContext(ctx, input);
  const passes = await loadPassRecords(ctx, car.id);
  const model = trainModel(preparePasses(passes), adjustables, { lowPct: car.bandLowPct, highPct: car.bandHighPct });
  return {
    passesUsed: passes.filter(trains).length,
    passesNeeded: MIN_PASSES,
    adjustables,
    ...(model ? designFor(model, context, current, input.minutesLeft) : { outsideVariables: [], design: null }),
  };
}

function designFor(
  model: TrainedModel,
  context: RunContext,
  settings: Settings,
  minutesLeft: number | null,
): Pick<TestSession, 'outsideVariables' | 'design'> {
  const ordered = model.prepared.map(({ pass }) => pass);
  const run = runFeatures({ ...context, settings }, roundOfContext(ordered, context));
  const trained = model.rows.map(({ features }) => features);
  const { outside, variables } = experienceOf(run, trained);
  if (outside) return { outsideVariables: variables, design: null };
  const options = { minutesLeft };
  return {
    outsideVariables: [],
    design: { ...testRuns(model, run, options), plan: sessionPlan(model, run, options) },
  };
}
