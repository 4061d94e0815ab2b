import { mkdtemp, readdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import type { Request } from 'express';
import { storageFull, uploadEncoded } from './errors';
import { receiveForm, type FormRules, type Received } from './uploadForm';

const PREFIX = 'heddle-upload-';
/** Milliseconds. */
const ABANDONED_AFTER = 6 * 60 * 60 * 1000;

/** The folder where uploads lie while they are read. */
export class UploadFolder {
  readonly #open = new Set<Promise<unknown>>();

  constructor(private readonly folder: string) {}

  /** Receives the form, hands it to `use`, and removes the files whatever happens. */
  async receive<T>(
    request: Request,
    rules: FormRules,
    use: (received: Received) => Promise<T>,
  ): Promise<T> {
    if ((request.get('content-encoding') ?? 'identity') !== 'identity') throw uploadEncoded();
    return this.within(async (folder) => use(await receiveForm(request, folder, rules)));
  }

  /** Gives `use` a folder of its own, and removes it whatever happens. */
  async within<T>(use: (folder: string) => Promise<T>): Promise<T> {
    const work = this.#within(use);
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

  async #within<T>(use: (folder: string) => Promise<T>): Promise<T> {
    const own = await mkdtemp(join(this.folder, PREFIX));
    try {
      return await use(own);
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
