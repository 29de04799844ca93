import { airLines, stationNote } from '@/components/conditions/live';
import { pressureKindOf, readForm } from '@/components/conditions/reading-form';
import type { Entry } from './form';

/** Writes the derived numbers, the station pressure of an altimeter setting, and the last values beside the fields. */
export function showLive(entry: Entry): void {
  const { units } = entry.config;
  const { place, takenAt } = entry.surroundings;
  const { reading } = readForm(entry.values, units);
  for (const { key, value } of airLines(reading, place, takenAt, units)) {
    write(entry, `[data-air="${key}"]`, value);
  }
  write(entry, '[data-station-note]', stationNote(reading, place, units));
  showLast(entry);
}

function showLast(entry: Entry): void {
  const { hints } = entry.track;
  for (const element of entry.form.querySelectorAll<HTMLElement>('[data-last]')) {
    const key = element.dataset.last === 'pressurePa' ? pressureKindOf(entry.values) : (element.dataset.last ?? '');
    const hint = hints[key];
    setText(element, hint ? `last ${hint}` : '');
  }
}

function write(entry: Entry, selector: string, text: string): void {
  for (const element of entry.form.querySelectorAll(selector)) setText(element, text);
}

// Writing the same text again would make a screen reader say it again.
function setText(element: Element, text: string): void {
  if (element.textContent !== text) element.textContent = text;
}
