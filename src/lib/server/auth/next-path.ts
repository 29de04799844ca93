const HERE = 'http://here.invalid';

/** Where to go after sign-in: a path of this site from `?next=`, or `fallback` for anything else. */
export function safeNext(next: string | null | undefined, fallback = '/'): string {
  if (!next || !/^\/(?![/\\])[^\\\p{Cc}]*$/u.test(next)) return fallback;
  if (!URL.canParse(next, HERE)) return fallback;
  const { origin, pathname, search, hash } = new URL(next, HERE);
  // The parsed path is asked again: "/.//evil" becomes "//evil".
  return origin === HERE && !pathname.startsWith('//') ? `${pathname}${search}${hash}` : fallback;
}

/** The sign-in page that comes back to where a reader wanted to go. */
export function signInPath(url: URL, method: string): string {
  if (method !== 'GET' && method !== 'HEAD') return '/sign-in';
  const wanted = safeNext(`${url.pathname}${url.search}`);
  return wanted === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(wanted)}`;
}
