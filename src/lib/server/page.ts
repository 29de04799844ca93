import type { AstroGlobal } from 'astro';
import type { Right } from '@/lib/domain/permissions';
import { signInPath } from './auth';
import { requireCan, type ServerContext } from './context';
import { AppError } from './errors';
import { contextFromLocals } from './locals';

type Page = Pick<AstroGlobal, 'locals' | 'redirect' | 'rewrite' | 'url'>;
export type Loaded<T> = { data: T; response: null } | { data: null; response: Response };

/**
 * Loads what a page shows, before any form on it is handled. What is missing or another team's becomes the 404 page, a role
 * without the right the 403 page, nobody signed in the sign-in page; anything else is thrown on.
 *
 * @example
 *   const page = await load(Astro, (ctx) => getCar(ctx, Astro.params.id ?? ''));
 *   if (page.response) return page.response;
 */
export async function load<T>(page: Page, task: (ctx: ServerContext) => Promise<T>, right?: Right): Promise<Loaded<T>> {
  try {
    const ctx = contextFromLocals(page.locals);
    if (right) requireCan(ctx, right);
    return { data: await task(ctx), response: null };
  } catch (error) {
    return { data: null, response: await refusal(page, error) };
  }
}

async function refusal(page: Page, error: unknown): Promise<Response> {
  const code = error instanceof AppError ? error.code : null;
  if (code === 'NOT_FOUND') return new Response(null, { status: 404 });
  if (code === 'FORBIDDEN') return page.rewrite('/403');
  if (code !== 'UNAUTHENTICATED') throw error;
  return page.redirect(signInPath(page.url, 'GET'), 303);
}
