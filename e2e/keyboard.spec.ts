import { expect, test } from './fixtures';
import { newAccount } from './house';
import { tabTo } from './tabTo';

test('signing in and starting a run need no mouse', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
}) => {
  const account = newAccount('Kay Keys');
  await house.signUp(account);
  const { id } = await house.workspace('By keyboard');
  await house.dataset(id, 'Posts and ropes');

  await signInPage.open(`/workspaces/${id}`);
  await tabTo(page, signInPage.email);
  await page.keyboard.type(account.email);
  await tabTo(page, signInPage.password);
  await page.keyboard.type(account.password);
  await page.keyboard.press('Enter');
  await expect(workspacePage.title('By keyboard')).toBeVisible();

  const link = workspacePage.dataset('Posts and ropes');
  await tabTo(page, link);
  await page.keyboard.press('Enter');
  await expect(datasetPage.title('Posts and ropes')).toBeVisible();

  await tabTo(page, datasetPage.scale('recorded entries'));
  await page.keyboard.press('ArrowDown');
  await expect(datasetPage.scale('arrival rank')).toBeChecked();
  await tabTo(page, datasetPage.dimension('3'));
  await page.keyboard.press('Space');
  await expect(datasetPage.dimension('3')).not.toBeChecked();
  await tabTo(page, datasetPage.start);
  await page.keyboard.press('Enter');
  await page.waitForURL('**/runs/*');
});

test('the first Tab offers to skip to the content', async ({ page, signInPage }) => {
  await signInPage.open();
  await page.keyboard.press('Tab');
  await expect(page.getByRole('link', { name: 'Skip to the content' })).toBeFocused();
  await page.keyboard.press('Enter');
  await expect(page.locator('#content')).toBeFocused();
});

test('the account menu opens, closes and gives the focus back by keyboard', async ({
  page,
  house,
  signInPage,
  band,
}) => {
  const account = newAccount('Mia Menu');
  await house.signUp(account);
  await house.workspace('Menus');
  await signInPage.open();
  await signInPage.signIn(account);
  await tabTo(page, band.account);
  await page.keyboard.press('Enter');
  const menu = page.getByRole('dialog', { name: 'Account' });
  await expect(menu).toBeVisible();
  await page.keyboard.press('Escape');
  await expect(menu).toHaveCount(0);
  await expect(band.account).toBeFocused();
});
