/**
 * Words that guessing starts with (the usual heads of leaked-password lists, and words of this trade). A password is refused
 * when nothing but such words, digits and signs at the ends is left: "Password1234!", "qwertyqwerty", "123456789012".
 */
const COMMON_WORDS =
  `password passwort passw0rd p@ssw0rd p@ssword pass qwerty qwertyuiop qwertz azerty asdf asdfgh asdfghjkl zxcvbn
  zxcvbnm 1q2w3e4r 1qaz2wsx 1q2w3e4r5t qazwsx letmein welcome admin administrator root login user guest test master secret changeme
  default iloveyou love princess sunshine monkey dragon shadow football baseball basketball soccer hockey superman batman trustno
  starwars whatever freedom ninja mustang camaro corvette michael jordan hunter killer pepper ginger jennifer summer winter spring
  autumn hello hellohello access flower cheese computer internet abc abcd abcdef abc123 slipband dragracing dragster racing race racecar
  crewchief crew tuner driver owner clutch nitro strip team launch quartermile`.split(/\s+/);

const WORDS = [...new Set(COMMON_WORDS)].sort((a, b) => b.length - a.length);
const SEQUENCES = [
  '01234567890123456789',
  '98765432109876543210',
  'abcdefghijklmnopqrstuvwxyz',
  'qwertyuiopasdfghjklzxcvbnm',
  '1qaz2wsx3edc4rfv5tgb6yhn7ujm8ik9ol0p',
  '1q2w3e4r5t6y7u8i9o0p',
];

/** Whether guessing would find it early, whatever its length. */
export function isCommonPassword(password: string): boolean {
  const lower = password.toLowerCase();
  return isSequence(lower) || isRepeated(lower) || isMadeOfCommonWords(lower);
}

const isSequence = (lower: string): boolean => SEQUENCES.some((sequence) => sequence.repeat(2).includes(lower));

/** One to four characters over and over. */
function isRepeated(lower: string): boolean {
  return [1, 2, 3, 4].some((size) => lower.slice(0, size).repeat(lower.length).startsWith(lower));
}

/** One or two of the words, however often; three different ones are a passphrase. */
function isMadeOfCommonWords(lower: string): boolean {
  const found = new Set<string>();
  let rest = lower;
  for (const word of WORDS) {
    if (rest.includes(word)) found.add(word);
    rest = rest.replaceAll(word, ' ');
  }
  return found.size > 0 && found.size <= 2 && /^[\s\d\W_]*$/.test(rest);
}
