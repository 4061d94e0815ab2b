import { Failure } from './failure';

const NETWORK = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ENOENT',
  'ENOTFOUND',
  'EAI_AGAIN',
  'EHOSTUNREACH',
  'ENETUNREACH',
  'EPIPE',
  'ETIMEDOUT',
]);
/** SQLSTATE (PostgreSQL manual, appendix A): shut down, crashed, starting, too many connections. */
const AWAY = new Set(['57P01', '57P02', '57P03', '53300', '53400']);
/** Disk full, out of memory, read only while it recovers. */
const STUCK = new Set(['53000', '53100', '53200', '25006']);
/** Statement or lock took too long, deadlock, idle transaction ended. */
const SLOW = new Set(['57014', '55P03', '40P01', '40001', '25P03']);
const DRIVER =
  /connection terminated|timeout exceeded when trying to connect|timeout expired|client has encountered a connection error|cannot use a pool after/i;

/** @returns a 503 refusal where PostgreSQL is away, full or too slow; null for any other error. */
export function databaseFailure(error: unknown): Failure | null {
  for (const link of chain(error)) {
    const code = 'code' in link && typeof link.code === 'string' ? link.code : '';
    if (!fromDatabase(link, code)) continue;
    if (SLOW.has(code)) {
      return new Failure(
        'unavailable',
        'service.busy',
        'The database took too long; try again in a moment.',
        { cause: error, retryAfter: 2 },
      );
    }
    return new Failure(
      'unavailable',
      'service.database_unavailable',
      'The database cannot be reached; nothing was saved. Try again in a moment.',
      { cause: error, retryAfter: 2 },
    );
  }
  return null;
}

function fromDatabase(link: Error, code: string): boolean {
  const sqlState = AWAY.has(code) || STUCK.has(code) || SLOW.has(code) || /^08\w{3}$/.test(code);
  // ENOENT and the like also come from files: only a failed connect of a socket counts.
  const socket = NETWORK.has(code) && (!('syscall' in link) || link.syscall !== 'open');
  return sqlState || socket || DRIVER.test(link.message);
}

/** The error, its causes, and the members of aggregates; at most ten links. */
function chain(error: unknown): Error[] {
  const found: Error[] = [];
  const waiting: unknown[] = [error];
  while (waiting.length > 0 && found.length < 10) {
    const next = waiting.shift();
    if (!(next instanceof Error)) continue;
    found.push(next);
    waiting.push(next.cause);
    if (next instanceof AggregateError) for (const one of next.errors) waiting.push(one);
  }
  return found;
}
