import { CONDITION_COLUMNS } from './reserved';

/** Rules between the fields of a car or an adjustable. Each returns field name to message; empty when all is well. */
type Problems = Record<string, string>;

interface CarNumbers {
  bandLowPct: number;
  bandHighPct: number;
  slipWindowStartS: number;
  slipWindowEndS: number;
}

export function carProblems(car: CarNumbers): Problems {
  const problems: Problems = {};
  if (car.bandLowPct >= car.bandHighPct) problems.bandHighPct = 'The high edge of the band must be above the low edge.';
  if (car.slipWindowStartS >= car.slipWindowEndS) problems.slipWindowEndS = 'The slip window must end after it starts.';
  return problems;
}

interface AdjustableNumbers {
  key: string;
  step: number;
  low: number;
  high: number;
  beliefMeanPct: number | null;
  beliefSdPct: number | null;
}

export function adjustableProblems(adjustable: AdjustableNumbers): Problems {
  const { key, step, low, high, beliefMeanPct, beliefSdPct } = adjustable;
  const problems: Problems = {};
  if (CONDITION_COLUMNS.has(key)) problems.key = `${key} is a column of the pass file already. Choose another key.`;
  if (low >= high) problems.high = 'The high limit must be above the low limit.';
  else if (step > high - low) problems.step = 'The step must fit between the limits.';
  if (beliefMeanPct === null && beliefSdPct !== null)
    problems.beliefMeanPct = 'Enter the effect of one step too, or leave both open.';
  if (beliefMeanPct !== null && beliefSdPct === null)
    problems.beliefSdPct = 'Say how sure you are: enter the give or take too, or leave both open.';
  return problems;
}
