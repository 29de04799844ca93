/** The entry page with script: live air, questions as numbers are typed, saving without leaving the page. No framework: it must load at the fence. */
import { Entry } from './form';
import { showLive } from './live-view';
import { showProblems } from './problems-view';
import { startSaving } from './save';
import { startWhere } from './where-view';

const form = document.querySelector<HTMLFormElement>('form[data-entry]');
if (form) start(new Entry(form));

function start(entry: Entry): void {
  startWhere(entry, () => refresh(entry));
  startSaving(entry);
  entry.form.addEventListener('input', () => {
    entry.forgetTry();
    showLive(entry);
    showProblems(entry, 'shown');
  });
  entry.form.addEventListener('change', (event) => {
    if (event.target instanceof HTMLInputElement) entry.touch(event.target);
    refresh(entry);
  });
  entry.touchFilled();
  refresh(entry);
}

function refresh(entry: Entry): void {
  showLive(entry);
  showProblems(entry, 'touched');
}
