export type Maybe = number | null | undefined;
type Numbers<T extends readonly Maybe[]> = { -readonly [K in keyof T]: number };

/**
 * Applies a formula when every input is a finite number, and lets only a finite result out: a missing or impossible
 * input gives null, never NaN or Infinity.
 */
export function given<const T extends readonly Maybe[]>(
  inputs: T,
  formula: (...values: Numbers<T>) => number | null,
): number | null {
  if (!inputs.every(isFiniteNumber)) return null;
  const result = formula(...(inputs as unknown as Numbers<T>));
  return isFiniteNumber(result) ? result : null;
}

export const isFiniteNumber = (value: Maybe): value is number => typeof value === 'number' && Number.isFinite(value);

const BISECTION_STEPS = 80; // halves a 300-degree bracket below one double-precision step

/** Where an increasing function passes through zero between `low` and `high`; the nearer end when it does not. */
export function rootOfIncreasing(f: (x: number) => number, low: number, high: number): number {
  let [below, above] = [low, high];
  for (let step = 0; step < BISECTION_STEPS; step++) {
    const middle = (below + above) / 2;
    if (f(middle) < 0) below = middle;
    else above = middle;
  }
  return (below + above) / 2;
}
