import type { ServerOptions } from 'node:http';

/** Limits of one connection, in milliseconds and bytes; past them Node.js answers 408 or 431. */
export const CONNECTION_LIMITS: ServerOptions = {
  /** Until a request has arrived, body included: two files of 50 MiB at 1 Mbit/s fit. */
  requestTimeout: 15 * 60_000,
  headersTimeout: 15_000,
  keepAliveTimeout: 5_000,
  maxHeaderSize: 16 * 1024,
};
