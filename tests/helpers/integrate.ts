/** Composite Simpson with enough points for smooth densities: an independent check, not fast. */
export function integrate(f: (x: number) => number, from: number, to: number, intervals = 4000): number {
  const h = (to - from) / intervals;
  let sum = f(from) + f(to);
  for (let i = 1; i < intervals; i++) sum += (i % 2 === 1 ? 4 : 2) * f(from + i * h);
  return (sum * h) / 3;
}
