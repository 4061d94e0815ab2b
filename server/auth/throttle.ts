import { createHash } from 'node:crypto';
import { Redis } from 'ioredis';
import type { Logger } from 'pino';
import {
  RateLimiterMemory,
  RateLimiterRedis,
  RateLimiterRes,
  type RateLimiterAbstract,
} from 'rate-limiter-flexible';
import { emailKeyOf } from '../../db/repositories/users';
import { Failure } from '../http/failure';

/** Attempts within the window, in seconds. Common practice, not a measured figure. */
export interface ThrottleLimits {
  readonly account: { readonly points: number; readonly duration: number };
  readonly address: { readonly points: number; readonly duration: number };
  readonly signUp: { readonly points: number; readonly duration: number };
}

export const THROTTLE_LIMITS: ThrottleLimits = {
  account: { points: 10, duration: 15 * 60 },
  address: { points: 100, duration: 15 * 60 },
  signUp: { points: 50, duration: 60 * 60 },
};

export interface Throttle {
  /** Counts an attempt to sign in. @throws Failure `session.too_many_attempts` */
  beforeSignIn(email: string, address: string): Promise<void>;
  /** A right password forgets the attempts on the account. */
  afterSignIn(email: string): Promise<void>;
  /** Counts a new account from an address. @throws Failure `accounts.too_many` */
  beforeSignUp(address: string): Promise<void>;
  close(): Promise<void>;
}

/**
 * Counts in Redis where there is one, so that every process counts together; while Redis is away,
 * and without one, each process counts in its own memory.
 * @param prefix first part of every key in Redis
 */
export function makeThrottle(
  redisUrl: string | null,
  log: Logger,
  limits: ThrottleLimits = THROTTLE_LIMITS,
  prefix = 'heddle',
): Throttle {
  const redis = redisUrl === null ? null : connect(redisUrl, log);
  const tried = redis === null ? Promise.resolve() : firstTry(redis);
  const account = makeLimiter(redis, `${prefix}-sign-in-account`, limits.account);
  const address = makeLimiter(redis, `${prefix}-sign-in-address`, limits.address);
  const signUp = makeLimiter(redis, `${prefix}-sign-up-address`, limits.signUp);
  return {
    beforeSignIn: async (email, from) => {
      const code = 'session.too_many_attempts';
      await tried;
      await consume(address, from, code, 'sign in from this address');
      await consume(account, keyOf(email), code, 'sign in to this account');
    },
    afterSignIn: async (email) => {
      await account.delete(keyOf(email));
    },
    beforeSignUp: async (from) => {
      await tried;
      await consume(signUp, from, 'accounts.too_many', 'make an account from this address');
    },
    close: () => {
      redis?.disconnect();
      return Promise.resolve();
    },
  };
}

/** Addresses of people are not kept in Redis. */
const keyOf = (email: string) => createHash('sha256').update(emailKeyOf(email)).digest('base64url');

function connect(url: string, log: Logger): Redis {
  const redis = new Redis(url, {
    enableOfflineQueue: false,
    maxRetriesPerRequest: 1,
    connectTimeout: 2_000,
    commandTimeout: 2_000,
    retryStrategy: (times) => Math.min(times * 200, 2_000),
  });
  redis.on('error', (error) => log.warn({ err: error }, 'Redis is away; attempts count in memory'));
  return redis;
}

/** Resolves once Redis has answered or failed to: the first attempts are not to miss it. */
function firstTry(redis: Redis): Promise<void> {
  return new Promise((resolve) => {
    redis.once('ready', () => resolve());
    redis.once('error', () => resolve());
    redis.once('end', () => resolve());
  });
}

function makeLimiter(
  redis: Redis | null,
  name: string,
  limit: { readonly points: number; readonly duration: number },
): RateLimiterAbstract {
  const options = { ...limit, keyPrefix: name };
  const inMemory = new RateLimiterMemory(options);
  if (redis === null) return inMemory;
  return new RateLimiterRedis({
    ...options,
    storeClient: redis,
    insuranceLimiter: inMemory,
    rejectIfRedisNotReady: true,
  });
}

async function consume(
  limiter: RateLimiterAbstract,
  key: string,
  code: string,
  deed: string,
): Promise<void> {
  try {
    await limiter.consume(key);
  } catch (error) {
    if (!(error instanceof RateLimiterRes)) throw error;
    const seconds = Math.max(1, Math.ceil(error.msBeforeNext / 1000));
    const wait = seconds < 90 ? `${seconds} seconds` : `${Math.ceil(seconds / 60)} minutes`;
    throw new Failure(
      'throttled',
      code,
      `Too many attempts to ${deed}; wait ${wait}, then try again.`,
      { retryAfter: seconds },
    );
  }
}
