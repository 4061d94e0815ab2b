import type { Response } from 'express';
import { SENT, type Reply } from './route';

/** Writes a handler's reply. Answers of the API are never kept by a cache unless they say so. */
export function send(response: Response, reply: Reply): void {
  if (reply === SENT) return;
  if (!response.hasHeader('Cache-Control')) response.setHeader('Cache-Control', 'no-store');
  for (const [name, value] of Object.entries(reply.headers ?? {})) response.setHeader(name, value);
  response.status(reply.status);
  if ('json' in reply) {
    response.json(reply.json);
  } else if ('bytes' in reply) {
    const { buffer, byteOffset, byteLength } = reply.bytes;
    response.type(reply.contentType).send(Buffer.from(buffer, byteOffset, byteLength));
  } else {
    response.end();
  }
}
