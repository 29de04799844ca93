/** From the posted form to the verb, for a page without script. */
import type { UnitSystem } from '@/lib/domain/display';
import { zonedInstant } from '@/lib/forms/instants';
import { validationError } from '@/lib/server/errors';
import type { EntryTrack } from './page-data';
import { type FormValues, readForm } from './reading-form';

/** The body of the readings verb (SI). Throws VALIDATION under the names of the inputs. */
export function readingBody(
  values: FormValues,
  tracks: readonly EntryTrack[],
  units: UnitSystem,
): Record<string, unknown> {
  const { reading, errors } = readForm(values, units);
  const time = timeOf(values, tracks);
  const all = time.error ? { ...errors, takenAtLocal: time.error } : errors;
  const first = Object.values(all)[0];
  if (first !== undefined) throw validationError(first, all);
  return {
    ...reading,
    takenAt: time.takenAt,
    trackId: values.trackId,
    roundId: values.roundId || null,
    clientId: values.clientId || null,
  };
}

function timeOf(values: FormValues, tracks: readonly EntryTrack[]): { takenAt: string | null; error: string | null } {
  const local = values.takenAtLocal?.trim();
  const track = tracks.find(({ id }) => id === values.trackId);
  if (!local || !track) return { takenAt: null, error: null };
  const takenAt = zonedInstant(local, track.timeZone);
  return { takenAt, error: takenAt ? null : 'Enter date and time, such as 2026-05-03T14:05.' };
}
