/** How a pass reads: plain functions for the table in the browser and the pages of the server. */
import { wallClock } from '@/components/conditions/zone';
import { formatNumber, NO_VALUE } from '@/lib/domain/display';
import type { Band, Outcome } from '@/lib/domain/types';

export const OUTCOME_LABEL: Record<Outcome, string> = {
  clean: 'Clean',
  shake: 'Shake',
  smoke: 'Smoke',
  aborted: 'Aborted',
};

export const LANE_LABEL = { left: 'Left', right: 'Right' } as const;

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** "May 3, 2026" at the track. By hand, so that server and every browser write the same. */
export function dayAt(instant: string, timeZone: string): string {
  const [year, month, day] = wallClock(new Date(instant), timeZone).slice(0, 10).split('-').map(Number);
  return `${MONTHS[(month ?? 1) - 1]} ${day}, ${year}`;
}

/** "2:05 PM" at the track. */
export function clockAt(instant: string, timeZone: string): string {
  const [hour = 0, minute = 0] = wallClock(new Date(instant), timeZone).slice(11).split(':').map(Number);
  return `${hour % 12 || 12}:${String(minute).padStart(2, '0')} ${hour < 12 ? 'AM' : 'PM'}`;
}

export type SlipPlace = 'below' | 'band' | 'above';
export const PLACE_WORD: Record<SlipPlace, string> = { below: 'below', band: 'in band', above: 'above' };

/** Where a slip lies against the band; the edges belong to it. Null when it was not measured. */
export function slipPlace(slipPct: number | null, { lowPct, highPct }: Band): SlipPlace | null {
  if (slipPct === null) return null;
  if (slipPct < lowPct) return 'below';
  return slipPct > highPct ? 'above' : 'band';
}

/** Elapsed time over the car's distance, and the name of its sort. */
export const ET_OF: Record<number, { field: 'eighthS' | 'thousandFtS' | 'quarterS'; label: string }> = {
  660: { field: 'eighthS', label: '660 ft' },
  1000: { field: 'thousandFtS', label: '1000 ft' },
  1320: { field: 'quarterS', label: '1320 ft' },
};

export const etOf = (distanceFt: number) => ET_OF[distanceFt] ?? ET_OF[660]!;

export const seconds = (value: number | null): string => formatNumber(value, 3);
export const slipText = (slipPct: number | null): string =>
  slipPct === null ? NO_VALUE : `${formatNumber(slipPct, 1)} %`;

export interface SettingLabel {
  key: string;
  label: string;
  unit: string;
}

/** "Counterweight 10.5 g": the settings in the car's order; one the car no longer has keeps its key. */
export function settingTexts(settings: Readonly<Record<string, number>>, labels: readonly SettingLabel[]): string[] {
  const known = labels.filter(({ key }) => settings[key] !== undefined);
  const others = Object.keys(settings).filter((key) => !labels.some((label) => label.key === key));
  return [
    ...known.map(({ key, label, unit }) => `${label} ${settings[key]} ${unit}`.trim()),
    ...others.map((key) => `${key} ${settings[key]}`),
  ];
}
