import type { Locator, Page } from '@playwright/test';

/** The header band, the same on every page. */
export class BandPart {
  constructor(private readonly page: Page) {}

  get trail(): Locator {
    return this.page.getByRole('navigation', { name: 'Breadcrumb' });
  }

  get account(): Locator {
    return this.page.getByRole('button', { name: /: account$/ });
  }

  async signOut(): Promise<void> {
    await this.account.click();
    await this.page.getByRole('button', { name: 'Sign out' }).click();
    await this.page.waitForURL('**/sign-in');
  }

  async chooseTheme(theme: 'light' | 'dark'): Promise<void> {
    const html = this.page.locator('html');
    if ((await html.getAttribute('data-theme')) === theme) return;
    await this.page.getByRole('button', { name: `Switch to the ${theme} theme` }).click();
    await this.page.locator(`html[data-theme=${theme}]`).waitFor();
  }
}
