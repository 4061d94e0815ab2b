import { readFile } from 'node:fs/promises';
import { parse } from 'csv-parse/sync';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { EDGES_CSV, NODES_CSV, PAIR_COUNT } from './network';

test('from an empty instance to a downloaded matrix', async ({
  page,
  signUpPage,
  workspacePage,
  uploadPage,
  datasetPage,
  benchPage,
  band,
}) => {
  const instance = await page.request.get('/api/instance');
  expect(await instance.json(), 'this test needs an instance without accounts').toMatchObject({
    hasAccounts: false,
  });

  await test.step('the first account names the workspace', async () => {
    await page.goto('/');
    await expect(page.getByRole('heading', { name: 'Make the first account' })).toBeVisible();
    await signUpPage.fill(newAccount('Fia First'));
    await signUpPage.workspaceName.fill('Rope yard');
    await signUpPage.submit.click();
    await expect(workspacePage.title('Rope yard')).toBeVisible();
    await expect(page.getByText('No network is here yet.')).toBeVisible();
  });

  await test.step('two files become a dataset, and what was folded is said', async () => {
    await workspacePage.twoFiles.click();
    await uploadPage.name.fill('Posts and ropes');
    await uploadPage.choose(NODES_CSV, EDGES_CSV);
    await uploadPage.submit.click();
    await expect(datasetPage.title('Posts and ropes')).toBeVisible();
    await expect(datasetPage.revisions).toContainText('1 self loop dropped.');
    await expect(datasetPage.revisions).toContainText(
      '1 edge repeated with source and target exchanged, dropped.',
    );
  });

  await test.step('a run fills the matrix', async () => {
    await datasetPage.startRun();
    await benchPage.waitUntilFull(PAIR_COUNT);
  });

  await test.step('a cell tells which bars move and how far', async () => {
    await benchPage.clickCell(4, 7, 9);
    await expect(benchPage.inspector).toContainText('Fifth post');
    await expect(benchPage.inspector).toContainText('Long rope');
    await expect(benchPage.similarity).toHaveText('0.50');
    await expect(benchPage.inspector).toContainText('A loop that lived from 5 to 8 is gone.');
    await expect(benchPage.dimensionRow(/^1 /)).toHaveText(/1\.5\s*1 of 1\s*1$/);
    await expect(benchPage.dimensionRow(/^2 /)).toHaveText(/0\s*0 of 1\s*0$/);
    await benchPage.clickCell(7, 8, 9);
    await expect(benchPage.similarity).toHaveText('1.00');
    await expect(benchPage.inspector).toContainText('No bar moves: the two may trade places.');
  });

  await test.step('communities are listed, and one becomes a group', async () => {
    await benchPage.saveFirstCommunity('Twins');
    await expect(benchPage.group('Twins')).toBeVisible();
    await page.reload();
    await expect(benchPage.group('Twins')).toBeVisible();
  });

  await test.step('pairs.csv holds every pair with its figures', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      benchPage.downloadPairs(),
    ]);
    expect(download.suggestedFilename()).toMatch(/pairs.*\.csv$/);
    checkPairs(await readFile(await download.path(), 'utf8'));
  });

  await test.step('signing out ends the session', async () => {
    const address = page.url();
    await band.signOut();
    await page.goto(address);
    await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  });
});

/** Trades worked out by hand in e2e/network.ts. */
function checkPairs(text: string): void {
  const rows: Record<string, string>[] = parse(text, { columns: true, bom: true });
  expect(rows).toHaveLength(PAIR_COUNT);
  expect(Object.keys(rows[0] ?? {})).toEqual(
    'node_a,node_b,entry_a,entry_b,bound,d0,d1,d2,d3,g0,g1,g2,g3,similarity'.split(','),
  );
  const pair = (a: string, b: string): Record<string, string> | undefined =>
    rows.find((row) => row['node_a'] === a && row['node_b'] === b);
  // The last post and the first rope: the ring closes when it is filled already, so its bar goes.
  expect(pair('p5', 'r1')).toMatchObject({
    entry_a: '5',
    entry_b: '8',
    bound: '3',
    d0: '0',
    d1: '1.5',
    d2: '0',
    g1: '1',
    similarity: '0.5',
  });
  const twins = { d0: '0', d1: '0', d2: '0', d3: '0', similarity: '1' };
  expect(pair('r1', 'r2')).toMatchObject({ bound: '2', ...twins });
  expect(pair('f1', 'f2')).toMatchObject({ bound: '1', ...twins });
}
