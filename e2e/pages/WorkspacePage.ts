import type { Locator, Page } from '@playwright/test';

export class WorkspacePage {
  constructor(private readonly page: Page) {}

  /** Begins a guided import. */
  get bringIn(): Locator {
    return this.page.getByRole('link', { name: 'Bring in a network' });
  }

  /** The short way for two files that are as the samples. */
  get twoFiles(): Locator {
    return this.page.getByRole('link', { name: 'Two files at once' });
  }

  /** An import that was begun. */
  begun(name: string): Locator {
    return this.page.getByRole('region', { name: 'Begun imports' }).getByRole('link', { name });
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

  get showArchived(): Locator {
    return this.page.getByRole('checkbox', { name: 'Show archived' });
  }

  /** Datasets that were deleted and can be restored. */
  get deleted(): Locator {
    return this.page.getByRole('region', { name: 'Deleted' });
  }

  /** The line of a dataset in the list. */
  line(name: string): Locator {
    return this.page.getByRole('listitem').filter({ has: this.dataset(name) });
  }
}
