import type { RouteLocationNormalized, RouteLocationRaw } from 'vue-router';
import { useSessionStore } from '../stores/session';

/**
 * Sends a visitor without a session to the sign-in page, and back to where they wanted to go after.
 * Only a convenience: what anyone may read or do is decided by the server on every request.
 */
export async function guard(to: RouteLocationNormalized): Promise<boolean | RouteLocationRaw> {
  const session = useSessionStore();
  await session.load();
  if (to.meta.visitor === true) return session.me === null ? true : { name: 'home' };
  if (session.me !== null || to.meta.open === true) return true;
  if (session.unreachable) return true;
  const name = session.instance?.hasAccounts === false ? 'sign-up' : 'sign-in';
  return { name, query: to.fullPath === '/' ? {} : { next: to.fullPath } };
}
