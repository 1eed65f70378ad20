import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { households } from './households.ts';

/** Global: a person may belong to several households. */
export const users = sqliteTable(
  'users',
  {
    id: text('id').primaryKey(),
    /** Lower case; the only spelling that signs in. */
    email: text('email').notNull().unique(),
    name: text('name').notNull(),
    passwordHash: text('password_hash').notNull(),
    createdAt: text('created_at').notNull(),
  },
  (table) => [
    check('users_email', sql`${table.email} = lower(${table.email})`),
    check('users_hash', sql`${table.passwordHash} GLOB '$argon2id$*'`),
  ],
);

/** Global: sessions belong to a user. `id` is the SHA-256 of the token in the cookie, so that a copy of the file signs nobody in. */
export const sessions = sqliteTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    userId: text('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** Seconds, as the session library wants it. */
    expiresAt: integer('expires_at').notNull(),
    /** Milliseconds by our own clock; the absolute and the idle limit are counted from these. */
    createdAt: integer('created_at').notNull(),
    lastSeenAt: integer('last_seen_at').notNull(),
  },
  (table) => [index('sessions_user').on(table.userId)],
);

export const memberships = sqliteTable(
  'memberships',
  {
    householdId: text('household_id')
      .notNull()
      .references(() => households.id, { onDelete: 'cascade' }),
    userId: text('user_id')
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    role: text('role', { enum: ['owner', 'member', 'preparer'] }).notNull(),
    since: text('since').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.userId] }),
    index('memberships_user').on(table.userId),
    check('memberships_role', sql`${table.role} IN ('owner', 'member', 'preparer')`),
  ],
);

/** Global: what this installation remembers about itself. */
export const appSettings = sqliteTable('app_settings', {
  name: text('name').primaryKey(),
  value: text('value').notNull(),
});
