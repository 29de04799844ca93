import { integer, text } from 'drizzle-orm/sqlite-core';

/** Primary key: a random UUID made by the caller. */
export const id = () => text('id').primaryKey();
/** UTC instant as ISO 8601 text with a Z, so that text order is time order. */
export const instant = (name: string) => text(name);
export const createdAt = () => text('created_at').notNull();
export const flag = (name: string) => integer(name, { mode: 'boolean' });
