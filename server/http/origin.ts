import type { RequestHandler } from 'express';
import { isLoopback } from '../config';
import { Failure } from './failure';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses unsafe methods that another site started: by Sec-Fetch-Site where the browser sends it,
 * else by the exact Origin. Without a public origin only loopback pages over http are ours, on the
 * host they were asked from.
 */
export function requireSameOrigin(publicOrigin: string | null): RequestHandler {
  return (request, _response, next) => {
    if (SAFE.has(request.method)) return next();
    const site = request.get('sec-fetch-site');
    const origin = request.get('origin');
    if (site !== undefined) return next(site === 'same-origin' ? undefined : foreign());
    const own = publicOrigin ?? loopbackOrigin(request.get('host'));
    next(own !== null && origin === own ? undefined : foreign());
  };
}

function loopbackOrigin(host: string | undefined): string | null {
  if (host === undefined || !URL.canParse(`http://${host}`)) return null;
  const { hostname, origin } = new URL(`http://${host}`);
  return isLoopback(hostname) ? origin : null;
}

function foreign(): Failure {
  return new Failure(
    'forbidden',
    'request.foreign_origin',
    'Changes are accepted from the pages of this server only; open it by its own address.',
  );
}
