/** Where the database is. Read by the server, drizzle-kit, migrate and seed alike; astro:env exists only inside Astro. */
export const DEFAULT_DATABASE_URL = 'file:data/slipband.db';

export interface DatabaseLocation {
  url: string;
  authToken: string | undefined;
}

export function databaseLocation(env: Record<string, string | undefined> = process.env): DatabaseLocation {
  return { url: env.DATABASE_URL || DEFAULT_DATABASE_URL, authToken: env.DATABASE_AUTH_TOKEN || undefined };
}

export const isLocalFile = (url: string): boolean => url.startsWith('file:');
