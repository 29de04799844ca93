import type { APIRoute } from 'astro';
import { THEME_COOKIE, themeFrom } from '@/components/site/theme';
import { safeNext } from '@/lib/server/auth';
import { formData } from '@/lib/server/form';
import { errorResponse } from '@/lib/server/http';

const ONE_YEAR_S = 365 * 24 * 3600;
const LIMIT_BYTES = 4 * 1024;

/** Keeps the chosen theme in a cookie and goes back. Holds nothing private and needs nobody signed in. */
export const POST: APIRoute = async ({ request, cookies, redirect, locals }) => {
  try {
    const data = await formData(request, LIMIT_BYTES);
    const theme = themeFrom(data.get('theme'));
    const back = typeof data.get('back') === 'string' ? String(data.get('back')) : null;
    cookies.set(THEME_COOKIE, theme, { path: '/', maxAge: ONE_YEAR_S, sameSite: 'lax', httpOnly: true });
    return redirect(safeNext(back), 303);
  } catch (error) {
    return errorResponse(error, locals.requestId);
  }
};
