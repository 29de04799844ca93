import { createHash } from 'node:crypto';
import { DrizzleSQLiteAdapter } from '@lucia-auth/adapter-drizzle';
import { eq } from 'drizzle-orm';
import type { Adapter, DatabaseSession, DatabaseUser } from 'lucia';
import type { DatabaseHandle } from '@/db/client';
import { session, user } from '@/db/schema';

export const sha256Hex = (text: string): string => createHash('sha256').update(text).digest('hex');

/** Less than this is no reason to write: near the absolute end every request would. */
const WORTH_EXTENDING_S = 60;

/**
 * The library's adapter with its gaps closed: the database holds only the hash of a session token, use never extends a session
 * past its absolute end, a disabled user has no session, and every write goes through the one queue.
 */
export class HashedSessionAdapter implements Adapter {
  constructor(private readonly handle: DatabaseHandle) {}

  private inner(db: DatabaseHandle['db'] = this.handle.db): DrizzleSQLiteAdapter {
    return new DrizzleSQLiteAdapter(db, session, user);
  }

  async getSessionAndUser(token: string): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const [stored, owner] = await this.inner().getSessionAndUser(sha256Hex(token));
    if (!stored) return [null, null];
    const disabled = (owner?.attributes as { disabledAt?: string | null } | undefined)?.disabledAt != null;
    return [{ ...capped(stored), id: token }, disabled ? null : owner];
  }

  getUserSessions(userId: string): Promise<DatabaseSession[]> {
    return this.inner().getUserSessions(userId);
  }

  setSession(created: DatabaseSession): Promise<void> {
    return this.handle.write((db) => this.inner(db).setSession({ ...created, id: sha256Hex(created.id) }));
  }

  async updateSessionExpiration(token: string, wanted: Date): Promise<void> {
    const id = sha256Hex(token);
    const [row] = await this.handle.db.select().from(session).where(eq(session.id, id));
    if (!row) return;
    const expiresAt = Math.min(Math.floor(wanted.getTime() / 1000), row.absoluteExpiresAt);
    if (expiresAt - row.expiresAt < WORTH_EXTENDING_S) return;
    await this.handle.write((db) => db.update(session).set({ expiresAt }).where(eq(session.id, id)));
  }

  deleteSession(token: string): Promise<void> {
    return this.handle.write((db) => this.inner(db).deleteSession(sha256Hex(token)));
  }

  deleteUserSessions(userId: string): Promise<void> {
    return this.handle.write((db) => this.inner(db).deleteUserSessions(userId));
  }

  deleteExpiredSessions(): Promise<void> {
    return this.handle.write((db) => this.inner(db).deleteExpiredSessions());
  }
}

function capped(stored: DatabaseSession): DatabaseSession {
  const absolute = new Date(stored.attributes.absoluteExpiresAt * 1000);
  return { ...stored, expiresAt: stored.expiresAt < absolute ? stored.expiresAt : absolute };
}
