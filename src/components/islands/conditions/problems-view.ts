import { type Problem, problemsOf } from '@/components/conditions/problems';
import type { Entry } from './form';

/**
 * Writes the questions under their fields. 'touched' asks about every field that was left; 'shown' only updates what stands
 * there already, so that nobody is interrupted in the middle of a number.
 */
export function showProblems(entry: Entry, which: 'touched' | 'shown'): Problem[] {
  const problems = problemsOf(entry.values, entry.surroundings);
  for (const box of entry.form.querySelectorAll<HTMLElement>('[data-check]')) {
    const key = box.dataset.check ?? '';
    const mayAsk = which === 'touched' ? entry.touched.has(key) : box.childElementCount > 0;
    const problem = mayAsk ? problems.find((one) => one.key === key) : undefined;
    put(entry, box, problem);
  }
  return problems;
}

function put(entry: Entry, box: HTMLElement, problem: Problem | undefined): void {
  const said = problem ? `${problem.message} ${problem.fix?.label ?? ''}` : '';
  if (box.dataset.said === said) return;
  box.dataset.said = said;
  box.replaceChildren(...(problem ? [question(entry, problem)] : []));
}

function question(entry: Entry, problem: Problem): HTMLElement {
  const text = document.createElement('p');
  text.textContent = problem.message;
  const box = document.createElement('div');
  box.className = problem.kind === 'impossible' ? 'check is-impossible' : 'check';
  box.append(text);
  if (problem.fix) box.append(fixButton(entry, problem.fix));
  return box;
}

function fixButton(entry: Entry, fix: NonNullable<Problem['fix']>): HTMLButtonElement {
  const button = document.createElement('button');
  button.type = 'button';
  button.className = 'btn';
  button.textContent = fix.label;
  button.addEventListener('click', () => apply(entry, fix.set));
  return button;
}

function apply(entry: Entry, set: Readonly<Record<string, string>>): void {
  for (const [name, value] of Object.entries(set)) {
    const control = entry.form.elements.namedItem(name);
    if (control instanceof RadioNodeList || control instanceof HTMLInputElement) control.value = value;
  }
  const first = entry.form.querySelector<HTMLElement>(`[name="${Object.keys(set)[0]}"]:is([type="text"], :checked)`);
  first?.focus();
  first?.dispatchEvent(new Event('change', { bubbles: true }));
}
