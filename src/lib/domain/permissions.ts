/** The one table of rights. Server verbs and screens both ask `can`; nothing else decides who may do what. */

export const ROLES = ['owner', 'crew_chief', 'tuner', 'crew', 'driver'] as const;
export type Role = (typeof ROLES)[number];

export const ROLE_LABEL: Record<Role, string> = {
  owner: 'Owner',
  crew_chief: 'Crew chief',
  tuner: 'Tuner',
  crew: 'Crew',
  driver: 'Driver',
};

const EVERYONE: readonly Role[] = ROLES;
const CHIEFS: readonly Role[] = ['owner', 'crew_chief'];
const TUNERS: readonly Role[] = ['owner', 'crew_chief', 'tuner'];
const CREW: readonly Role[] = ['owner', 'crew_chief', 'tuner', 'crew'];

export const CAN = {
  'team:view': EVERYONE,
  'team:manage': ['owner'],
  'car:view': EVERYONE,
  'car:edit': CHIEFS,
  'belief:edit': CHIEFS,
  'track:edit': TUNERS,
  'event:edit': TUNERS,
  'round:edit': TUNERS,
  'reading:view': EVERYONE,
  'reading:enter': CREW,
  'pass:view': EVERYONE,
  'pass:log': TUNERS,
  'pass:correct': TUNERS,
  'pass:exclude': TUNERS,
  'pass:import': TUNERS,
  'pass:export': TUNERS,
  'suggestion:view': CREW,
  'suggestion:create': TUNERS,
  'suggestion:decide': CHIEFS,
  'sheet:view': EVERYONE,
  'sheet:publish': CHIEFS,
  'sheet:seen': EVERYONE,
  'run-log:upload': TUNERS,
  'service:view': CREW,
  'service:sign': CREW,
  'review:view': EVERYONE,
  'audit:view': ['owner'],
} as const satisfies Record<string, readonly Role[]>;

export type Right = keyof typeof CAN;

/** Whether a role holds a right. An absent role (nobody signed in) holds none. */
export function can(role: Role | null | undefined, right: Right): boolean {
  return role != null && (CAN[right] as readonly Role[]).includes(role);
}
