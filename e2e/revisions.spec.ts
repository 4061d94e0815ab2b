import { violations } from './axe';
import { expect, test } from './fixtures';
import { newAccount } from './house';

/** Four posts in a row; the last rope is the lightest. */
const NODES =
  'id,label,entry\np1,First post,1\np2,Second post,2\np3,Third post,3\np4,Fourth post,4\n';
const EDGES = 'source,target,weight\np1,p2,3\np2,p3,2\np3,p4,0.5\n';

test('a threshold and a corrected entry make revisions that tell what they changed', async ({
  page,
  house,
  signInPage,
  importPage,
  datasetPage,
}) => {
  const owner = newAccount('Rev Iser');
  await house.signUp(owner);
  const { id } = await house.workspace('Ropes by weight');
  await signInPage.open();
  await signInPage.signIn(owner);
  await importPage.begin(id, [
    { name: 'nodes.csv', text: NODES },
    { name: 'edges.csv', text: EDGES },
  ]);
  await importPage.step('Save').click();
  await importPage.name.fill('Posts in a row');
  await importPage.save.click();
  await expect(datasetPage.title('Posts in a row')).toBeVisible();

  await test.step('a threshold leaves out the lighter edges', async () => {
    const form = await datasetPage.making('New revision from a weight threshold');
    await form.getByLabel('Least weight').fill('1');
    await expect(form).toContainText('2');
    await form.getByRole('button', { name: 'Make the revision' }).click();
    await expect(form).toContainText('Revision 2 was made.');
    await datasetPage.compare(2);
    await expect(datasetPage.changes).toContainText('1 edge removed.');
    await expect(datasetPage.difference('Edges removed: 1')).toContainText('p4');
  });

  await test.step('a wrong text is refused under its field, a right one is a revision', async () => {
    const form = await datasetPage.making('Correct an entry');
    await form.getByLabel('Node').selectOption({ label: 'Third post (p3) · 3' });
    await form.getByLabel('Entry').fill('third');
    await form.getByRole('button', { name: 'Make the revision' }).click();
    await expect(form).toContainText('“p3”');
    await expect(form.getByLabel('Entry')).toHaveValue('third');
    expect(await violations(page)).toEqual([]);
    await form.getByLabel('Entry').fill('2.50');
    await form.getByLabel('Why').fill('The diary says so.');
    await form.getByRole('button', { name: 'Make the revision' }).click();
    await expect(form).toContainText('Revision 3 was made.');
    await datasetPage.compare(3);
    const changed = datasetPage.difference('Entries changed: 1');
    await expect(changed.getByRole('row').last()).toHaveText(/Third post\s*3\s*2\.50/);
    await expect(datasetPage.revisions).toContainText('The diary says so.');
    expect(await violations(page)).toEqual([]);
  });
});
