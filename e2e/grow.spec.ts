import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';

test('a network is grown from a model, and its dataset says that it is invented', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
  growPage,
}) => {
  const owner = newAccount('Greta Grower');
  await house.signUp(owner);
  const { id } = await house.workspace('Nursery');
  await signInPage.open();
  await signInPage.signIn(owner);
  await workspacePage.open(id);
  await workspacePage.bringIn.click();
  await page.getByRole('link', { name: /from a model/ }).click();

  await growPage.model('Preferential attachment').check();
  await growPage.nodeCount.fill('30 or so');
  await growPage.name.fill('Grown hedge');
  await growPage.grow.click();
  await expect(growPage.nodeCount).toHaveAttribute('aria-invalid', 'true');
  expect(await violations(page)).toEqual([]);
  await growPage.nodeCount.fill('30');
  await growPage.grow.click();

  await expect(datasetPage.title('Grown hedge')).toContainText('Invented data');
  await expect(datasetPage.revisions.getByRole('cell', { name: '30', exact: true })).toBeVisible();
  expect(await violations(page)).toEqual([]);
  await workspacePage.open(id);
  await expect(workspacePage.line('Grown hedge')).toContainText('30 nodes');
});
