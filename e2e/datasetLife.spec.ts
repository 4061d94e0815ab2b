import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';

test('an archived dataset is in the list only on request, and marked; it comes back', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
}) => {
  const owner = newAccount('Oda Owner');
  await house.signUp(owner);
  const { id } = await house.workspace('Comings and goings');
  const { id: datasetId } = await house.dataset(id, 'Posts and ropes');
  await signInPage.open();
  await signInPage.signIn(owner);
  await datasetPage.open(id, datasetId);
  await datasetPage.act('Archive').click();
  await expect(page.getByRole('heading', { level: 1 })).toContainText('Archived');
  await workspacePage.open(id);
  await expect(workspacePage.dataset('Posts and ropes')).toHaveCount(0);
  await workspacePage.showArchived.check();
  await expect(workspacePage.line('Posts and ropes')).toContainText('Archived');
  expect(await violations(page)).toEqual([]);
  await workspacePage.dataset('Posts and ropes').click();
  await datasetPage.act('Bring back to the list').click();
  await expect(datasetPage.act('Archive')).toBeVisible();
  await expect(page.getByRole('heading', { level: 1 })).not.toContainText('Archived');
});

test('a deleted dataset is gone from the list and its address, and can be restored', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
}) => {
  const owner = newAccount('Oda Owner');
  await house.signUp(owner);
  const { id } = await house.workspace('Going and coming');
  const { id: datasetId } = await house.dataset(id, 'Posts and ropes');
  await signInPage.open();
  await signInPage.signIn(owner);
  await datasetPage.open(id, datasetId);
  await datasetPage.act('Delete …').click();
  const dialog = page.getByRole('dialog', { name: 'Delete Posts and ropes?' });
  await expect(dialog).toContainText('1 revision');
  await expect(dialog).toContainText('It can be restored until');
  expect(await violations(page)).toEqual([]);
  await dialog.getByRole('button', { name: 'Delete the dataset' }).click();
  await expect(workspacePage.deleted).toContainText('Can be restored until');
  await expect(workspacePage.dataset('Posts and ropes')).toHaveCount(0);
  await page.goto(`/workspaces/${id}/datasets/${datasetId}`);
  await expect(page.getByRole('heading', { name: 'There is nothing here' })).toBeVisible();
  await workspacePage.open(id);
  await workspacePage.deleted.getByRole('button', { name: 'Restore Posts and ropes' }).click();
  await expect(workspacePage.dataset('Posts and ropes')).toBeVisible();
  await expect(workspacePage.deleted).toHaveCount(0);
});

test('another name removes nothing; its own removes the dataset for good', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
}) => {
  const owner = newAccount('Oda Owner');
  await house.signUp(owner);
  const { id } = await house.workspace('Gone for good');
  const { id: datasetId } = await house.dataset(id, 'Posts and ropes');
  await signInPage.open();
  await signInPage.signIn(owner);
  await datasetPage.open(id, datasetId);
  await datasetPage.act('Delete …').click();
  await page.getByRole('button', { name: 'Delete the dataset' }).click();
  await workspacePage.deleted.getByRole('button', { name: /Remove for good/ }).click();
  const dialog = page.getByRole('dialog', { name: 'Remove Posts and ropes for good?' });
  const name = dialog.getByLabel('Name of the dataset');
  await expect(name).toBeFocused();
  await name.fill('posts and ropes');
  await dialog.getByRole('button', { name: 'Remove for good' }).click();
  await expect(dialog).toContainText('This is not the name of the dataset');
  expect(await violations(page)).toEqual([]);
  await name.fill('Posts and ropes');
  await name.press('Enter');
  await expect(dialog).toHaveCount(0);
  await expect(workspacePage.deleted).toHaveCount(0);
  await page.reload();
  await workspacePage.members.waitFor();
  await expect(workspacePage.deleted).toHaveCount(0);
  await expect(workspacePage.dataset('Posts and ropes')).toHaveCount(0);
});

test('an analyst may delete a dataset, but not remove it for good', async ({
  house,
  otherHouse,
  signInPage,
  datasetPage,
}) => {
  const analyst = newAccount('Ana Lyst');
  await otherHouse.signUp(analyst);
  await house.signUp(newAccount('Oda Owner'));
  const { id } = await house.workspace('Kept');
  const dataset = await house.dataset(id, 'Posts and ropes');
  await house.addMember(id, analyst.email, 'analyst');
  await signInPage.open();
  await signInPage.signIn(analyst);
  await datasetPage.open(id, dataset.id);
  await expect(datasetPage.act('Delete …')).toBeVisible();
  await expect(datasetPage.act('Remove for good …')).toHaveCount(0);
});
