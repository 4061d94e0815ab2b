import { randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdtemp, readdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { Transform, type Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import busboy from 'busboy';
import type { Request } from 'express';
import { UPLOAD_LIMITS } from '#contract/datasets';
import type { Issue } from '#contract/problems';
import { Failure } from '../http/failure';
import { invalid } from '../http/parse';
import {
  fileTooLarge,
  storageFull,
  uploadEncoded,
  uploadMalformed,
  uploadTooLarge,
  type UploadedFile,
} from './errors';

/** Form names of the two files. */
const FILES = new Map<string, UploadedFile>([
  ['nodes', 'nodes.csv'],
  ['edges', 'edges.csv'],
]);
/** Bytes of the form that are not in the files: boundaries, part headers, text fields. */
const FORM_BYTES = 256 * 1024;
const FIELD_BYTES = 16 * 1024;
const MOST_PARTS = 20;
const PREFIX = 'heddle-upload-';
/** Milliseconds. */
const ABANDONED_AFTER = 6 * 60 * 60 * 1000;

/** What arrived, under random names in a temporary folder of its own. */
export interface Upload {
  readonly fields: Readonly<Record<string, string>>;
  readonly nodesPath: string;
  readonly edgesPath: string;
}

/** The folder where uploads lie while they are read. */
export class UploadFolder {
  readonly #open = new Set<Promise<unknown>>();

  constructor(private readonly folder: string) {}

  /** Receives the form, hands it to `use`, and removes the files whatever happens. */
  async receive<T>(request: Request, use: (upload: Upload) => Promise<T>): Promise<T> {
    if ((request.get('content-encoding') ?? 'identity') !== 'identity') throw uploadEncoded();
    const work = this.#receive(request, use);
    this.#open.add(work);
    try {
      return await work;
    } catch (error) {
      const code = error instanceof Error && 'code' in error ? error.code : '';
      throw code === 'ENOSPC' || code === 'EDQUOT' ? storageFull(error) : error;
    } finally {
      this.#open.delete(work);
    }
  }

  async #receive<T>(request: Request, use: (upload: Upload) => Promise<T>): Promise<T> {
    const own = await mkdtemp(join(this.folder, PREFIX));
    try {
      return await use(await receive(request, own, UPLOAD_LIMITS.fileBytes));
    } finally {
      await rm(own, { recursive: true, force: true });
    }
  }

  /** Resolves once no upload is open and none has left a file. */
  async settled(): Promise<void> {
    await Promise.allSettled([...this.#open]);
  }

  /** Removes what servers that were killed left behind: uploads live for minutes, not for hours. */
  async removeAbandoned(): Promise<void> {
    for (const name of await readdir(this.folder)) {
      if (!name.startsWith(PREFIX)) continue;
      const own = join(this.folder, name);
      const made = await stat(own).catch(() => null);
      if (made !== null && Date.now() - made.mtimeMs > ABANDONED_AFTER) {
        await rm(own, { recursive: true, force: true });
      }
    }
  }
}

/** What is gathered while the parts of the form go by. */
interface Received {
  readonly fields: Map<string, string>;
  readonly paths: Map<UploadedFile, string>;
  readonly issues: Issue[];
  readonly writing: Promise<void>[];
  tooLarge: Failure | null;
}

async function receive(request: Request, folder: string, fileBytes: number): Promise<Upload> {
  const received: Received = {
    fields: new Map(),
    paths: new Map(),
    issues: [],
    writing: [],
    tooLarge: null,
  };
  const form = openForm(request, fileBytes);
  form.on('file', (name, stream) => receiveFile(received, name, stream, folder, fileBytes));
  form.on('field', (name, value, info) => receiveField(received, name, value, info));
  form.on('partsLimit', () => received.issues.push({ message: 'The form has too many parts.' }));
  try {
    await pipeline(request, capped(FILES.size * fileBytes + FORM_BYTES), form);
    await Promise.all(received.writing);
  } catch (error) {
    await Promise.allSettled(received.writing);
    if (error instanceof Failure) throw received.tooLarge ?? error;
    if (error instanceof Error && 'syscall' in error) throw error;
    throw uploadMalformed();
  }
  return complete(received);
}

function openForm(request: Request, fileBytes: number): busboy.Busboy {
  try {
    return busboy({
      headers: request.headers,
      defParamCharset: 'utf8',
      // busboy cuts at the limit itself: a file of exactly `fileBytes` must still pass.
      limits: {
        fileSize: fileBytes + 1,
        fieldSize: FIELD_BYTES,
        fieldNameSize: 100,
        parts: MOST_PARTS,
        headerPairs: 20,
      },
    });
  } catch {
    throw uploadMalformed();
  }
}

/** Ends an upload that is larger than the form can be; what is beyond a file's cap is passed over. */
function capped(bytes: number): Transform {
  let seen = 0;
  return new Transform({
    transform(chunk: Buffer, _encoding, next) {
      seen += chunk.length;
      if (seen > bytes) next(uploadTooLarge());
      else next(null, chunk);
    },
  });
}

function receiveFile(
  received: Received,
  name: string,
  stream: Readable,
  folder: string,
  fileBytes: number,
): void {
  const file = FILES.get(name);
  if (file === undefined || received.paths.has(file)) {
    const message =
      file === undefined
        ? 'A file under this name is not known; send `nodes` and `edges`.'
        : 'This file came twice; send it once.';
    received.issues.push({ field: name, message });
    stream.resume();
    return;
  }
  const path = join(folder, randomUUID());
  received.paths.set(file, path);
  stream.on('limit', () => (received.tooLarge ??= fileTooLarge(file, fileBytes)));
  const written = pipeline(stream, createWriteStream(path, { mode: 0o600 }));
  // Looked at when the form has ended; until then a failure must not count as unhandled.
  written.catch(() => undefined);
  received.writing.push(written);
}

function receiveField(
  received: Received,
  name: string,
  value: string,
  info: { readonly nameTruncated: boolean; readonly valueTruncated: boolean },
): void {
  const refuse = (message: string) => received.issues.push({ field: name, message });
  if (info.nameTruncated || info.valueTruncated) refuse('This field is too long; shorten it.');
  else if (FILES.has(name)) refuse('This must be a file, not text; choose the file.');
  else if (received.fields.has(name)) refuse('This field came twice; send it once.');
  else received.fields.set(name, value);
}

function complete({ fields, paths, issues, tooLarge }: Received): Upload {
  if (tooLarge !== null) throw tooLarge;
  for (const [field, file] of FILES) {
    if (!paths.has(file) && !issues.some((issue) => issue.field === field)) {
      issues.push({ field, message: `${file} is missing; choose the file.` });
    }
  }
  const nodesPath = paths.get('nodes.csv');
  const edgesPath = paths.get('edges.csv');
  if (issues.length > 0 || nodesPath === undefined || edgesPath === undefined) {
    throw invalid(issues);
  }
  return { fields: Object.fromEntries(fields), nodesPath, edgesPath };
}
