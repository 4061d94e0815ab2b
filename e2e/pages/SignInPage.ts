import type { Locator, Page } from '@playwright/test';
import type { Account } from '../house';

export class SignInPage {
  constructor(private readonly page: Page) {}

  get email(): Locator {
    return this.page.getByLabel('E-mail');
  }

  get password(): Locator {
    return this.page.getByLabel('Password');
  }

  get submit(): Locator {
    return this.page.getByRole('button', { name: 'Sign in', exact: true });
  }

  get problem(): Locator {
    return this.page.getByRole('alert');
  }

  /** @param wanted a page for members: its visitors come here first, and there afterwards. */
  async open(wanted = '/sign-in'): Promise<void> {
    await this.page.goto(wanted);
    await this.submit.waitFor();
  }

  async signIn(account: Account): Promise<void> {
    await this.email.fill(account.email);
    await this.password.fill(account.password);
    await this.submit.click();
    await this.page.waitForURL((url) => url.pathname !== '/sign-in');
  }
}
