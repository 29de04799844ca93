import type { ServerContext } from './context';

/** The column of an `archived` flag: set to now, cleared, or left alone when the flag was not sent. */
export function archiveChange(ctx: ServerContext, archived: boolean | undefined): { archivedAt?: string | null } {
  if (archived === undefined) return {};
  return { archivedAt: archived ? ctx.now().toISOString() : null };
}
