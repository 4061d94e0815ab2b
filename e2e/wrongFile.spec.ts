import { readFile } from 'node:fs/promises';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { EDGES_CSV, NODES_CSV, WRONG_EDGES_CSV, WRONG_NODES_CSV } from './network';

test('a wrong file lists its problems by line and column, saves nothing and keeps what was typed', async ({
  page,
  house,
  signInPage,
  uploadPage,
  workspacePage,
  datasetPage,
}) => {
  const account = newAccount('Wilma Wright');
  await house.signUp(account);
  const { id } = await house.workspace('Wrong files');
  await signInPage.open();
  await signInPage.signIn(account);

  await uploadPage.open(id);
  await uploadPage.name.fill('Posts and ropes');
  await uploadPage.description.fill('Invented for a test.');
  await uploadPage.choose(WRONG_NODES_CSV, WRONG_EDGES_CSV);
  await uploadPage.submit.click();

  await expect(
    uploadPage.problems.getByRole('heading', { name: /problems in the files; nothing was saved/ }),
  ).toBeVisible();
  const listed = await uploadPage.listed();
  const places = listed.map(([file, line, column]) => `${file} ${line} ${column}`);
  expect(places).toContain('nodes.csv 3 entry');
  expect(places).toContain('nodes.csv 5 id');
  for (const cells of listed) expect(cells[3]).not.toBe('');

  const [download] = await Promise.all([
    page.waitForEvent('download'),
    uploadPage.download.click(),
  ]);
  const saved = await readFile(await download.path(), 'utf8');
  expect(saved.split('\r\n')[0]).toBe('file,line,column,problem');
  expect(saved).toContain('nodes.csv,3,entry,');

  await expect(uploadPage.name).toHaveValue('Posts and ropes');
  await expect(uploadPage.description).toHaveValue('Invented for a test.');

  const unsaved = await page.request.get(`/api/workspaces/${id}/datasets`);
  expect(await unsaved.json()).toEqual({ datasets: [] });

  await uploadPage.choose(NODES_CSV, WRONG_EDGES_CSV);
  await uploadPage.submit.click();
  await expect(uploadPage.problems.getByRole('cell', { name: 'edges.csv' })).toBeVisible();
  expect((await uploadPage.listed()).map((cells) => cells.slice(0, 3))).toEqual([
    ['edges.csv', '4', 'target'],
  ]);

  await uploadPage.choose(NODES_CSV, EDGES_CSV);
  await uploadPage.submit.click();
  await expect(datasetPage.title('Posts and ropes')).toBeVisible();
  await expect(datasetPage.revisions).toContainText('1 self loop dropped.');
  await workspacePage.open(id);
  await expect(workspacePage.dataset('Posts and ropes')).toBeVisible();
});

test('files are asked for before anything is sent', async ({
  house,
  signInPage,
  uploadPage,
  page,
}) => {
  const account = newAccount('Faye Lacking');
  await house.signUp(account);
  const { id } = await house.workspace('No files');
  await signInPage.open();
  await signInPage.signIn(account);
  await uploadPage.open(id);
  await uploadPage.submit.click();
  await expect(page.getByText('Give the dataset a name.')).toBeVisible();
  await expect(page.getByText('Choose the file nodes.csv.')).toBeVisible();
  await expect(page.getByText('Choose the file edges.csv.')).toBeVisible();
});
