import { randomUUID } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { membership, team, user } from '@/db/schema';
import { signUpInput } from '@/lib/forms/auth';
import { auditInsert } from '../audit';
import type { SignedInUser } from '../context';
import { refuseDuplicate, refuseProblems } from '../duplicates';
import { AppError } from '../errors';
import { type AuthCall, type AuthContext, authContext } from './call';
import { hashPassword } from './password';
import { passwordProblem } from './password-rules';
import { replaceSession } from './replace-session';

export interface SignedUp {
  user: SignedInUser;
  team: { id: string; name: string };
}

const TAKEN = 'This email address cannot be used for a new account. If it is yours, sign in instead.';

/** Makes a user and a team they own, and signs them in. Throws VALIDATION or CONFLICT (address in use). */
export async function signUp(call: AuthCall, raw: unknown): Promise<SignedUp> {
  const ctx = authContext(call);
  const input = signUpInput.parse(raw);
  const problem = passwordProblem(input.password, input);
  if (problem) refuseProblems({ password: problem });
  await refuseTakenAddress(ctx, input.email);
  const passwordHash = await hashPassword(input.password);
  const made = await storeOwner(ctx, input, passwordHash);
  await replaceSession(call, ctx, made.user.id, made.team.id);
  return made;
}

async function refuseTakenAddress({ handle }: AuthContext, email: string): Promise<void> {
  const [taken] = await handle.db.select({ id: user.id }).from(user).where(eq(user.email, email));
  if (taken) throw new AppError('CONFLICT', TAKEN, { email: TAKEN });
}

async function storeOwner(
  ctx: AuthContext,
  { name, email, teamName }: { name: string; email: string; teamName: string },
  passwordHash: string,
): Promise<SignedUp> {
  const createdAt = ctx.now().toISOString();
  const made = { user: { id: randomUUID(), name, email }, team: { id: randomUUID(), name: teamName } };
  const seat = { id: randomUUID(), teamId: made.team.id, userId: made.user.id, role: 'owner' as const, createdAt };
  const actor = { ...ctx, user: made.user, team: made.team };
  await refuseDuplicate('email', TAKEN, () =>
    ctx.handle.write((db) =>
      db.batch([
        db.insert(user).values({ ...made.user, passwordHash, createdAt }),
        db.insert(team).values({ ...made.team, createdAt }),
        db.insert(membership).values(seat),
        auditInsert(db, actor, 'auth.sign-up', { type: 'user', id: made.user.id }),
      ]),
    ),
  );
  return made;
}
