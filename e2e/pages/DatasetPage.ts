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

  get changes(): Locator {
    return this.page.getByRole('region', { name: 'What changed' });
  }

  get away(): Locator {
    return this.page.getByRole('region', { name: 'Put away or remove' });
  }

  /** Opens what a revision has otherwise than the one before it. */
  async compare(number: number): Promise<void> {
    await this.changes.getByText(`Revision ${number} against revision ${number - 1}`).click();
  }

  /** A table of differences, by its caption. */
  difference(caption: string): Locator {
    return this.changes.getByRole('table', { name: caption });
  }

  /** Opens a way to make a revision from another, and gives its form. */
  async making(title: string): Promise<Locator> {
    const part = this.page.getByRole('group').filter({ hasText: title }).last();
    await part.getByText(title).click();
    return part;
  }

  act(label: string): Locator {
    return this.away.getByRole('button', { name: label });
  }
}
