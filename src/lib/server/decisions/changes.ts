import type { Adjustable, SettingChange, Settings } from '@/lib/domain/types';

/** The clutch is stripped first and takes longest; the launch is set on the way to the lanes. */
const WORK_ORDER: Record<Adjustable['group'], number> = { clutch: 0, launch: 1 };

/** What has to be changed on the car, in work order. `steps` is the nearest whole number of steps. */
export function changeList(current: Settings, final: Settings, adjustables: readonly Adjustable[]): SettingChange[] {
  return [...adjustables]
    .sort((a, b) => WORK_ORDER[a.group] - WORK_ORDER[b.group])
    .flatMap((one) => change(one, current[one.key], final[one.key]));
}

function change({ key, step, minutes }: Adjustable, from: number | undefined, to: number | undefined): SettingChange[] {
  if (from === undefined || to === undefined || from === to) return [];
  return [{ key, from, to, steps: Math.round((to - from) / step), minutes }];
}
