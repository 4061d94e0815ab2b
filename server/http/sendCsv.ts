import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import { csvLines, type Cell } from '../../formats/csv';
import { nameDownload } from './download';
import { SENT } from './route';

/** Answers with a table as a file to save, row by row. @param name without its ending */
export async function sendCsv(
  response: Response,
  name: string,
  header: readonly string[],
  rows: AsyncIterable<readonly Cell[]> | Iterable<readonly Cell[]>,
): Promise<typeof SENT> {
  nameDownload(response, name, 'csv');
  response.status(200).setHeader('Content-Type', 'text/csv; charset=utf-8');
  response.setHeader('Cache-Control', 'no-store');
  await pipeline(Readable.from(csvLines(header, rows)), response);
  return SENT;
}
