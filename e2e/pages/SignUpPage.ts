import type { Locator, Page } from '@playwright/test';
import type { Account } from '../house';

export class SignUpPage {
  constructor(private readonly page: Page) {}

  get name(): Locator {
    return this.page.getByLabel('Your name');
  }

  get email(): Locator {
    return this.page.getByLabel('E-mail');
  }

  get password(): Locator {
    return this.page.getByLabel('Password');
  }

  get workspaceName(): Locator {
    return this.page.getByLabel('Name of the workspace');
  }

  get submit(): Locator {
    return this.page.getByRole('button', { name: 'Make the account' });
  }

  async open(): Promise<void> {
    await this.page.goto('/sign-up');
    await this.submit.waitFor();
  }

  async fill(account: Account): Promise<void> {
    await this.name.fill(account.name);
    await this.email.fill(account.email);
    await this.password.fill(account.password);
  }
}
