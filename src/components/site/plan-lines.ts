import type { CarState } from '@/lib/server/today';
import { dayAndClock } from './times';

const CHOICE_TEXT = { accept: 'accepted', adjust: 'adjusted', decline: 'declined' } as const;

const STATUS_TEXT: Record<string, string> = {
  offered: 'offered',
  hold: 'hold as it is',
  too_few_passes: 'too few passes',
  outside_experience: 'outside experience',
  missing_input: 'input missing',
};

interface Line {
  label: string;
  value: string;
}

/** How far a car's plan has come, as lines of a slip. Lines the role does not see are left out. */
export function planLines(car: CarState, zone: string, now: Date, withSuggestion: boolean): Line[] {
  return [...(withSuggestion ? suggestionLines(car, zone, now) : []), ...sheetLines(car, zone, now)];
}

function suggestionLines({ suggestion, decision }: CarState, zone: string, now: Date): Line[] {
  const asked = suggestion
    ? `${STATUS_TEXT[suggestion.status] ?? suggestion.status}, ${dayAndClock(suggestion.createdAt, zone, now)}`
    : 'not asked yet';
  const decided = decision
    ? `${CHOICE_TEXT[decision.choice]}, ${dayAndClock(decision.createdAt, zone, now)}`
    : 'not yet';
  return [
    { label: 'Suggestion', value: asked },
    { label: 'Decision', value: decided },
  ];
}

function sheetLines({ sheet }: CarState, zone: string, now: Date): Line[] {
  if (!sheet) return [{ label: 'Launch sheet', value: 'none published' }];
  return [
    {
      label: 'Launch sheet',
      value: `${sheet.roundName}, version ${sheet.version}`,
    },
    { label: 'Published', value: dayAndClock(sheet.createdAt, zone, now) },
    { label: 'Seen by', value: sheet.seenBy.join(', ') || 'nobody yet' },
  ];
}
