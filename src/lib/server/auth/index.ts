/**
 * Sign-up, sign-in, sign-out. Each takes the page's `Astro` or an endpoint's context first and looks after the cookie itself:
 * `handleOpenForm(Astro, { run: (raw) => signIn(Astro, raw), done: () => safeNext(Astro.url.searchParams.get('next')) })`.
 */
export { safeNext, signInPath } from './next-path';
export { type SignedIn, signIn } from './sign-in';
export { signOut } from './sign-out';
export { type SignedUp, signUp } from './sign-up';
export { switchTeam } from './switch-team';
