import type { Locator, Page } from '@playwright/test';

export class BenchPage {
  constructor(private readonly page: Page) {}

  get heading(): Locator {
    return this.page.getByRole('heading', { level: 1 });
  }

  async open(workspaceId: string, runId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/runs/${runId}`);
    await this.heading.waitFor();
  }
}
