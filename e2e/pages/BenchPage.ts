import { expect, type Locator, type Page } from '@playwright/test';
import { arrivalAxis } from '../../src/drawings/arrivalAxis';
import { cellCentre, clothGeometry } from '../../src/drawings/clothGeometry';

export class BenchPage {
  constructor(private readonly page: Page) {}

  get heading(): Locator {
    return this.page.getByRole('heading', { level: 1 });
  }

  get facts(): Locator {
    return this.page.getByRole('list', { name: 'Parameters of the run' });
  }

  get cloth(): Locator {
    return this.page.getByRole('application', { name: /^Cloth of/ });
  }

  get inspector(): Locator {
    return this.page.getByRole('complementary', { name: 'Inspector' });
  }

  /** The large figure of the pair's face. */
  get similarity(): Locator {
    return this.inspector
      .locator('div')
      .filter({ has: this.page.getByText('similarity', { exact: true }) })
      .locator('.figure')
      .first();
  }

  async open(workspaceId: string, runId: string): Promise<void> {
    await this.page.goto(`/workspaces/${workspaceId}/runs/${runId}`);
    await this.heading.waitFor();
  }

  /** Waits until the run is finished and every pair is there. */
  async waitUntilFull(pairs: number): Promise<void> {
    await expect(this.page).toHaveURL(/\/runs\//);
    await expect(this.facts).toContainText('finished');
    await expect(this.facts).toContainText(`${pairs} of ${pairs} pairs`);
  }

  get progress(): Locator {
    return this.page.getByRole('progressbar', { name: /^Run/ });
  }

  get stop(): Locator {
    return this.page.getByRole('button', { name: /^Stop run/ });
  }

  /** The row of a dimension in the pair's table: distance, bars moved, Betti gap. */
  dimensionRow(name: RegExp): Locator {
    return this.inspector.getByRole('row', { name });
  }

  /** Clicks the lozenge of two arrival positions of n, where the cloth's geometry puts it. */
  async clickCell(p: number, q: number, n: number): Promise<void> {
    await this.cloth.scrollIntoViewIfNeeded();
    const box = await this.cloth.boundingBox();
    if (box === null) throw new Error('The cloth is not shown.');
    const cloth = clothGeometry(arrivalAxis(n, box.width, null), box.height);
    const { x, y } = cellCentre(cloth, { p, q });
    await this.cloth.click({ position: { x, y } });
  }

  async face(name: 'Pair' | 'Node' | 'Group'): Promise<void> {
    await this.inspector.getByRole('tab', { name }).click();
  }

  /** Selects the first community of the list and saves it as a group. */
  async saveFirstCommunity(name: string): Promise<void> {
    await this.face('Group');
    const communities = this.inspector.getByRole('table');
    await communities.getByRole('button').first().click();
    await this.inspector.getByLabel('name of the group').fill(name);
    await this.inspector.getByRole('button', { name: 'Save group' }).click();
  }

  /** A saved group in the list. */
  group(name: string): Locator {
    return this.inspector.getByRole('listitem').filter({ hasText: name });
  }

  async downloadPairs(): Promise<void> {
    await this.page.getByRole('link', { name: 'pairs.csv' }).click();
  }
}
