import {
  importDraft,
  savedImport,
  type ImportDraft,
  type SavedImport,
} from '../../server/contract/imports';
import type { AppOptions } from './app';
import type { Answer, Client } from './client';
import { importForm } from './factories';
import { Uploading } from './uploading';

/** Somebody who brings networks in by drafts. */
export class Importing {
  constructor(
    readonly up: Uploading,
    readonly client: Client = up.owner,
  ) {}

  static async open(options?: AppOptions): Promise<Importing> {
    return new Importing(await Uploading.open(options));
  }

  get path(): string {
    return `${this.up.workspacePath}/imports`;
  }

  send(
    files: Readonly<Record<string, string | Blob>>,
    fields: Readonly<Record<string, string>> = {},
  ): Promise<Answer> {
    return this.client.ask(this.path, { form: importForm(files, fields) });
  }

  async begin(...sent: Parameters<Importing['send']>): Promise<ImportDraft> {
    return this.#draft(await this.send(...sent), 201);
  }

  async look(id: string): Promise<ImportDraft> {
    return this.#draft(await this.client.get(`${this.path}/${id}`), 200);
  }

  ask(id: string, json: object): Promise<Answer> {
    return this.client.ask(`${this.path}/${id}`, { method: 'PATCH', json });
  }

  async change(id: string, json: object): Promise<ImportDraft> {
    return this.#draft(await this.ask(id, json), 200);
  }

  save(id: string, json: object): Promise<Answer> {
    return this.client.post(`${this.path}/${id}/save`, json);
  }

  async saved({ id, version }: ImportDraft, json: object): Promise<SavedImport> {
    const answer = await this.save(id, { version, ...json });
    if (answer.status !== 201) throw new Error(answer.text);
    return answer.read(savedImport);
  }

  #draft(answer: Answer, status: number): ImportDraft {
    if (answer.status !== status) throw new Error(`${answer.status}: ${answer.text}`);
    return answer.read(importDraft);
  }
}
