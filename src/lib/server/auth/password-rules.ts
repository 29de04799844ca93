import { isCommonPassword } from './common-passwords';

interface Identity {
  email: string;
  name: string;
  teamName: string;
}

/** Why a new password of allowed length is refused; null when it is fine. No rules of composition. */
export function passwordProblem(password: string, identity: Identity): string | null {
  if (isCommonPassword(password))
    return 'This password is among the first that get guessed. Use a few unrelated words.';
  if (isOwnName(password, identity))
    return 'The password must not be your email address, your name or the team name. Use a few unrelated words.';
  return null;
}

const MIN_TELLING_LENGTH = 4;

/** The name itself, whatever its case, spaces and the digits or signs around it. */
function isOwnName(password: string, { email, name, teamName }: Identity): boolean {
  const typed = letters(password);
  return [email, email.split('@')[0] ?? '', name, teamName]
    .map(letters)
    .some((own) => own.length >= MIN_TELLING_LENGTH && (typed === own || typed === own + own));
}

const letters = (text: string): string => text.toLowerCase().replace(/[^\p{L}]/gu, '');
