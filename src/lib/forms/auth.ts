import { z } from 'zod';
import { email, text } from './fields';

export const PASSWORD_MIN = 12;
export const PASSWORD_MAX = 128;

/** A new password: length only, every character allowed, nothing trimmed. Common ones are refused by `passwordProblem`. */
export const newPassword = z
  .string({ error: `Choose a password of ${PASSWORD_MIN} to ${PASSWORD_MAX} characters.` })
  .refine(
    (value) => characters(value) >= PASSWORD_MIN,
    `The password is too short: use at least ${PASSWORD_MIN} characters. A few words in a row do well.`,
  )
  .refine(
    (value) => value.length <= 4 * PASSWORD_MAX && characters(value) <= PASSWORD_MAX,
    `The password is too long: keep it to ${PASSWORD_MAX} characters.`,
  );

const characters = (value: string): number => [...value.slice(0, 4 * PASSWORD_MAX + 1)].length;

export const signUpInput = z.object({
  teamName: text('The team name', 80),
  name: text('Your name', 80),
  email: email(),
  password: newPassword,
});

/** At sign-in only the size is checked, before anything is hashed. */
export const signInInput = z.object({
  email: email(),
  password: z
    .string({ error: 'Enter your password.' })
    .min(1, 'Enter your password.')
    .max(4 * PASSWORD_MAX, 'That password is too long.'),
});

export const switchTeamInput = z.object({
  teamId: z.string({ error: 'Choose a team.' }).min(1, 'Choose a team.').max(64),
});
