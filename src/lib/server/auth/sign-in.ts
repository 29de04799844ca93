import { eq } from 'drizzle-orm';
import { user } from '@/db/schema';
import { signInInput } from '@/lib/forms/auth';
import { auditInsert } from '../audit';
import type { SignedInUser } from '../context';
import { AppError } from '../errors';
import { currentTeam, teamsOfUser } from '../teams';
import { callerAddress } from './address';
import { type AuthCall, type AuthContext, authContext } from './call';
import { type LimitRule, TryLimiter } from './limiter';
import { verifyPassword } from './password';
import { replaceSession } from './replace-session';

export interface SignedIn {
  user: SignedInUser;
  team: { id: string; name: string } | null;
}

const limiter = new TryLimiter();
const BY_ACCOUNT_AND_ADDRESS: LimitRule = { free: 6, firstWaitS: 15, maxWaitS: 300 };
const BY_ACCOUNT: LimitRule = { free: 20, firstWaitS: 15, maxWaitS: 300 };
const BY_ADDRESS: LimitRule = { free: 100, firstWaitS: 15, maxWaitS: 300 };

/**
 * Signs in with a new session. An unknown address, a wrong password and a disabled user get the same answer after the same work.
 * Throws VALIDATION, UNAUTHENTICATED, or TOO_MANY with the seconds to wait.
 */
export async function signIn(call: AuthCall, raw: unknown): Promise<SignedIn> {
  const ctx = authContext(call);
  const { email, password } = signInInput.parse(raw);
  const rules = limitRules(email, callerAddress(call));
  limiter.begin(rules);
  const row = await userByEmail(ctx, email);
  const right = await verifyPassword(row?.passwordHash ?? null, password);
  if (!row || !right || row.disabledAt !== null) throw await refusal(ctx, row?.id ?? null);
  limiter.clear(rules.keys());
  const found = { id: row.id, name: row.name, email: row.email };
  const current = currentTeam(await teamsOfUser(ctx.handle.db, found.id), null);
  await replaceSession(call, ctx, found.id, current?.team.id ?? null);
  await note(ctx, 'auth.sign-in', found, current?.team ?? null);
  return { user: found, team: current ? { id: current.team.id, name: current.team.name } : null };
}

function limitRules(email: string, address: string | null): Map<string, LimitRule> {
  const rules = new Map([
    [`both ${email} ${address ?? '?'}`, BY_ACCOUNT_AND_ADDRESS],
    [`account ${email}`, BY_ACCOUNT],
  ]);
  // Without an address everybody would share one count, and one guesser would stop all sign-ins.
  if (address !== null) rules.set(`address ${address}`, BY_ADDRESS);
  return rules;
}

async function userByEmail({ handle }: AuthContext, email: string) {
  const [row] = await handle.db.select().from(user).where(eq(user.email, email));
  return row;
}

async function refusal(ctx: AuthContext, triedId: string | null): Promise<AppError> {
  await note(ctx, 'auth.sign-in-failed', null, null, triedId);
  return new AppError('UNAUTHENTICATED', 'The email address or the password is wrong.');
}

async function note(
  ctx: AuthContext,
  action: string,
  who: SignedInUser | null,
  team: { id: string } | null,
  triedId: string | null = who?.id ?? null,
): Promise<void> {
  const actor = { ...ctx, user: who, team };
  await ctx.handle.write((db) => auditInsert(db, actor, action, { type: 'user', id: triedId }));
}
