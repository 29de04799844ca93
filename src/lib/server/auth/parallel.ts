/** Runs at most `max` tasks at once; up to `maxWaiting` wait their turn in order, more are refused with `tooMany()`. */
export function limitParallel(max: number, maxWaiting: number, tooMany: () => Error) {
  let running = 0;
  const waiting: (() => void)[] = [];

  const leave = () => {
    const next = waiting.shift();
    if (next) next();
    else running -= 1;
  };

  const enter = async (): Promise<void> => {
    if (running < max) {
      running += 1;
      return;
    }
    if (waiting.length >= maxWaiting) throw tooMany();
    await new Promise<void>((resolve) => waiting.push(resolve));
  };

  return async <T>(task: () => Promise<T>): Promise<T> => {
    await enter();
    try {
      return await task();
    } finally {
      leave();
    }
  };
}
