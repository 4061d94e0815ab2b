import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Gives each request an id of its own, tells it to the client and logs one line when it ends. */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (_request, response) => {
      const id = randomUUID();
      response.setHeader('X-Request-Id', id);
      return id;
    },
    // What went wrong is logged once, by the error handler; this is the line that the request ended.
    customLogLevel: () => 'debug',
    serializers: {
      // Cookies, passwords and addresses of people stay out of the log.
      req: (request: { id: unknown; method: unknown; url: unknown }) => ({
        id: request.id,
        method: request.method,
        url: request.url,
      }),
      res: (response: { statusCode: unknown }) => ({ statusCode: response.statusCode }),
    },
  });
}
