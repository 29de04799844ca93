import { hash, type Options, verify } from '@node-rs/argon2';
import { AppError } from '../errors';
import { limitParallel } from './parallel';

/** argon2id (algorithm 2), 19 MiB, two passes, one lane: OWASP Password Storage Cheat Sheet, its minimum. */
const ARGON2: Options = { algorithm: 2, memoryCost: 19456, timeCost: 2, parallelism: 1, outputLen: 32 };

/** Of a random password nobody knows, same cost: what is verified when there is no such user. */
export const DUMMY_HASH =
  '$argon2id$v=19$m=19456,t=2,p=1$UC4XiM1rkbnufkmZ2PNVlA$shN3w6jGHtGMPsQCehD+5O442JW4TfkmniA6T/YNoIw';

const MAX_PARALLEL = 4;
const MAX_WAITING = 200;
const busy = () => new AppError('UNAVAILABLE', 'Too many people are signing in right now. Try again in a few seconds.');
const oneOfFew = limitParallel(MAX_PARALLEL, MAX_WAITING, busy);

// The same text may arrive composed or decomposed, depending on the keyboard.
const canonical = (password: string): string => password.normalize('NFC');

/** The PHC string of a password whose length was checked. */
export function hashPassword(password: string): Promise<string> {
  return oneOfFew(() => hash(canonical(password), ARGON2));
}

/** Whether the password is the one of the hash. Without a hash the same time is spent and the answer is no. */
export function verifyPassword(storedHash: string | null, password: string): Promise<boolean> {
  return oneOfFew(async () => {
    const matches = await verifyOrNo(storedHash ?? DUMMY_HASH, canonical(password));
    return storedHash !== null && matches;
  });
}

// The library throws on a damaged hash: that is a wrong password, not a crash.
async function verifyOrNo(storedHash: string, password: string): Promise<boolean> {
  try {
    return await verify(storedHash, password);
  } catch {
    return false;
  }
}
