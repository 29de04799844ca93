import { learningText, mostLearned, type TestRun } from '@/lib/domain/model/session-design';
import { moveText, type SettingSpec, specOf, stepsText } from './settings';

/** What a test run is called: "Counterweight 11.0 to 12.0 g, two steps up", one line per change. */
export function runLines({ changes }: TestRun, specs: readonly SettingSpec[]): string[] {
  if (changes.length === 0) return ['As the car stands'];
  return changes.map((change) => {
    const spec = specOf(change.key, specs);
    return `${spec.label} ${moveText(change, spec)}, ${stepsText(change.steps)}`;
  });
}

/** "Would cut the uncertainty of …": of the effect it teaches most about. Empty when nothing may move. */
export function lessonText({ learning }: TestRun): string {
  const most = mostLearned(learning);
  if (!most) return '';
  const text = learningText(most);
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}
