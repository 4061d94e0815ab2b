import type { Locator, Page } from '@playwright/test';
import { csvFile } from '../network';

export class UploadPage {
  constructor(private readonly page: Page) {}

  get name(): Locator {
    return this.page.getByLabel('Name of the dataset');
  }

  get description(): Locator {
    return this.page.getByLabel('Description');
  }

  get nodes(): Locator {
    return this.page.getByLabel('nodes.csv', { exact: true });
  }

  get edges(): Locator {
    return this.page.getByLabel('edges.csv', { exact: true });
  }

  get submit(): Locator {
    return this.page.getByRole('button', { name: 'Save the dataset' });
  }

  get problems(): Locator {
    return this.page.getByRole('alert');
  }

  get download(): Locator {
    return this.page.getByRole('button', { name: 'Download the list (CSV)' });
  }

  async open(workspaceId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/datasets/new`);
    await this.submit.waitFor();
  }

  async choose(nodes: string, edges: string): Promise<void> {
    await this.nodes.setInputFiles(csvFile('nodes.csv', nodes));
    await this.edges.setInputFiles(csvFile('edges.csv', edges));
  }

  /** The cells of every listed problem: file, line, column, what is wrong. */
  async listed(): Promise<string[][]> {
    const rows = await this.problems.locator('tbody tr').all();
    return Promise.all(
      rows.map(async (row) => (await row.getByRole('cell').allTextContents()).map((t) => t.trim())),
    );
  }
}
