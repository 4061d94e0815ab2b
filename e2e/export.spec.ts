import { readFileSync } from 'node:fs';
import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { payloads } from './pages/ImportPage';
import { tabTo } from './tabTo';

test('a revision is taken out by keyboard and comes back with the same content hash', async ({
  page,
  house,
  signInPage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Xenia Export');
  await house.signUp(account);
  const { id } = await house.workspace('Out and in');
  const dataset = await house.dataset(id, 'Fen posts');
  const hash = dataset.revisions[0]?.contentHash ?? '';
  await signInPage.open(`/workspaces/${id}/datasets/${dataset.id}`);
  await signInPage.signIn(account);
  await expect(datasetPage.exports.getByRole('link', { name: 'edges.csv' })).toHaveCount(2);
  expect(await violations(page)).toEqual([]);

  const download = page.waitForEvent('download');
  await tabTo(page, datasetPage.exports.getByRole('link', { name: 'GraphML' }), 80);
  await page.keyboard.press('Enter');
  const file = await download;
  expect(file.suggestedFilename()).toBe('Fen posts revision 1.graphml');
  const text = readFileSync(await file.path(), 'utf8');

  await page.goto(`/workspaces/${id}/imports/new`);
  await importPage.choose([{ name: 'back.graphml', text }]);
  await importPage.step('Save').click();
  await importPage.name.fill('Fen posts again');
  await importPage.save.click();
  await page.waitForURL('**/datasets/*');
  await expect(datasetPage.title('Fen posts again')).toBeVisible();
  await expect(page.getByLabel(`Hash ${hash}`)).toBeVisible();

  const original = page.waitForEvent('download');
  await datasetPage.exports.getByRole('link', { name: 'back.graphml' }).click();
  const [sent] = payloads([{ name: 'back.graphml', text }]);
  expect(readFileSync(await (await original).path())).toEqual(sent?.buffer);
});

test('a format that cannot hold a text of the network says so beside it', async ({
  page,
  house,
  signInPage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Uma Unwritable');
  await house.signUp(account);
  const { id } = await house.workspace('Odd labels');
  await signInPage.open(`/workspaces/${id}/imports/new`);
  await signInPage.signIn(account);
  const nodes = [
    { id: 'a', label: 'odd \uffff', entry: 1 },
    { id: 'b', label: 'plain', entry: 2 },
  ];
  const text = JSON.stringify({ nodes, links: [{ source: 'a', target: 'b' }] });
  await importPage.choose([{ name: 'odd.json', text }]);
  await importPage.step('Save').click();
  await importPage.name.fill('Odd');
  await importPage.save.click();
  await page.waitForURL('**/datasets/*');
  await datasetPage.exports.getByRole('link', { name: 'GraphML' }).click();
  await expect(datasetPage.exports.getByText(/XML cannot hold\. Take JSON or CSV/)).toBeVisible();
  await expect(datasetPage.title('Odd')).toBeVisible();
});
