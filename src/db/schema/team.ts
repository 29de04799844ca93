import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { ROLES } from '../../lib/domain/permissions';
import { createdAt, flag, id, instant } from './columns';

export const team = sqliteTable('team', {
  id: id(),
  name: text('name').notNull(),
  units: text('units', { enum: ['us', 'metric'] })
    .notNull()
    .default('us'),
  /** Demo data, made by the seed; never set in production. */
  demo: flag('demo').notNull().default(false),
  createdAt: createdAt(),
});

export const user = sqliteTable('user', {
  id: id(),
  name: text('name').notNull(),
  /** Lower case, trimmed. */
  email: text('email').notNull().unique(),
  passwordHash: text('password_hash').notNull(),
  disabledAt: instant('disabled_at'),
  createdAt: createdAt(),
});

export const membership = sqliteTable(
  'membership',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    userId: text('user_id')
      .notNull()
      .references(() => user.id),
    role: text('role', { enum: ROLES }).notNull(),
    createdAt: createdAt(),
  },
  (t) => [uniqueIndex('membership_team_user').on(t.teamId, t.userId), index('membership_user').on(t.userId)],
);

/** `id` is the SHA-256 of the token in the cookie; the token itself is never stored. `expires_at` is in whole seconds. */
export const session = sqliteTable(
  'session',
  {
    id: id(),
    userId: text('user_id')
      .notNull()
      .references(() => user.id),
    expiresAt: integer('expires_at').notNull(),
    /** Absolute end, whole seconds: use does not extend it. */
    absoluteExpiresAt: integer('absolute_expires_at').notNull(),
    teamId: text('team_id').references(() => team.id),
    createdAt: createdAt(),
  },
  (t) => [index('session_user').on(t.userId)],
);

/** Single-use links: invitations, password resets, mail changes. Only the hash of the token is stored. */
export const oneTimeToken = sqliteTable('one_time_token', {
  id: id(),
  kind: text('kind', { enum: ['invitation', 'password_reset', 'email_change'] }).notNull(),
  tokenHash: text('token_hash').notNull().unique(),
  teamId: text('team_id').references(() => team.id),
  userId: text('user_id').references(() => user.id),
  email: text('email'),
  role: text('role', { enum: ROLES }),
  expiresAt: instant('expires_at').notNull(),
  usedAt: instant('used_at'),
  createdAt: createdAt(),
});

export const apiToken = sqliteTable(
  'api_token',
  {
    id: id(),
    teamId: text('team_id')
      .notNull()
      .references(() => team.id),
    userId: text('user_id')
      .notNull()
      .references(() => user.id),
    name: text('name').notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    scopes: text('scopes', { mode: 'json' }).$type<string[]>().notNull(),
    lastUsedAt: instant('last_used_at'),
    revokedAt: instant('revoked_at'),
    createdAt: createdAt(),
  },
  (t) => [index('api_token_team').on(t.teamId)],
);

/** Append only: triggers refuse update and delete. */
export const auditEvent = sqliteTable(
  'audit_event',
  {
    id: id(),
    teamId: text('team_id').references(() => team.id),
    userId: text('user_id').references(() => user.id),
    action: text('action').notNull(),
    subjectType: text('subject_type').notNull(),
    subjectId: text('subject_id'),
    detail: text('detail', { mode: 'json' }).$type<Record<string, unknown>>().notNull(),
    requestId: text('request_id'),
    at: instant('at').notNull(),
  },
  (t) => [index('audit_event_team_at').on(t.teamId, t.at)],
);
