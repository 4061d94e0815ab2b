import express, { type RequestHandler } from 'express';
import { Failure } from './failure';

/** Bytes of a JSON body: 5,000 node ids of 300 characters fit. */
const JSON_BYTES = 8 * 1024 * 1024;

export const readJson: RequestHandler = express.json({ limit: JSON_BYTES, strict: true });

/** A route that takes JSON takes nothing else; forms of other sites cannot send it. */
export const requireJson: RequestHandler = (request, _response, next) => {
  if (/^application\/json\s*(;|$)/i.test(request.get('content-type') ?? '')) return next();
  next(
    new Failure(
      'unsupported',
      'request.unsupported_content',
      'Send a JSON object with the header Content-Type: application/json.',
    ),
  );
};

export const requireMultipart: RequestHandler = (request, _response, next) => {
  if (/^multipart\/form-data\s*;/i.test(request.get('content-type') ?? '')) return next();
  next(
    new Failure(
      'unsupported',
      'request.unsupported_content',
      'Send the files as a form with the header Content-Type: multipart/form-data.',
    ),
  );
};

/** A route without a body refuses one, so that nothing sent is passed over in silence. */
export const requireNoBody: RequestHandler = (request, _response, next) => {
  const length = request.get('content-length') ?? '0';
  if (length === '0' && request.get('transfer-encoding') === undefined) return next();
  next(
    new Failure('malformed', 'request.unexpected_body', 'This request takes no body; send none.'),
  );
};
