/**
 * Where to go after signing in.
 * @param next the `next` of the query, anybody's text: only a path of this site is followed.
 */
export function pathAfterSignIn(next: unknown): string {
  const isOwnPath = typeof next === 'string' && /^\/(?![/\\])/.test(next);
  return isOwnPath ? next : '/';
}
