import { createWriteStream } from 'node:fs';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { importChoices, sourceHint, type ImportChoices } from '#contract/importChoices';
import type { Db } from '../../db/client';
import { findRemembered } from '../../db/repositories/columnMemory';
import { importPiecesOf, listImportFiles } from '../../db/repositories/importFiles';
import type { ImportRow } from '../../db/repositories/imports';
import type { Scope } from '../../db/repositories/scope';
import { guessChoices } from '../../formats/understanding/guessChoices';
import { NOTHING_FOUND } from '../../formats/understanding/found';
import type { UploadFolder } from '../datasets/upload';
import { Failure } from '../http/failure';
import { draftView } from '../reading/draftView';
import type { DraftFile, DraftRequest, ReadDraft } from '../reading/messages';
import { unreadFile } from '../reading/preview';
import type { Reader } from '../reading/reader';

/** What use cases of imports work with. */
export interface ImportTools {
  readonly db: Db;
  readonly uploads: UploadFolder;
  readonly reader: Reader;
}

/** Writes the files of an import into a folder, gives `use` what to read, and removes them. */
export function withFiles<T>(
  { db, uploads }: ImportTools,
  scope: Scope,
  { id, choices }: Pick<ImportRow, 'id' | 'choices'>,
  use: (request: DraftRequest) => Promise<T>,
): Promise<T> {
  return uploads.within(async (folder) => {
    const files: DraftFile[] = [];
    for (const row of await listImportFiles(db, scope, [id])) {
      const { position, name, bytes, pasted, hint } = row;
      const path = join(folder, `file-${position}`);
      const pieces = Readable.from(importPiecesOf(db, scope, id, position));
      await pipeline(pieces, createWriteStream(path, { mode: 0o600 }));
      files.push({ path, name, bytes, pasted, hint: sourceHint.parse(hint) });
    }
    return use({ folder, files, choices: choices === null ? null : importChoices.parse(choices) });
  });
}

/** Reads an import by its choices; without any, by those remembered for its columns, else guessed. */
export async function readByMemory(
  { db, reader }: ImportTools,
  scope: Scope,
  request: DraftRequest,
): Promise<ReadDraft> {
  try {
    const read = await reader.readDraft(request);
    const { signature, guessed } = read.view;
    if (request.choices !== null || signature === null) return read;
    const remembered = rememberedChoices(await findRemembered(db, scope, signature), guessed);
    if (remembered === null) return read;
    const again = await reader.readDraft({ ...request, choices: remembered });
    return { ...again, view: { ...again.view, remembered: true } };
  } catch (error) {
    if (error instanceof Failure && error.kind !== 'unavailable') return unread(request, error);
    throw error;
  }
}

/** Which columns are what is remembered; how much of the edges to keep belongs to each network. */
function rememberedChoices(stored: unknown, guessed: ImportChoices): ImportChoices | null {
  if (stored === null) return null;
  const parsed = importChoices.safeParse(stored);
  return parsed.success ? { ...parsed.data, weights: guessed.weights } : null;
}

/** A draft whose files were not read to an end says so like any other problem. */
function unread({ files, choices }: DraftRequest, { detail }: Failure): ReadDraft {
  const guessed = guessChoices([]).choices;
  const view = draftView.parse({
    files: files.map(unreadFile),
    choices: choices ?? guessed,
    guessed,
    remembered: false,
    questions: [],
    found: NOTHING_FOUND,
    issues: [{ message: detail }],
    issuesLeftOut: 0,
    ready: false,
    growth: null,
    signature: null,
  });
  return { view, weights: null, growth: null };
}
