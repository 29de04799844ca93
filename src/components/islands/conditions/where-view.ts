import { wallClock } from '@/components/conditions/zone';
import type { Entry } from './form';

const TRACK_MEMORY = 'slipband.track';
const CLOCK_MS = 15_000;

/** Track, round and time: remembered, chosen, and said in one line. `changed` is called after the place has changed. */
export function startWhere(entry: Entry, changed: () => void): void {
  const track = entry.input('trackId');
  if (entry.config.trackIsGuess && track) recallTrack(entry, track);
  track?.addEventListener('change', () => followTrack(entry, true));
  entry.input('roundId')?.addEventListener('change', () => showWhere(entry));
  entry.input('takenAtLocal')?.addEventListener('input', () => {
    entry.timeIsOwn = true;
    showWhere(entry);
  });
  followTrack(entry, false);
  if (entry.config.correction) return;
  tick(entry);
  setInterval(() => {
    tick(entry);
    changed();
  }, CLOCK_MS);
}

/** The device that was last used at a track is most likely still there. */
export function rememberTrack(entry: Entry): void {
  try {
    localStorage.setItem(TRACK_MEMORY, entry.track.id);
  } catch {
    // Storage may be off; then the server's choice stands.
  }
}

function recallTrack(entry: Entry, select: HTMLInputElement | HTMLSelectElement): void {
  const id = stored();
  if (!id || !entry.config.tracks.some((track) => track.id === id)) return;
  select.value = id;
  chooseNextRound(entry);
}

function stored(): string | null {
  try {
    return localStorage.getItem(TRACK_MEMORY);
  } catch {
    return null;
  }
}

function followTrack(entry: Entry, byHand: boolean): void {
  for (const group of entry.form.querySelectorAll<HTMLOptGroupElement>('optgroup[data-track]')) {
    const here = group.dataset.track === entry.track.id;
    group.hidden = !here;
    group.disabled = !here;
  }
  if (byHand) chooseNextRound(entry);
  tick(entry);
  showWhere(entry);
}

function chooseNextRound(entry: Entry): void {
  const round = entry.input('roundId');
  if (round) round.value = entry.config.nextRound[entry.track.id] ?? '';
}

function tick(entry: Entry): void {
  const time = entry.input('takenAtLocal');
  if (!time || entry.timeIsOwn || entry.config.correction) return;
  time.value = wallClock(new Date(), entry.track.timeZone);
}

function showWhere(entry: Entry): void {
  say(entry, 'track', entry.track.name);
  const round = entry.form.querySelector<HTMLOptionElement>('#roundId option:checked');
  say(entry, 'round', round?.value ? round.label : 'no round');
  if (entry.timeIsOwn) say(entry, 'time', (entry.values.takenAtLocal ?? '').replace('T', ' ') || 'no time');
}

function say(entry: Entry, part: string, text: string): void {
  const element = entry.form.querySelector(`[data-where="${part}"]`);
  if (element) element.textContent = text;
}
