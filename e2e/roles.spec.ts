import { expect, test } from './fixtures';
import { newAccount } from './house';

test('a reviewer reads a dataset but cannot start a run, and is told why', async ({
  page,
  house,
  signInPage,
  workspacePage,
  datasetPage,
  otherHouse,
  baseURL,
}) => {
  const reviewer = newAccount('Rhea Viewer');
  await otherHouse.signUp(reviewer);
  await house.signUp(newAccount('Olga Owner'));
  const { id } = await house.workspace('Reviewed networks');
  const dataset = await house.dataset(id, 'Posts and ropes');
  await house.addMember(id, reviewer.email, 'reviewer');

  await signInPage.open(`/workspaces/${id}`);
  await signInPage.signIn(reviewer);
  await expect(workspacePage.title('Reviewed networks')).toBeVisible();
  await expect(workspacePage.twoFiles).toHaveCount(0);

  await datasetPage.open(id, dataset.id);
  await expect(datasetPage.start).toHaveCount(0);
  await expect(datasetPage.startPart).toContainText('Only an owner or an analyst may start a run.');
  await expect(datasetPage.startPart).toContainText('You are reviewer');

  const refused = await page.request.post(`/api/workspaces/${id}/runs`, {
    data: { revisionId: dataset.revisions[0]?.id },
    headers: { origin: baseURL ?? '' },
  });
  expect(refused.status()).toBe(403);
});

test('an owner changes a role and removes a member after a confirmation', async ({
  page,
  house,
  signInPage,
  workspacePage,
  otherHouse,
}) => {
  const other = newAccount('Mo Member');
  await otherHouse.signUp(other);
  const owner = newAccount('Oda Owner');
  await house.signUp(owner);
  const { id } = await house.workspace('Members come and go');
  await signInPage.open();
  await signInPage.signIn(owner);
  await workspacePage.open(id);

  await workspacePage.members.getByLabel('E-mail of the person').fill(other.email);
  await workspacePage.members.getByRole('button', { name: 'Add the member' }).click();
  const role = workspacePage.members.getByLabel('Role of Mo Member');
  await expect(role).toHaveValue('analyst');
  await role.selectOption('recorder');
  await workspacePage.open(id);
  await expect(role).toHaveValue('recorder');

  await page.getByRole('button', { name: 'Remove Mo Member' }).click();
  const dialog = page.getByRole('dialog', { name: /Remove Mo Member/ });
  await expect(dialog).toContainText('can no longer read or change anything here');
  await dialog.getByRole('button', { name: 'Remove Mo Member' }).click();
  await expect(dialog).toHaveCount(0);
  await expect(role).toHaveCount(0);
});

test('an address of another workspace says that nothing is there', async ({
  page,
  house,
  signUpPage,
}) => {
  await house.signUp(newAccount('Alma Apart'));
  const { id } = await house.workspace('Apart');
  await signUpPage.open();
  await signUpPage.fill(newAccount('Sten Stranger'));
  await signUpPage.submit.click();
  await expect(page.getByRole('heading', { name: 'You are in no workspace yet' })).toBeVisible();
  await page.goto(`/workspaces/${id}`);
  await expect(page.getByRole('heading', { name: 'There is nothing here' })).toBeVisible();
});
