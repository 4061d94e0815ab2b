import type { Locator, Page } from '@playwright/test';

export class DatasetPage {
  constructor(private readonly page: Page) {}

  get revisions(): Locator {
    return this.page.getByRole('region', { name: 'Revisions' });
  }

  get exports(): Locator {
    return this.page.getByRole('region', { name: 'Export' });
  }

  get startPart(): Locator {
    return this.page.getByRole('region', { name: 'Start a run' });
  }

  get start(): Locator {
    return this.page.getByRole('button', { name: 'Start the run' });
  }

  async open(workspaceId: string, datasetId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/datasets/${datasetId}`);
    await this.revisions.waitFor();
  }

  title(name: string): Locator {
    return this.page.getByRole('heading', { level: 1, name });
  }

  dimension(label: string): Locator {
    return this.page.getByRole('checkbox', { name: label });
  }

  scale(label: string): Locator {
    return this.page.getByRole('radio', { name: label });
  }

  async startRun(): Promise<void> {
    await this.start.click();
    await this.page.waitForURL('**/runs/*');
  }
}
