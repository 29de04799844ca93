declare namespace App {
  interface Locals {
    requestId: string;
    /** Set by the middleware when a session is valid. */
    user: import('@/lib/server/context').SignedInUser | null;
    team: import('@/lib/server/context').CurrentTeam | null;
    role: import('@/lib/domain/permissions').Role | null;
    sessionToken: string | null;
  }
}
