import type { RouteLocationNormalized, RouteLocationRaw } from 'vue-router';
import { useSession } from '../stores/session';

/** Leads whoever is not signed in to the sign-in page and remembers where they were going. */
export function guard(to: RouteLocationNormalized): RouteLocationRaw | true {
  const { signedIn, hasRole } = useSession();
  if (to.meta.open) return true;
  if (!signedIn) return { name: 'sign-in', query: { to: to.fullPath } };
  return to.meta.role === undefined || hasRole(to.meta.role) ? true : { name: 'plans' };
}

/** Where to go after signing in: a path of our own, never another site. */
export function returnAddress(query: unknown): string {
  const path = typeof query === 'string' ? query : '';
  return /^\/(?![/\\])/.test(path) && !path.startsWith('/sign-in') ? path : '/plans';
}
