import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import { z } from 'zod';
import { exportKind, originalFiles } from '#contract/exports';
import { EXPORT_FILES } from '../../formats/writers/exportNetwork';
import type { Dependencies } from '../dependencies';
import { nameDownload } from '../http/download';
import { ok, route, SENT, type RouteMap } from '../http/route';
import { original, originalsOf, understood, type Download } from './usecases';

const params = z.strictObject({ workspaceId: z.uuid(), revisionId: z.uuid() });
const kindParams = params.extend({ kind: exportKind });
const fileParams = params.extend({ position: z.coerce.number().int().min(0).max(1000) });

type ExportRoutes = Pick<RouteMap, 'exportRevision' | 'originals' | 'original'>;

export function exportRoutes({ database: { db } }: Dependencies): ExportRoutes {
  return {
    exportRevision: route(
      'exportRevision',
      { params: kindParams },
      async ({ member, params: { revisionId, kind }, response }) => {
        const { name, pieces } = await understood(db, member, revisionId, kind);
        const [stem, ending] = nameAndEnding(EXPORT_FILES[kind].name);
        const file = stem === 'network' ? name : `${name} ${stem}`;
        const { mediaType } = EXPORT_FILES[kind];
        return sendFile(response, { name: file, ending, mediaType }, pieces);
      },
    ),
    originals: route('originals', { params }, async ({ member, params: { revisionId } }) => {
      const files = await originalsOf(db, member, revisionId);
      return ok(originalFiles.parse({ files: files.map(({ importId: _, ...shown }) => shown) }));
    }),
    original: route(
      'original',
      { params: fileParams },
      async ({ member, params: { revisionId, position }, response }) => {
        const { name, pieces } = await original(db, member, revisionId, position);
        const [stem, ending] = nameAndEnding(name);
        // Whatever it is, nothing is to run it: it is saved, not shown.
        const mediaType = 'application/octet-stream';
        return sendFile(response, { name: stem, ending, mediaType }, pieces);
      },
    ),
  };
}

/** "a.b.csv" → "a.b" and "csv"; a name without an ending gets "txt". */
function nameAndEnding(name: string): [string, string] {
  const found = /^(.*)\.([a-z0-9]{1,10})$/is.exec(name);
  return found ? [found[1] ?? '', found[2] ?? ''] : [name, 'txt'];
}

async function sendFile(
  response: Response,
  { name, ending, mediaType }: { name: string; ending: string; mediaType: string },
  pieces: Download['pieces'],
): Promise<typeof SENT> {
  nameDownload(response, name, ending);
  response.status(200).setHeader('Content-Type', mediaType);
  response.setHeader('Cache-Control', 'no-store');
  await pipeline(Readable.from(pieces), response);
  return SENT;
}
