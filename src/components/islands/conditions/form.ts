import type { EntryTrack } from '@/components/conditions/page-data';
import type { Surroundings } from '@/components/conditions/problems';
import type { FormValues } from '@/components/conditions/reading-form';
import { instantOf } from '@/components/conditions/zone';
import type { UnitSystem } from '@/lib/domain/display';

/** What the server wrote into the page for the script. */
interface EntryConfig {
  units: UnitSystem;
  endpoint: string;
  correction: boolean;
  tracks: EntryTrack[];
  nextRound: Record<string, string>;
  trackIsGuess: boolean;
}

/** The form as the other parts see it: values, place, time, and which fields were left. */
export class Entry {
  readonly config: EntryConfig;
  /** Fields the tuner has left: only these are asked about. */
  readonly touched = new Set<string>();
  /** The time was set by hand; otherwise it is now. */
  timeIsOwn = false;
  /** When the first try to send these values was made: a later retry is still that reading. */
  private triedAt: string | null = null;

  constructor(readonly form: HTMLFormElement) {
    this.config = JSON.parse(form.dataset.entry ?? '{}') as EntryConfig;
  }

  get values(): FormValues {
    const pairs = [...new FormData(this.form)].filter((pair): pair is [string, string] => typeof pair[1] === 'string');
    return Object.fromEntries(pairs);
  }

  get track(): EntryTrack {
    const { tracks } = this.config;
    const track = tracks.find(({ id }) => id === this.values.trackId) ?? tracks[0];
    if (!track) throw new Error('The form was shown without a track.');
    return track;
  }

  get surroundings(): Surroundings {
    return { place: this.track, takenAt: this.ownTime ?? new Date().toISOString(), units: this.config.units };
  }

  /** The time in the input, as an instant; null when it cannot be read. */
  get ownTime(): string | null {
    return this.timeIsOwn ? instantOf(this.values.takenAtLocal ?? '', this.track.timeZone) : null;
  }

  /** What to send: null leaves the time of a corrected reading as it was. */
  sendTime(): string | null {
    if (this.timeIsOwn) return this.ownTime;
    if (this.config.correction) return null;
    this.triedAt ??= new Date().toISOString();
    return this.triedAt;
  }

  forgetTry(): void {
    this.triedAt = null;
  }

  touch(input: HTMLInputElement): void {
    const key = input.dataset.key ?? KEY_OF_RADIO[input.name];
    if (key) this.touched.add(key);
  }

  touchFilled(): void {
    for (const input of this.inputs()) if (input.value !== '') this.touch(input);
  }

  touchAll(): void {
    for (const input of this.inputs()) this.touch(input);
  }

  input(name: string): HTMLInputElement | HTMLSelectElement | null {
    const found = this.form.elements.namedItem(name);
    return found instanceof HTMLInputElement || found instanceof HTMLSelectElement ? found : null;
  }

  private inputs(): NodeListOf<HTMLInputElement> {
    return this.form.querySelectorAll<HTMLInputElement>('input[data-key]');
  }
}

const KEY_OF_RADIO: Record<string, string> = { pressureKind: 'pressurePa' };
