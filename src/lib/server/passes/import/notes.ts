import { formatQuantity, type UnitSystem } from '@/lib/domain/display';
import type { PassCsvRow } from '@/lib/pass-csv';
import type { TrackRow } from '../../lookup';
import { type RowPlace, UNNAMED_ROUND } from './places';

/** A file and the team may give the altitude of a track a little differently; beyond this, m, one of them is wrong. */
const ALTITUDE_AGREES_M = 100;

/** Plain sentences about the places of a file: what is new and what does not fit. */
export function importNotes(
  rows: readonly PassCsvRow[],
  places: readonly RowPlace[],
  newTracks: readonly TrackRow[],
  units: UnitSystem,
): string[] {
  return [
    ...newTracks.map((track) => newTrackNote(track, units)),
    ...altitudeNotes(rows, places, units),
    ...unnamedRoundNote(rows),
  ];
}

function newTrackNote({ name, altitudeM, timeZone }: TrackRow, units: UnitSystem): string {
  const altitude = altitudeM === null ? 'no altitude' : `altitude ${formatQuantity('altitude', altitudeM, units)}`;
  return `${name} is a new track: ${altitude} and time zone ${timeZone} are taken from the file. Check them on the track's page.`;
}

function altitudeNotes(rows: readonly PassCsvRow[], places: readonly RowPlace[], units: UnitSystem): string[] {
  const noted = new Map<string, string>();
  rows.forEach(({ altitudeM }, i) => {
    const track = places[i]?.track;
    if (!track || altitudeM === null || noted.has(track.id)) return;
    const note = altitudeNote(track, altitudeM, units);
    if (note) noted.set(track.id, note);
  });
  return [...noted.values()];
}

function altitudeNote(track: TrackRow, altitudeM: number, units: UnitSystem): string | null {
  const inFile = formatQuantity('altitude', altitudeM, units);
  if (track.altitudeM === null) return `The altitude of ${track.name} is not set; the file says ${inFile}.`;
  if (Math.abs(track.altitudeM - altitudeM) <= ALTITUDE_AGREES_M) return null;
  const known = formatQuantity('altitude', track.altitudeM, units);
  return `The file puts ${track.name} at ${inFile}, your team has it at ${known}. Check which is right.`;
}

function unnamedRoundNote(rows: readonly PassCsvRow[]): string[] {
  const unnamed = rows.filter((row) => row.round === '').length;
  if (unnamed === 0) return [];
  return [`Rows without a round (${unnamed}) go into a round named ${UNNAMED_ROUND} of their event.`];
}
