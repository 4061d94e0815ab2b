import { expect, type Locator, type Page } from '@playwright/test';

export interface TextFile {
  readonly name: string;
  readonly text: string;
}

/** As a file chooser takes them. */
export const payloads = (files: readonly TextFile[]) =>
  files.map(({ name, text }) => ({ name, mimeType: 'text/plain', buffer: Buffer.from(text) }));

/** The guided import: its beginning and its five steps. */
export class ImportPage {
  constructor(private readonly page: Page) {}

  get files(): Locator {
    return this.page.getByLabel('Files', { exact: true });
  }

  get pasted(): Locator {
    return this.page.getByLabel('Or paste the rows');
  }

  get read(): Locator {
    return this.page.getByRole('button', { name: 'Read what is in it' });
  }

  get name(): Locator {
    return this.page.getByLabel('Name of the dataset');
  }

  get description(): Locator {
    return this.page.getByLabel('Description');
  }

  get save(): Locator {
    return this.page.getByRole('button', { name: 'Save the dataset' });
  }

  get steps(): Locator {
    return this.page.getByRole('navigation', { name: 'Steps of the import' });
  }

  get growth(): Locator {
    return this.page.getByRole('application');
  }

  get problems(): Locator {
    return this.page.getByRole('region', { name: /problems? in the files/ });
  }

  step(title: string): Locator {
    return this.steps.getByRole('link', { name: title });
  }

  onward(title: string): Locator {
    return this.page.getByRole('link', { name: `On to: ${title}` });
  }

  field(label: string): Locator {
    return this.page.getByLabel(label, { exact: true });
  }

  choice(label: string): Locator {
    return this.page.getByRole('radio', { name: label });
  }

  /** Count of a line of “What is in it”. */
  count(name: string): Locator {
    return this.page
      .getByRole('row', { name: new RegExp(`^${name} `) })
      .getByRole('cell')
      .first();
  }

  async begin(workspaceId: string, files: readonly TextFile[]): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/imports/new`);
    await this.choose(files);
  }

  /** Chooses files on the page where an import begins, and waits until they are read. */
  async choose(files: readonly TextFile[]): Promise<void> {
    await this.files.setInputFiles(payloads(files));
    await this.read.click();
    await this.steps.waitFor();
  }

  /** Waits until every change has been read. */
  async settled(): Promise<void> {
    await expect(this.page.getByText('Reading again …')).toHaveCount(0);
  }
}
