import type { ServerContext } from './context';
import { forbidden, unauthenticated } from './errors';
import { database } from './runtime';

/** Builds the context of a verb from what the middleware put into locals. Throws UNAUTHENTICATED or FORBIDDEN. */
export function contextFromLocals(locals: App.Locals): ServerContext {
  const { user, team, role, requestId } = locals;
  if (!user) throw unauthenticated();
  if (!team || !role) throw forbidden();
  const { db, write } = database();
  return { db, write, team, user, role, requestId, now: () => new Date() };
}
