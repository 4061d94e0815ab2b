import compression from 'compression';
import type { RequestHandler } from 'express';
import helmet from 'helmet';

/**
 * Response headers of every answer. Scripts and styles come from files of this server only; figures
 * are drawn to blobs when they are exported.
 */
export function securityHeaders(secure: boolean): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': ["'none'"],
        'script-src': ["'self'"],
        'style-src': ["'self'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'font-src': ["'self'"],
        'connect-src': ["'self'"],
        'worker-src': ["'self'"],
        'manifest-src': ["'self'"],
        'base-uri': ["'none'"],
        'form-action': ["'self'"],
        'frame-ancestors': ["'none'"],
        'object-src': ["'none'"],
        ...(secure ? { 'upgrade-insecure-requests': [] } : {}),
      },
    },
    strictTransportSecurity: secure ? { maxAge: 31_536_000 } : false,
    crossOriginOpenerPolicy: { policy: 'same-origin' },
    crossOriginResourcePolicy: { policy: 'same-origin' },
    referrerPolicy: { policy: 'no-referrer' },
    xFrameOptions: { action: 'deny' },
  });
}

/** Compresses what is worth it; an event stream would be held back in the compressor's buffer. */
export function compressed(): RequestHandler {
  return compression({
    filter: (request, response) =>
      !String(response.getHeader('Content-Type')).startsWith('text/event-stream') &&
      compression.filter(request, response),
  });
}
