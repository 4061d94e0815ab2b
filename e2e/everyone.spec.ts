import type { Page } from '@playwright/test';
import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { WRONG_EDGES_CSV, WRONG_NODES_CSV } from './network';

for (const theme of ['light', 'dark'] as const) {
  for (const width of [1440, 390]) {
    test.describe(`${theme}, ${width} px wide`, () => {
      test.use({ colorScheme: theme, viewport: { width, height: 900 }, reducedMotion: 'reduce' });

      test('pages for visitors have no A or AA violation and do not overflow', async ({
        page,
        signInPage,
        signUpPage,
      }) => {
        await signInPage.open();
        await expect(page.locator('html')).toHaveAttribute('data-theme', theme);
        expect(await violations(page)).toEqual([]);
        await signInPage.submit.click();
        await expect(page.getByText('Write an e-mail address')).toBeVisible();
        expect(await violations(page)).toEqual([]);
        await signUpPage.open();
        expect(await violations(page)).toEqual([]);
        await page.goto('/nowhere');
        await expect(page.getByRole('heading', { name: 'There is no such page' })).toBeVisible();
        expect(await violations(page)).toEqual([]);
        expect(await overflow(page)).toBeLessThanOrEqual(0);
      });

      test('pages for members have no A or AA violation and do not overflow', async ({
        page,
        house,
        signInPage,
        workspacePage,
        uploadPage,
        datasetPage,
        benchPage,
        band,
      }) => {
        const account = newAccount('Eve Ryone');
        await house.signUp(account);
        const empty = await house.workspace('Empty');
        const full = await house.workspace('Full');
        const dataset = await house.dataset(full.id, 'Posts and ropes');
        const run = await house.finishedRun(full.id, dataset);
        await signInPage.open();
        await signInPage.signIn(account);
        const check = async (what: string): Promise<void> => {
          expect(await violations(page), what).toEqual([]);
          expect(await overflow(page), `${what} overflows`).toBeLessThanOrEqual(0);
        };

        await page.goto('/?all');
        await expect(page.getByRole('heading', { name: 'Your workspaces' })).toBeVisible();
        await check('workspaces');
        await workspacePage.open(empty.id);
        await check('an empty workspace');
        await workspacePage.open(full.id);
        await check('a workspace');
        await band.account.click();
        await expect(page.getByRole('dialog', { name: 'Account' })).toBeVisible();
        await check('the account menu');
        await page.keyboard.press('Escape');
        await page.getByRole('button', { name: 'Remove Eve Ryone' }).click();
        await expect(page.getByRole('dialog', { name: /Remove Eve/ })).toBeVisible();
        await check('a confirmation');
        await uploadPage.open(full.id);
        await check('an upload');
        await uploadPage.name.fill('Wrong');
        await uploadPage.choose(WRONG_NODES_CSV, WRONG_EDGES_CSV);
        await uploadPage.submit.click();
        await expect(uploadPage.problems).toBeVisible();
        await check('an upload with problems');
        await datasetPage.open(full.id, dataset.id);
        await check('a dataset');
        await benchPage.open(full.id, run.id);
        await check('the bench');
        await page.goto(`/workspaces/${full.id}/datasets/${empty.id}`);
        await expect(page.getByRole('heading', { name: 'There is nothing here' })).toBeVisible();
        await check('a missing dataset');
      });
    });
  }
}

/** @returns pixels by which the page is wider than its window. */
const overflow = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);

test('the chosen theme stays after a reload, whatever the system prefers', async ({
  page,
  band,
  signInPage,
}) => {
  await page.emulateMedia({ colorScheme: 'light' });
  await signInPage.open();
  await band.chooseTheme('dark');
  await page.reload();
  await signInPage.submit.waitFor();
  await expect(page.locator('html')).toHaveAttribute('data-theme', 'dark');
});
