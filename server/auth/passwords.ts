import { randomBytes } from 'node:crypto';
import { Argon2id } from 'oslo/password';
import { Failure } from '../http/failure';
import { makeTurns } from '../http/turns';

/** Argon2id with m = 19 MiB, t = 2, p = 1 (OWASP Password Storage Cheat Sheet). */
const ARGON2 = { memorySize: 19_456, iterations: 2, parallelism: 1 } as const;
/** Hashes computed at once: each takes a thread of libuv's pool and 19 MiB. */
const AT_ONCE = 2;
/** Requests that may wait for a hash before the next is refused. */
const WAITING = 64;

export interface Passwords {
  /** @returns the argon2id hash in PHC form */
  hash(password: string): Promise<string>;
  /**
   * Takes equally long whether or not there is a hash: without one the password is compared with a
   * hash of random bytes.
   */
  verify(hash: string | null, password: string): Promise<boolean>;
}

export function makePasswords(): Passwords {
  const argon2 = new Argon2id(ARGON2);
  const inTurn = makeTurns(AT_ONCE, WAITING, busy);
  let dummy: Promise<string> | null = null;
  const dummyHash = () => (dummy ??= argon2.hash(randomBytes(24).toString('base64url')));
  // Made before the first sign-in, so that the first unknown address is not slower than the rest.
  void inTurn(dummyHash).catch(() => undefined);
  return {
    hash: (password) => inTurn(() => argon2.hash(password)),
    verify: (hash, password) =>
      inTurn(async () => {
        const known = await argon2.verify(hash ?? (await dummyHash()), password);
        return hash !== null && known;
      }),
  };
}

function busy(): Failure {
  return new Failure(
    'unavailable',
    'service.busy',
    'Too many people are signing in right now; try again in a few seconds.',
    { retryAfter: 5 },
  );
}
