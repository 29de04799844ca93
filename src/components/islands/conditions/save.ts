import { namedAsInputs, readForm } from '@/components/conditions/reading-form';
import { ApiError, api } from '../api';
import type { Entry } from './form';
import { newId } from './new-id';
import { showProblems } from './problems-view';
import { rememberTrack } from './where-view';

const PATIENCE_MS = 20_000;

/** Sends the reading and keeps every value until it is known to be stored. A second tap sends the same reading again, stored once. */
export function startSaving(entry: Entry): void {
  let sending = false;
  entry.form.addEventListener('submit', async (event) => {
    event.preventDefault();
    if (sending) return;
    sending = true;
    await save(entry);
    sending = false;
  });
}

async function save(entry: Entry): Promise<void> {
  entry.touchAll();
  const blocking = showProblems(entry, 'touched').find((problem) => problem.blocks);
  if (blocking) {
    refuse(entry, blocking.key, 'One value cannot be right. It is marked above.');
    return;
  }
  showSending(entry, true);
  try {
    const stored = await send(entry);
    rememberTrack(entry);
    location.replace(`/conditions?saved=${encodeURIComponent(stored.id)}`);
  } catch (error) {
    showSending(entry, false);
    showFailure(entry, error);
  }
}

function send(entry: Entry): Promise<{ id: string }> {
  const { endpoint, units, correction } = entry.config;
  const { trackId, roundId, clientId, reason } = entry.values;
  const place = { trackId, roundId: roundId || null, takenAt: entry.sendTime(), clientId };
  const body = { ...readForm(entry.values, units).reading, ...place, ...(correction ? { reason } : {}) };
  return api(endpoint, { body, signal: AbortSignal.timeout(PATIENCE_MS) });
}

function showSending(entry: Entry, sending: boolean): void {
  const button = entry.form.querySelector<HTMLButtonElement>('[data-save]');
  if (!button) return;
  button.dataset.label ??= button.textContent ?? '';
  button.textContent = sending ? 'Saving…' : 'Try again';
  button.setAttribute('aria-disabled', String(sending));
  if (sending) showNote(entry, '');
}

function refuse(entry: Entry, key: string, message: string): void {
  showNote(entry, message);
  entry.form.querySelector<HTMLInputElement>(`[data-key="${key}"]`)?.focus();
}

function showFailure(entry: Entry, error: unknown): void {
  const known = error instanceof ApiError ? error : null;
  if (known?.status === 409 && !entry.config.correction) renewId(entry);
  const { message, link } = failure(known, entry.config.correction);
  showNote(entry, message, link);
  markFields(entry, known?.fields ?? {});
}

function failure(error: ApiError | null, correction: boolean): { message: string; link?: string } {
  if (!error) return { message: 'No answer yet. Your values are still here. Save again: it is stored only once.' };
  if (error.status === 0)
    return { message: 'No connection. Your values are still here. Save again when there is signal.' };
  if (error.status === 401)
    return { message: 'Your sign-in has ended. Sign in in a new tab, then save again here.', link: '/sign-in' };
  if (error.status === 409 && !correction)
    return { message: 'An earlier try was stored after all. Save again to store these values as another reading.' };
  return { message: error.message };
}

/** The values were changed after a try whose answer was lost, and that try had arrived: these are another reading. */
function renewId(entry: Entry): void {
  const id = entry.input('clientId');
  if (id) id.value = newId();
}

function markFields(entry: Entry, fields: Readonly<Record<string, string>>): void {
  const names = Object.keys(namedAsInputs(fields, entry.config.units));
  const first = names.map((name) => entry.input(name)).find((input) => input !== null);
  first?.closest('details')?.setAttribute('open', '');
  first?.focus();
}

function showNote(entry: Entry, message: string, link?: string): void {
  const note = entry.form.querySelector('[data-send-note]');
  if (!note) return;
  const text = document.createElement('p');
  text.className = 'send-note';
  text.textContent = message;
  if (link) text.append(' ', newTabLink(link));
  note.replaceChildren(...(message ? [text] : []));
}

function newTabLink(href: string): HTMLAnchorElement {
  const link = document.createElement('a');
  Object.assign(link, { href, target: '_blank', rel: 'noopener', textContent: 'Sign in', className: 'link' });
  return link;
}
