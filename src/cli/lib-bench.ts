/** Timing helpers of the bench: medians over repeated runs, on this machine, in this process. */
export interface Figure {
  name: string;
  /** Milliseconds, or the unit named. */
  value: number;
  unit: string;
  /** Goal it is judged by; null when it is only shown. */
  goal: number | null;
  note: string;
}

/** Median wall time in ms of `runs` calls after `warmUp` ones. */
export function medianMs(task: () => unknown, runs: number, warmUp = 2): number {
  for (let i = 0; i < warmUp; i++) task();
  const times = Array.from({ length: runs }, () => {
    const start = performance.now();
    task();
    return performance.now() - start;
  });
  return median(times);
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

export async function onceMs(task: () => Promise<unknown>): Promise<number> {
  const start = performance.now();
  await task();
  return performance.now() - start;
}

export function figuresTable(figures: readonly Figure[]): string {
  return figures
    .map((f) => {
      const value = `${f.value < 10 ? f.value.toFixed(2) : f.value.toFixed(0)} ${f.unit}`;
      const goal = f.goal === null ? '' : `goal ${f.goal} ${f.unit}, ${f.value <= f.goal ? 'met' : 'NOT met'}`;
      return `${f.name.padEnd(52)} ${value.padEnd(12)} ${goal.padEnd(26)} ${f.note}`.trimEnd();
    })
    .join('\n');
}
