import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';
import { tabTo } from './tabTo';

/** Invented: a single edge list with day-first dates, semicolons and weights. */
const SIGHTINGS = `who;with;strength;seen
reed;heron;0,8;03/02/2031
heron;pike;0,4;25/02/2031
pike;reed;0,6;04/03/2031
otter;pike;0,9;11/03/2031
reed;otter;0,2;02/04/2031
`;
const NODES = 'id,label,entry\na,Alder,3\nb,Birch,1\nc,Cress,2\n';
const EDGES = 'source,target\na,b\nb,c\n';

test('a network is brought in by keyboard alone, from pasted rows to a dataset', async ({
  page,
  house,
  signInPage,
  workspacePage,
  importPage,
  datasetPage,
}) => {
  const account = newAccount('Ina Import');
  await house.signUp(account);
  const { id } = await house.workspace('Sightings');
  await signInPage.open(`/workspaces/${id}`);
  await signInPage.signIn(account);

  await tabTo(page, workspacePage.bringIn);
  await page.keyboard.press('Enter');
  await tabTo(page, importPage.pasted);
  await page.keyboard.insertText(SIGHTINGS);
  await tabTo(page, importPage.read);
  await page.keyboard.press('Enter');

  await expect(importPage.field('Between columns')).toHaveValue(';');
  await expect(importPage.field('Decimal mark')).toHaveValue(',');
  await tabTo(page, importPage.onward('Columns'));
  await page.keyboard.press('Enter');
  await expect(importPage.field('Source')).toHaveValue('who');
  await expect(importPage.field('Time')).toHaveValue('seen');
  await tabTo(page, importPage.onward('Order'));
  await page.keyboard.press('Enter');

  await tabTo(page, importPage.choice('The first time of any edge of the node'));
  await expect(importPage.choice('The first time of any edge of the node')).toBeChecked();
  await tabTo(page, importPage.onward('What was found'));
  await page.keyboard.press('Enter');
  await expect(importPage.count('Nodes')).toHaveText('4');
  await expect(importPage.count('Edges')).toHaveText('5');
  await tabTo(page, importPage.growth);
  await page.keyboard.press('ArrowRight');
  await expect(page.getByText(/^Arrival 1 of 4/)).toBeVisible();

  await tabTo(page, importPage.onward('Save'));
  await page.keyboard.press('Enter');
  await tabTo(page, importPage.name);
  await page.keyboard.press('Control+A');
  await page.keyboard.type('Sightings at the weir');
  await tabTo(page, importPage.save);
  await page.keyboard.press('Enter');
  await expect(datasetPage.title('Sightings at the weir')).toBeVisible();
});

test('a wrong entry is told by file, line and column, and a right reading mends it', async ({
  page,
  house,
  signInPage,
  importPage,
}) => {
  const account = newAccount('Wanda Wrong');
  await house.signUp(account);
  const { id } = await house.workspace('Wrong');
  await signInPage.open();
  await signInPage.signIn(account);
  await importPage.begin(id, [
    { name: 'nodes.csv', text: NODES.replace('Cress,2', 'Cress,soon') },
    { name: 'edges.csv', text: EDGES },
  ]);
  await importPage.step('What was found').click();
  await expect(importPage.problems.getByRole('row', { name: /nodes\.csv 4 entry/ })).toBeVisible();
  const download = page.waitForEvent('download');
  await importPage.problems.getByRole('link', { name: /Download all/ }).click();
  expect((await download).suggestedFilename()).toMatch(/problems.*\.csv$/);

  await importPage.step('Order').click();
  await importPage.choice('The order of the rows').check();
  await importPage.step('What was found').click();
  await expect(importPage.problems).toHaveCount(0);
  await expect(importPage.count('Nodes')).toHaveText('3');
});

test('an import that is left is found again with what was chosen, and can be removed', async ({
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
  await importPage.begin(id, [
    { name: 'arrivals.csv', text: NODES },
    { name: 'edges.csv', text: EDGES },
  ]);
  await importPage.step('Order').click();
  await importPage.choice('The order of the rows').check();
  await expect(importPage.choice('The order of the rows')).toBeChecked();
  await expect(page.getByText('Reading again …')).toHaveCount(0);

  await workspacePage.open(id);
  await workspacePage.begun('arrivals').click();
  await importPage.step('Order').click();
  await expect(importPage.choice('The order of the rows')).toBeChecked();
  await page.getByRole('button', { name: 'Remove this import' }).click();
  await page.getByRole('button', { name: 'Remove the import' }).click();
  await expect(workspacePage.title('Later')).toBeVisible();
  await expect(workspacePage.begun('arrivals')).toHaveCount(0);
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
    await importPage.begin(id, [
      { name: 'nodes.csv', text: NODES.replace('Cress,2', 'Cress,soon') },
      { name: 'edges.csv', text: EDGES },
    ]);
    const stages = ['Files', 'Columns', 'Order', 'What was found', 'Save'];
    for (const [reading, order] of [
      ['wrong', 'The entry column'],
      ['right', 'The order of the rows'],
    ] as const) {
      await importPage.step('Order').click();
      await importPage.choice(order).check();
      await expect(page.getByText('Reading again …')).toHaveCount(0);
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
