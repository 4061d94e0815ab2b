import { signInRequest, signUpRequest } from '#contract/accounts';
import { listMemberships } from '../../db/repositories/memberships';
import { hasUsers } from '../../db/repositories/users';
import { makePasswords } from '../auth/passwords';
import type { Sessions } from '../auth/sessions';
import type { Dependencies } from '../dependencies';
import { created, ok, route, type RouteMap } from '../http/route';
import { presentInstance, presentMe } from './presenter';
import { checkCredentials, signUp } from './usecases';

/** Where a request came from: the peer, or what as many proxies as are trusted say. */
const addressOf = (request: { readonly ip?: string | undefined }) => request.ip ?? 'unknown';

type AccountRoutes = Pick<RouteMap, 'instance' | 'signUp' | 'signIn' | 'me' | 'signOut'>;

export function accountRoutes(
  { database: { db }, throttle, demoAccounts }: Dependencies,
  sessions: Sessions,
): AccountRoutes {
  const passwords = makePasswords();
  return {
    instance: route('instance', {}, async () =>
      ok(presentInstance(await hasUsers(db), demoAccounts)),
    ),
    signUp: route('signUp', { body: signUpRequest }, async ({ body, request, response }) => {
      await throttle.beforeSignUp(addressOf(request));
      const user = await signUp(db, passwords, body);
      await sessions.end(request.get('cookie'));
      response.append('Set-Cookie', await sessions.start(user.id));
      return created(presentMe(user, await listMemberships(db, user.id)));
    }),
    signIn: route('signIn', { body: signInRequest }, async ({ body, request, response }) => {
      await throttle.beforeSignIn(body.email, addressOf(request));
      const user = await checkCredentials(db, passwords, body);
      await throttle.afterSignIn(body.email);
      // The session that was open in this browser, somebody else's perhaps, ends here.
      await sessions.end(request.get('cookie'));
      response.append('Set-Cookie', await sessions.start(user.id));
      return ok(presentMe(user, await listMemberships(db, user.id)));
    }),
    me: route('me', {}, async ({ actor }) =>
      ok(presentMe({ ...actor, id: actor.userId }, await listMemberships(db, actor.userId))),
    ),
    signOut: route('signOut', {}, async ({ request }) => ({
      status: 204,
      headers: {
        'Set-Cookie': await sessions.end(request.get('cookie')),
        'Clear-Site-Data': '"cache"',
      },
    })),
  };
}
