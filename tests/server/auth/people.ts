import type { SignedUp } from '@/lib/server/auth';
import { SESSION_COOKIE } from '@/lib/server/auth/lucia';
import { POST as signInRoute } from '@/pages/api/auth/sign-in';
import { POST as signUpRoute } from '@/pages/api/auth/sign-up';
import { type CallOptions, callRoute } from '../helpers';

export const PASSWORD = 'lantern gravel orbit nine';

let serial = 0;

/** A new address for each, so that limits of one test do not meet another. */
export function newPerson(fields: Record<string, unknown> = {}) {
  serial += 1;
  return {
    teamName: `Night crew ${serial}`,
    name: 'Ada Field',
    email: `ada${serial}@example.test`,
    password: PASSWORD,
    ...fields,
  };
}

export const signUpAs = (body: Record<string, unknown>, options: CallOptions = {}) =>
  callRoute(signUpRoute, { ...options, body });

export const signInAs = (body: Record<string, unknown>, options: CallOptions = {}) =>
  callRoute(signInRoute, { ...options, body });

/** Signs a new person up and gives the answer's user and team, and the token of the cookie. */
export async function member(fields: Record<string, unknown> = {}) {
  const person = newPerson(fields);
  const { body, jar } = await signUpAs(person);
  const token = jar.sent.get(SESSION_COOKIE)?.value ?? '';
  return { person, token, ...(body as SignedUp) };
}
