import { can, type Role } from '@/lib/domain/permissions';

/** Whose call it is, in words. Every offer carries it; `decided` replaces it once somebody has decided. */
export interface Call {
  text: string;
}

export function callFor(role: Role | null, decided: { byName: string } | null): Call {
  if (decided) return { text: `Decided by ${decided.byName}.` };
  if (can(role, 'suggestion:decide')) return { text: 'Your call. The model only knows your past passes.' };
  return { text: "The crew chief's call. The model only knows your past passes." };
}
