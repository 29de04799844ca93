import type { DatabaseHandle, Db } from '@/db/client';
import { can, type Right, type Role } from '@/lib/domain/permissions';
import { forbidden } from './errors';

export interface SignedInUser {
  id: string;
  name: string;
  email: string;
}

export interface CurrentTeam {
  id: string;
  name: string;
  units: 'us' | 'metric';
  demo: boolean;
}

/** Everything a server verb needs: who asks, for which team, and the database. Every query is scoped to `team.id`. */
export interface ServerContext {
  db: Db;
  write: DatabaseHandle['write'];
  team: CurrentTeam;
  user: SignedInUser;
  role: Role;
  requestId: string;
  /** The clock, passed in so that tests can set it. */
  now(): Date;
}

/** Refuses unless the caller's role holds the right. Called first in every verb. */
export function requireCan(ctx: ServerContext, right: Right): void {
  if (!can(ctx.role, right)) throw forbidden();
}
