import { expect, test } from './fixtures';
import { newAccount } from './house';
import { largeNetwork } from './network';

test('a run is told in pairs, survives a reload and can be stopped', async ({
  page,
  house,
  signInPage,
  datasetPage,
  benchPage,
}) => {
  const account = newAccount('Pru Progress');
  await house.signUp(account);
  const { id } = await house.workspace('Long runs');
  const dataset = await house.dataset(id, 'Three hundred buoys', largeNetwork(300, 0.12));
  await signInPage.open(`/workspaces/${id}/datasets/${dataset.id}`);
  await signInPage.signIn(account);

  await datasetPage.startRun();
  await expect(benchPage.progress).toHaveAttribute('aria-valuetext', /[1-9][\d,]* of 44,850 pairs/);
  await expect(page).toHaveTitle(/^\d+ % · Three hundred buoys, run 1 · Heddle$/);

  await page.reload();
  await expect(benchPage.progress).toHaveAttribute('aria-valuetext', /[1-9][\d,]* of 44,850 pairs/);

  await benchPage.stop.click();
  await expect(page.getByText('This run was stopped')).toBeVisible();
  await expect(page).toHaveTitle(/^stopped · /);

  await datasetPage.open(id, dataset.id);
  await expect(page.getByRole('row', { name: /Run 1/ })).toContainText(
    /stopped at [\d,]+ of 44,850/,
  );
});
