/** Questions a careful crew member would ask about a reading before it is used, naming the likely slip. */

import type { CheckContext, ReadingCheck } from './checks/check';
import { humidityChecks } from './checks/humidity';
import { jumpChecks } from './checks/jump';
import { pressureChecks } from './checks/pressure';
import { temperatureChecks } from './checks/temperature';
import type { RawReading } from './conditions';

export type { CheckContext, ReadingCheck, ReadingField } from './checks/check';

/**
 * What is wrong or odd about a reading, impossible things first; at most one line per field. A reading without its own altitude is judged with
 * the track's. Empty when nothing stands out.
 */
export function readingChecks(reading: RawReading, context: CheckContext): ReadingCheck[] {
  const full = { ...reading, altitudeM: reading.altitudeM ?? context.altitudeM };
  const found = [
    ...temperatureChecks(full, context),
    ...humidityChecks(full, context),
    ...pressureChecks(full, context),
    ...jumpChecks(full, context),
  ];
  return onePerField([...found.filter(isImpossible), ...found.filter((check) => !isImpossible(check))]);
}

const isImpossible = (check: ReadingCheck): boolean => check.level === 'impossible';

/** Whether a reading with these checks must be refused. */
export const mustRefuse = (checks: readonly ReadingCheck[]): boolean => checks.some(isImpossible);

function onePerField(checks: readonly ReadingCheck[]): ReadingCheck[] {
  const seen = new Set<string>();
  return checks.filter(({ field }) => !seen.has(field) && seen.add(field));
}
