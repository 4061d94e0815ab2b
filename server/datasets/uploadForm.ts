import { randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { join } from 'node:path';
import { Transform, type Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import busboy from 'busboy';
import type { Request } from 'express';
import type { Issue } from '#contract/problems';
import { Failure } from '../http/failure';
import { invalid } from '../http/parse';
import { fileTooLarge, uploadMalformed, uploadTooLarge } from './errors';

/** Bytes of the form that are not in the files: boundaries, part headers, text fields. */
const FORM_BYTES = 256 * 1024;
const MOST_PARTS = 20;
/** A file that arrived, under a random name. */
export interface ReceivedFile {
  /** Name of the form field. */
  readonly field: string;
  /** As sent: text that somebody else chose. */
  readonly filename: string;
  readonly path: string;
}

/** What arrived, in a temporary folder of its own. */
export interface Received {
  readonly folder: string;
  readonly fields: Readonly<Record<string, string>>;
  readonly files: readonly ReceivedFile[];
}

/** What a form may hold. */
export interface FormRules {
  /** Names of the fields that hold files. */
  readonly fileFields: readonly string[];
  readonly files: number;
  readonly fileBytes: number;
  /** Bytes of a text field. */
  readonly fieldBytes: number;
  /**
   * @returns how the file is called in messages, or why it is not taken
   * @param before files taken already
   */
  readonly admit: (
    field: string,
    filename: string,
    before: readonly ReceivedFile[],
  ) => { readonly label: string } | { readonly refusal: string };
}

/** What is gathered while the parts of the form go by. */
interface Gathered {
  readonly folder: string;
  readonly rules: FormRules;
  readonly fields: Map<string, string>;
  readonly files: ReceivedFile[];
  readonly issues: Issue[];
  readonly writing: Promise<void>[];
  tooLarge: Failure | null;
}

/**
 * Writes the files of a multipart form into the folder.
 * @throws Failure for anything that is not a whole form by the rules
 */
export async function receiveForm(
  request: Request,
  folder: string,
  rules: FormRules,
): Promise<Received> {
  const gathered: Gathered = {
    folder,
    rules,
    fields: new Map(),
    files: [],
    issues: [],
    writing: [],
    tooLarge: null,
  };
  const { files, fileBytes, fieldBytes } = rules;
  const form = openForm(request, rules);
  form.on('file', (name, stream, { filename }) => receiveFile(gathered, name, filename, stream));
  form.on('field', (name, value, info) => receiveField(gathered, name, value, info));
  form.on('partsLimit', () => gathered.issues.push({ message: 'The form has too many parts.' }));
  try {
    await pipeline(request, capped(files * fileBytes + fieldBytes + FORM_BYTES), form);
    await Promise.all(gathered.writing);
  } catch (error) {
    await Promise.allSettled(gathered.writing);
    if (error instanceof Failure) throw gathered.tooLarge ?? error;
    if (error instanceof Error && 'syscall' in error) throw error;
    throw uploadMalformed();
  }
  if (gathered.tooLarge !== null) throw gathered.tooLarge;
  if (gathered.issues.length > 0) throw invalid(gathered.issues);
  return { folder, fields: Object.fromEntries(gathered.fields), files: gathered.files };
}

function openForm(request: Request, { fileBytes, fieldBytes }: FormRules): busboy.Busboy {
  try {
    return busboy({
      headers: request.headers,
      defParamCharset: 'utf8',
      // busboy cuts at the limit itself: a file of exactly `fileBytes` must still pass.
      limits: {
        fileSize: fileBytes + 1,
        fieldSize: fieldBytes,
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
  gathered: Gathered,
  field: string,
  filename: string | undefined,
  stream: Readable,
): void {
  const { folder, rules, files } = gathered;
  const admitted = rules.admit(field, filename ?? '', files);
  if ('refusal' in admitted) {
    gathered.issues.push({ field, message: admitted.refusal });
    stream.resume();
    return;
  }
  const path = join(folder, randomUUID());
  files.push({ field, filename: filename ?? '', path });
  const tooLarge = () => (gathered.tooLarge ??= fileTooLarge(admitted.label, rules.fileBytes));
  stream.on('limit', tooLarge);
  const written = pipeline(stream, createWriteStream(path, { mode: 0o600 }));
  // Looked at when the form has ended; until then a failure must not count as unhandled.
  written.catch(() => undefined);
  gathered.writing.push(written);
}

function receiveField(
  { rules, fields, issues }: Gathered,
  name: string,
  value: string,
  info: { readonly nameTruncated: boolean; readonly valueTruncated: boolean },
): void {
  const refuse = (message: string) => issues.push({ field: name, message });
  if (info.nameTruncated || info.valueTruncated) refuse('This field is too long; shorten it.');
  else if (rules.fileFields.includes(name))
    refuse('This must be a file, not text; choose the file.');
  else if (fields.has(name)) refuse('This field came twice; send it once.');
  else fields.set(name, value);
}
