import type { Locator, Page } from '@playwright/test';

export class WorkspacePage {
  constructor(private readonly page: Page) {}

  get bringIn(): Locator {
    return this.page.getByRole('link', { name: 'Bring a network in' });
  }

  get members(): Locator {
    return this.page.getByRole('region', { name: 'Members' });
  }

  async open(workspaceId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}`);
    await this.members.waitFor();
  }

  title(name: string): Locator {
    return this.page.getByRole('heading', { level: 1, name });
  }

  dataset(name: string): Locator {
    return this.page.getByRole('link', { name, exact: true });
  }
}
