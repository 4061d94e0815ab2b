import type { Locator, Page } from '@playwright/test';

/** Where a network is grown from a model. */
export class GrowPage {
  constructor(private readonly page: Page) {}

  get nodeCount(): Locator {
    return this.field('Number of nodes');
  }

  get name(): Locator {
    return this.field('Name of the dataset');
  }

  get grow(): Locator {
    return this.page.getByRole('button', { name: 'Grow and save the dataset' });
  }

  async open(workspaceId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/models/new`);
    await this.grow.waitFor();
  }

  field(label: string): Locator {
    return this.page.getByRole('textbox', { name: label });
  }

  model(label: string): Locator {
    return this.page.getByRole('radio', { name: label });
  }
}
