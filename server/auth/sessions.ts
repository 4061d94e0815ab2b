import { createHash, randomBytes } from 'node:crypto';
import { DrizzlePostgreSQLAdapter } from '@lucia-auth/adapter-drizzle';
import { serializeCookie } from 'oslo/cookie';
import { Lucia, TimeSpan, type Adapter, type DatabaseSession } from 'lucia';
import type { Db } from '../../db/client';
import { deleteEndedSessions } from '../../db/repositories/sessions';
import { sessions } from '../../db/schema/sessions';
import { users } from '../../db/schema/users';
import type { Actor } from '../http/route';

const DAY = 24 * 60 * 60 * 1000;
export const IDLE_LIMIT = 7 * DAY;
export const ABSOLUTE_LIMIT = 30 * DAY;
/** The idle limit moves forward at most this often, so that reading does not write each time. */
const TOUCH_AFTER = 60 * 60 * 1000;
/** Bytes of the cookie's secret: 256 random bits. */
const SECRET_BYTES = 32;

declare module 'lucia' {
  interface Register {
    Lucia: Lucia<{ createdAt: Date }, { name: string; email: string }>;
    DatabaseSessionAttributes: { createdAt: Date };
    DatabaseUserAttributes: { name: string; email: string };
  }
}

export interface Sessions {
  readonly cookieName: string;
  /** Starts a session with a new secret. @returns the Set-Cookie header */
  start(userId: string): Promise<string>;
  /** @returns the person of the Cookie header's session, or null; an ended session is removed */
  actorOf(cookieHeader: string | undefined): Promise<Actor | null>;
  /** Ends the session of the Cookie header. @returns the Set-Cookie header that forgets it */
  end(cookieHeader: string | undefined): Promise<string>;
  /** Removes what has ended. @returns how many sessions */
  sweep(): Promise<number>;
}

const hashed = (secret: string): string => createHash('sha256').update(secret).digest('hex');

/** Lucia sees the secret of the cookie, the table its SHA-256 (hexadecimal). */
function hashingAdapter(inner: Adapter): Adapter {
  const opened = (session: DatabaseSession, secret: string) => ({ ...session, id: secret });
  return {
    getSessionAndUser: async (secret) => {
      const [session, user] = await inner.getSessionAndUser(hashed(secret));
      return session === null ? [null, null] : [opened(session, secret), user];
    },
    setSession: (session) => inner.setSession({ ...session, id: hashed(session.id) }),
    updateSessionExpiration: (secret, until) =>
      inner.updateSessionExpiration(hashed(secret), until),
    deleteSession: (secret) => inner.deleteSession(hashed(secret)),
    getUserSessions: (userId) => inner.getUserSessions(userId),
    deleteUserSessions: (userId) => inner.deleteUserSessions(userId),
    deleteExpiredSessions: () => inner.deleteExpiredSessions(),
  };
}

/** @param secure pages come over https: the cookie gets Secure and the `__Host-` prefix */
export function makeSessions(db: Db, secure: boolean): Sessions {
  const adapter = hashingAdapter(new DrizzlePostgreSQLAdapter(db, sessions, users));
  const lucia = new Lucia(adapter, {
    sessionExpiresIn: new TimeSpan(7, 'd'),
    sessionCookie: {
      name: secure ? '__Host-heddle' : 'heddle',
      attributes: { secure, sameSite: 'lax', path: '/' },
    },
    getSessionAttributes: ({ createdAt }) => ({ createdAt }),
    getUserAttributes: ({ name, email }) => ({ name, email }),
  });
  const secretOf = (header: string | undefined) => lucia.readSessionCookie(header ?? '');

  const actorOf = async (cookieHeader: string | undefined): Promise<Actor | null> => {
    const secret = secretOf(cookieHeader);
    if (!secret) return null;
    const { session, user } = await lucia.validateSession(secret);
    if (session === null) return null;
    const end = session.createdAt.getTime() + ABSOLUTE_LIMIT;
    if (Date.now() >= end) {
      await lucia.invalidateSession(secret);
      return null;
    }
    const until = Math.min(Date.now() + IDLE_LIMIT, end);
    if (Math.abs(until - session.expiresAt.getTime()) > TOUCH_AFTER || session.fresh) {
      await adapter.updateSessionExpiration(secret, new Date(until));
    }
    return { userId: user.id, name: user.name, email: user.email };
  };

  return {
    cookieName: lucia.sessionCookieName,
    start: async (userId) => {
      const sessionId = randomBytes(SECRET_BYTES).toString('base64url');
      await lucia.createSession(userId, { createdAt: new Date() }, { sessionId });
      const { name, value, attributes } = lucia.createSessionCookie(sessionId);
      // The browser may keep it as long as the session can last; the table decides.
      return serializeCookie(name, value, { ...attributes, maxAge: ABSOLUTE_LIMIT / 1000 });
    },
    actorOf,
    end: async (cookieHeader) => {
      const secret = secretOf(cookieHeader);
      if (secret) await lucia.invalidateSession(secret);
      return lucia.createBlankSessionCookie().serialize();
    },
    sweep: () => deleteEndedSessions(db, new Date(Date.now() - ABSOLUTE_LIMIT)),
  };
}
