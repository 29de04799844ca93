import { useEffect, useState } from 'react';

/** The value as it was once it had stayed the same for a while: no call for every press of a step button. */
export function useLater<T>(value: T, waitMs: number): T {
  const [later, setLater] = useState(value);
  useEffect(() => {
    const timer = setTimeout(() => setLater(value), waitMs);
    return () => clearTimeout(timer);
  }, [value, waitMs]);
  return later;
}
