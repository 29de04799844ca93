import { tooMany } from '../errors';

/** After `free` failures the next try must wait, twice as long each time, up to `maxWaitS`. Quiet for a while, and all is forgotten. */
export interface LimitRule {
  free: number;
  firstWaitS: number;
  maxWaitS: number;
}

interface Failures {
  count: number;
  waitUntilMs: number;
  lastMs: number;
}

const FORGET_AFTER_MS = 30 * 60_000;
const MAX_KEYS = 20_000;

/**
 * Slows down guessing, in the memory of this process. There is no lock: after the wait the right password works, and tries during
 * a wait do not lengthen it.
 */
export class TryLimiter {
  private readonly failures = new Map<string, Failures>();

  constructor(private readonly nowMs: () => number = () => Date.now()) {}

  /**
   * Counts a try before it is checked, so that many at once cannot slip through; `clear` takes it back when it was right.
   * Throws TOO_MANY with the seconds to wait.
   */
  begin(rules: ReadonlyMap<string, LimitRule>): void {
    const now = this.nowMs();
    const waitMs = Math.max(0, ...[...rules.keys()].map((key) => this.current(key, now).waitUntilMs - now));
    if (waitMs > 0) {
      const seconds = Math.ceil(waitMs / 1000);
      throw tooMany(`Too many tries. Wait ${seconds} seconds and try again.`, seconds);
    }
    for (const [key, rule] of rules) this.count(key, rule, now);
  }

  clear(keys: Iterable<string>): void {
    for (const key of keys) this.failures.delete(key);
  }

  private current(key: string, now: number): Failures {
    const known = this.failures.get(key);
    if (known && now - known.lastMs < FORGET_AFTER_MS) return known;
    return { count: 0, waitUntilMs: 0, lastMs: now };
  }

  private count(key: string, rule: LimitRule, now: number): void {
    const count = this.current(key, now).count + 1;
    const waitS = count < rule.free ? 0 : Math.min(rule.maxWaitS, rule.firstWaitS * 2 ** (count - rule.free));
    this.failures.delete(key);
    this.failures.set(key, { count, waitUntilMs: now + waitS * 1000, lastMs: now });
    if (this.failures.size > MAX_KEYS) this.failures.delete(this.failures.keys().next().value as string);
  }
}
