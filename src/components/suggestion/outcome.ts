import type { SuggestionSummary } from '@/lib/server/suggestions';

const STATUS_TEXT: Record<string, string> = {
  offered: 'change offered',
  hold: 'no change is best',
  too_few_passes: 'too few passes',
  outside_experience: 'outside experience',
  missing_input: 'something not known',
};

export const statusText = (status: string): string => STATUS_TEXT[status] ?? status;

const CHOICE_TEXT = { accept: 'accepted', adjust: 'adjusted', decline: 'declined' } as const;

export const choiceText = (choice: SuggestionSummary['choice']): string =>
  choice ? CHOICE_TEXT[choice] : 'not decided';
