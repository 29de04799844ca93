import { randomUUID } from 'node:crypto';
import type { Db } from '@/db/client';
import { auditEvent } from '@/db/schema';

/** Who acts: any ServerContext fits; a sign-in that failed has neither user nor team. */
export interface AuditActor {
  user: { id: string } | null;
  team: { id: string } | null;
  requestId: string;
  now(): Date;
}

export interface AuditSubject {
  type: string;
  id: string | null;
}

/**
 * The audit row of one act ("car.create"), to be written in the same batch as the act itself. `detail` is plain data and
 * carries no password, token or address.
 */
export function auditInsert(
  db: Pick<Db, 'insert'>,
  actor: AuditActor,
  action: string,
  subject: AuditSubject,
  detail: Record<string, unknown> = {},
) {
  return db.insert(auditEvent).values({
    id: randomUUID(),
    teamId: actor.team?.id ?? null,
    userId: actor.user?.id ?? null,
    action,
    subjectType: subject.type,
    subjectId: subject.id,
    detail,
    requestId: actor.requestId,
    at: actor.now().toISOString(),
  });
}
