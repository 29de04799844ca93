import { useEffect, useRef, useState } from 'react';
import type { SettingSpec } from '@/components/suggestion/settings';
import type { Typed } from './stepping';

/** Typed settings as state. What somebody typed before the script ran, or the browser restored, is kept. */
export function useTyped(initial: Typed, specs: readonly SettingSpec[]) {
  const [typed, setTyped] = useState(initial);
  const [ready, setReady] = useState(false);
  const inputs = useRef(new Map<string, HTMLInputElement>());
  useEffect(() => {
    const shown = specs.map((spec) => [spec.key, inputs.current.get(spec.key)?.value ?? ''] as const);
    setTyped(Object.fromEntries(shown));
    setReady(true);
  }, [specs]);
  const refFor = (key: string) => (element: HTMLInputElement | null) => {
    if (element) inputs.current.set(key, element);
  };
  const setOne = (key: string, text: string) => setTyped((before) => ({ ...before, [key]: text }));
  return { typed, setTyped, setOne, ready, refFor };
}
