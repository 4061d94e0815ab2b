import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { payloads, type TextFile } from './pages/ImportPage';
import { tabTo } from './tabTo';

/** Invented: dates that can be read both ways, and a node that nobody saw arrive. */
const ARRIVALS = `id,label,entry
r,Reed,03/02/2031
h,Heron,05/03/2031
p,Pike,04/04/2031
o,Otter,
`;
const CONTACTS = `source,target,weight
r,h,0.8
h,p,0.4
p,r,0.6
o,p,0.9
`;
/** Invented: a single edge list with day-first dates, semicolons and decimal commas. */
const SIGHTINGS = `who;with;strength;seen
reed;heron;0,8;03/02/2031
heron;pike;0,4;25/02/2031
pike;reed;0,6;04/03/2031
otter;pike;0,9;11/03/2031
reed;otter;0,2;02/04/2031
`;
const NODES = 'id,label,entry\na,Alder,3\nb,Birch,1\nc,Cress,2\n';
const EDGES = 'source,target\na,b\nb,c\n';
const two = (nodes: string): TextFile[] => [
  { name: 'nodes.csv', text: nodes },
  { name: 'edges.csv', text: EDGES },
];

test('a network is brought in by keyboard alone, from two files to a dataset', async ({
  page,
  house,
  signInPage,
  workspacePage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Ina Import');
  await house.signUp(account);
  const { id } = await house.workspace('Arrivals');
  // Listened for from the start: the browser has to be told before the key is pressed.
  const chooser = page.waitForEvent('filechooser');
  await signInPage.open(`/workspaces/${id}`);
  await signInPage.signIn(account);

  await tabTo(page, workspacePage.bringIn);
  await page.keyboard.press('Enter');
  await tabTo(page, importPage.files);
  await page.keyboard.press('Enter');
  await (
    await chooser
  ).setFiles(
    payloads([
      { name: 'arrivals.csv', text: ARRIVALS },
      { name: 'contacts.csv', text: CONTACTS },
    ]),
  );
  await tabTo(page, importPage.read);
  await page.keyboard.press('Enter');
  await tabTo(page, importPage.onward('Columns'));
  await page.keyboard.press('Enter');
  await expect(importPage.field('Entry')).toHaveValue('entry');
  await tabTo(page, importPage.onward('Order'));
  await page.keyboard.press('Enter');

  await expect(page.getByText('03/02/2031 · 05/03/2031')).toBeVisible();
  await tabTo(page, importPage.choice('day / month / year'));
  await page.keyboard.press('Space');
  await expect(importPage.choice('day / month / year')).toBeChecked();
  await expect(importPage.step('Order')).toHaveText(/Order$/);

  // The keys move on while the choice before is still being read.
  await tabTo(page, importPage.choice('are a fault'));
  await page.keyboard.press('ArrowDown');
  await page.keyboard.press('ArrowDown');
  await expect(importPage.choice('are placed last')).toBeFocused();
  await importPage.settled();
  await expect(importPage.choice('are placed last')).toBeChecked();
  await tabTo(page, importPage.choice('all edges'));
  await page.keyboard.press('ArrowDown');
  await tabTo(page, importPage.field('Least weight'));
  await page.keyboard.press('Control+A');
  await page.keyboard.type('0.5');
  await expect(page.getByText('Keeps 3 of 4 edges.')).toBeVisible();
  await tabTo(page, importPage.onward('What was found'));
  await page.keyboard.press('Enter');

  await expect(importPage.count('Nodes')).toHaveText('4');
  await expect(importPage.count('Edges')).toHaveText('3');
  await expect(importPage.count('Nodes placed last')).toHaveText('1');
  await tabTo(page, importPage.growth);
  await page.keyboard.press('ArrowRight');
  await expect(page.getByText(/^Arrival 1 of 4: Reed, 2031-02-03; 0 edges by then/)).toBeVisible();
  await page.keyboard.press('End');
  await expect(page.getByText(/^Arrival 4 of 4: Otter/)).toBeVisible();
  await expect(page.getByText(/^Cliques: 4 nodes, 3 edges/)).toBeVisible();

  await tabTo(page, importPage.onward('Save'));
  await page.keyboard.press('Enter');
  await tabTo(page, importPage.name);
  await page.keyboard.press('Control+A');
  await page.keyboard.type('Arrivals at the weir');
  await page.keyboard.press('Enter');
  await page.waitForURL('**/datasets/*');
  await expect(datasetPage.title('Arrivals at the weir')).toBeVisible();
});

test('a pasted edge list is read by its own delimiter and marks, and ordered by its times', async ({
  house,
  page,
  signInPage,
  importPage,
}) => {
  const account = newAccount('Pia Paste');
  await house.signUp(account);
  const { id } = await house.workspace('Sightings');
  await signInPage.open();
  await signInPage.signIn(account);
  await page.goto(`/workspaces/${id}/imports/new`);
  await importPage.read.click();
  await expect(page.getByText('Choose a file here, or paste rows below.')).toBeVisible();
  await importPage.pasted.fill(SIGHTINGS);
  await importPage.read.click();
  await expect(importPage.field('Between columns')).toHaveValue(';');
  await expect(importPage.field('Decimal mark')).toHaveValue(',');
  await importPage.step('Columns').click();
  await expect(importPage.field('Source')).toHaveValue('who');
  await expect(importPage.field('Time')).toHaveValue('seen');
  await importPage.field('Target').selectOption('who');
  await expect(page.getByText('Both ends are the same column.', { exact: false })).toBeVisible();
  await importPage.step('Save').click();
  await expect(page.getByRole('region', { name: 'There is no network yet' })).toBeVisible();
  await expect(importPage.save).toBeDisabled();
  await page.getByRole('link', { name: 'Go to Columns' }).click();
  await importPage.field('Target').selectOption('with');
  await importPage.step('Order').click();
  await expect(importPage.choice('The first time of any edge of the node')).toBeChecked();
  await importPage.step('What was found').click();
  await expect(importPage.count('Nodes')).toHaveText('4');
  await expect(importPage.count('Edges')).toHaveText('5');
});

test('a wrong entry is told by file, line and column, and is right in the corrected file', async ({
  page,
  house,
  signInPage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Wanda Wrong');
  await house.signUp(account);
  const { id } = await house.workspace('Wrong');
  await signInPage.open();
  await signInPage.signIn(account);
  await importPage.begin(id, two(NODES.replace('Cress,2', 'Cress,soon')));
  await importPage.step('What was found').click();
  await expect(importPage.problems.getByRole('row', { name: /nodes\.csv 4 entry/ })).toBeVisible();
  const download = page.waitForEvent('download');
  await importPage.problems.getByRole('link', { name: /Download all/ }).click();
  expect((await download).suggestedFilename()).toMatch(/problems.*\.csv$/);

  await importPage.problems.getByRole('link', { name: 'begin again with them' }).click();
  await importPage.choose(two(NODES));
  await importPage.step('What was found').click();
  await expect(importPage.count('Nodes')).toHaveText('3');
  await expect(importPage.problems).toHaveCount(0);
  await importPage.step('Save').click();
  await importPage.save.click();
  await page.waitForURL('**/datasets/*');
  await expect(datasetPage.title('nodes')).toBeVisible();
  await page.goBack();
  await expect(page.getByText('This import was saved.')).toBeVisible();
});

test('an import that is left is found again with all that was chosen and typed, and can be removed', async ({
  page,
  house,
  signInPage,
  workspacePage,
  importPage,
}) => {
  const account = newAccount('Lea Later');
  await house.signUp(account);
  const { id } = await house.workspace('Later');
  await signInPage.open();
  await signInPage.signIn(account);
  await importPage.begin(id, two(NODES));
  await importPage.step('Order').click();
  await importPage.choice('The order of the rows').check();
  await importPage.field('Tolerance ± (optional)').fill('soon');
  await importPage.field('Tolerance ± (optional)').blur();
  await expect(page.getByText('Give a number of 0 or more, or nothing.')).toBeVisible();
  await expect(importPage.field('Tolerance ± (optional)')).toHaveValue('soon');
  await importPage.field('Tolerance ± (optional)').fill('1,5');
  await importPage.step('Save').click();
  await importPage.name.fill('Arrivals');
  await importPage.description.fill('Seen from the bank.');
  await importPage.step('Files').click();
  await expect(importPage.step('Files')).toHaveAttribute('aria-current', 'step');
  await importPage.settled();

  await workspacePage.open(id);
  await workspacePage.begun('Arrivals').click();
  await importPage.step('Order').click();
  await expect(importPage.choice('The order of the rows')).toBeChecked();
  await expect(importPage.field('Tolerance ± (optional)')).toHaveValue('1.5');
  await importPage.step('Save').click();
  await expect(importPage.name).toHaveValue('Arrivals');
  await expect(importPage.description).toHaveValue('Seen from the bank.');
  await page.getByRole('button', { name: 'Remove this import' }).click();
  await page.getByRole('button', { name: 'Remove the import' }).click();
  await expect(workspacePage.title('Later')).toBeVisible();
  await expect(workspacePage.begun('Arrivals')).toHaveCount(0);
});

test('an import begun from a dataset becomes its next revision', async ({
  page,
  house,
  signInPage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Rita Revision');
  await house.signUp(account);
  const { id } = await house.workspace('Revised');
  const dataset = await house.dataset(id, 'Fen', { nodes: NODES, edges: EDGES });
  await signInPage.open(`/workspaces/${id}/datasets/${dataset.id}`);
  await signInPage.signIn(account);
  await page.getByRole('link', { name: 'Bring in a new revision' }).click();
  await importPage.choose(two(NODES.replace('Cress,2', 'Cress,5')));
  await importPage.step('Save').click();
  await expect(importPage.choice('a new revision of')).toBeChecked();
  await expect(importPage.field('A new revision of')).toHaveValue(dataset.id);
  await page.getByRole('button', { name: 'Save the revision' }).click();
  await page.waitForURL(`**/datasets/${dataset.id}`);
  await expect(datasetPage.title('Fen')).toBeVisible();
  await expect(page.getByRole('rowheader', { name: '2', exact: true })).toBeVisible();
});

for (const [theme, width] of [
  ['light', 1440],
  ['dark', 390],
] as const) {
  test(`no step of an import has an A or AA violation or overflows, ${theme}, ${width} px`, async ({
    page,
    house,
    signInPage,
    importPage,
  }) => {
    await page.setViewportSize({ width, height: 900 });
    await page.emulateMedia({ colorScheme: theme });
    const account = newAccount('Axel Axe');
    await house.signUp(account);
    const { id } = await house.workspace('Steps');
    await signInPage.open();
    await signInPage.signIn(account);
    await page.goto(`/workspaces/${id}/imports/new`);
    await importPage.read.click();
    await expect(page.getByText('Choose a file here, or paste rows below.')).toBeVisible();
    expect(await violations(page), 'the beginning').toEqual([]);
    await importPage.choose(two(NODES.replace('Cress,2', 'Cress,soon')));
    const stages = ['Files', 'Columns', 'Order', 'What was found', 'Save'];
    for (const [reading, order] of [
      ['wrong', 'The entry column'],
      ['right', 'The order of the rows'],
    ] as const) {
      await importPage.step('Order').click();
      await importPage.choice(order).check();
      await importPage.settled();
      for (const stage of stages) {
        await importPage.step(stage).click();
        await expect(importPage.step(stage)).toHaveAttribute('aria-current', 'step');
        expect(await violations(page), `${stage}, ${reading}`).toEqual([]);
        const wide = await page.evaluate(() => document.documentElement.scrollWidth);
        expect(wide, `${stage}, ${reading}`).toBeLessThanOrEqual(width);
        await page.screenshot({
          path: test.info().outputPath(`${stage}-${reading}-${theme}-${width}.png`),
          fullPage: true,
        });
      }
    }
  });
}
