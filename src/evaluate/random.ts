export interface Random {
  uniform(low: number, high: number): number;
  normal(mean: number, sd: number): number;
  /** Inclusive bounds. */
  integer(low: number, high: number): number;
}

/** mulberry32 (T. Ettinger, public domain) with Box-Muller normals: small, seeded, the same on every machine. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return {
    uniform: (low, high) => low + (high - low) * next(),
    normal: (mean, sd) => mean + sd * Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    integer: (low, high) => low + Math.floor(next() * (high - low + 1)),
  };
}
