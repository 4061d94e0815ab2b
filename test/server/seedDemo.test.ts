import { afterEach, beforeEach, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import { deleteDataset } from '../../db/repositories/datasetLife';
import { findUserByEmail } from '../../db/repositories/users';
import { listMemberships } from '../../db/repositories/memberships';
import { datasets, memberships, outbox, runs, users } from '../../db/schema/index';
import { weakness } from '../../server/auth/passwordRules';
import { makePasswords } from '../../server/auth/passwords';
import { signInRequest } from '../../server/contract/accounts';
import { ROLES } from '../../server/contract/enums';
import { checkCredentials, signUp } from '../../server/accounts/usecases';
import { datasetsOf } from '../../server/datasets/usecases';
import { DEMO_ACCOUNTS } from '../../server/demo/accounts';
import { seedDemo } from '../../server/demo/seedDemo';
import { Workshop } from '../support/workshop';

const passwords = makePasswords();
let workshop: Workshop;

beforeEach(async () => {
  workshop = await Workshop.open();
});
afterEach(() => workshop.close());

async function contents() {
  const { db } = workshop;
  const [people, roles, sets, started, queued] = await Promise.all([
    db.select().from(users).orderBy(users.emailKey),
    db.select().from(memberships).orderBy(memberships.userId),
    db.select().from(datasets).orderBy(datasets.createdAt),
    db.select().from(runs),
    db.select().from(outbox),
  ]);
  return { people, roles, sets, started, queued };
}

async function ownersScope() {
  const owner = await findUserByEmail(workshop.db, DEMO_ACCOUNTS[0]?.email ?? '');
  const [membership] = await listMemberships(workshop.db, owner?.id ?? '');
  if (!owner || !membership) throw new Error('There is no demo owner.');
  return { userId: owner.id, workspaceId: membership.workspaceId };
}

it('makes three people of each role who can sign in, five datasets and one run', async () => {
  const { db } = workshop;
  expect(await seedDemo(db, passwords)).toBe('made');
  for (const role of ROLES) {
    expect(DEMO_ACCOUNTS.filter((one) => one.role === role)).toHaveLength(3);
  }
  for (const { name, email, password, role } of DEMO_ACCOUNTS) {
    const credentials = signInRequest.parse({ email, password });
    expect(weakness(password, { name, email })).toBeNull();
    const user = await checkCredentials(db, passwords, credentials);
    expect(await listMemberships(db, user.id)).toMatchObject([
      { workspaceName: 'Saltmere Fen', role },
    ]);
  }
  const made = await datasetsOf(db, await ownersScope(), 'hidden');
  expect(made).toHaveLength(5);
  expect(made[0]?.dataset).toMatchObject({ name: 'Saltmere re-flooding survey', invented: true });
  expect(made.flatMap((one) => one.runs)).toMatchObject([
    { scale: 'rank', dimensions: [1, 2, 3], state: 'queued' },
  ]);
});

it('ends with a finished run once a worker is there', async () => {
  await seedDemo(workshop.db, passwords);
  const scope = await ownersScope();
  const [run] = (await datasetsOf(workshop.db, scope, 'hidden')).flatMap((one) => one.runs);
  workshop.startWorker();
  const done = await workshop.reached(scope, run?.id ?? '', ({ state }) => state === 'done', 40);
  expect(done).toMatchObject({ pairsDone: 1035, pairsTotal: 1035, failureCode: null });
});

it('changes nothing when it is called again, even after a dataset was deleted', async () => {
  const { db } = workshop;
  await seedDemo(db, passwords);
  await db.delete(datasets).where(eq(datasets.name, 'Tern Bank mesh'));
  const before = await contents();
  expect(await seedDemo(db, passwords)).toBe('present');
  expect(await contents()).toEqual(before);
});

it('makes one demo when several processes call it at once', async () => {
  const outcomes = await Promise.all([1, 2, 3].map(() => seedDemo(workshop.db, passwords)));
  expect(outcomes.sort()).toEqual(['made', 'present', 'present']);
  const { people, roles, sets, started } = await contents();
  expect([people.length, roles.length, sets.length, started.length]).toEqual([12, 12, 5, 1]);
});

it('is taken up where an interrupted call left it', async () => {
  const { db } = workshop;
  await seedDemo(db, passwords);
  const owner = (await ownersScope()).userId;
  const whole = await contents();
  // What a call leaves that dies after its second dataset: one person, no run.
  for (const { id } of whole.people)
    if (id !== owner) await db.delete(users).where(eq(users.id, id));
  for (const { id } of whole.sets.slice(2)) await db.delete(datasets).where(eq(datasets.id, id));
  await db.delete(outbox);
  expect(await seedDemo(db, passwords)).toBe('made');
  const { people, roles, sets, started, queued } = await contents();
  expect([people.length, roles.length, started.length, queued.length]).toEqual([12, 12, 1, 1]);
  expect(sets.map(({ name }) => name)).toEqual(whole.sets.map(({ name }) => name));
  expect(sets.slice(0, 2)).toEqual(whole.sets.slice(0, 2));
});

it('makes no dataset again that was deleted, also not where a call was interrupted', async () => {
  const { db } = workshop;
  await seedDemo(db, passwords);
  const scope = await ownersScope();
  const { people, sets } = await contents();
  const gone = sets.filter(({ name }) => /Saltmere|Tern Bank/.test(name)).map(({ id }) => id);
  expect(gone).toHaveLength(2);
  for (const id of gone) expect(await deleteDataset(db, scope, id)).toBe(true);
  const deleted = (await contents()).sets;
  expect(await seedDemo(db, passwords)).toBe('present');
  // What a call leaves that dies before it makes the other people.
  for (const { id } of people)
    if (id !== scope.userId) await db.delete(users).where(eq(users.id, id));
  expect(await seedDemo(db, passwords)).toBe('made');
  const after = await contents();
  expect(after.sets).toEqual(deleted);
  expect(after.started).toHaveLength(1);
});

it('makes nothing where somebody already has an account', async () => {
  const { db } = workshop;
  const password = 'three unrelated umbrellas';
  await signUp(db, passwords, { name: 'Wilf', email: 'wilf@example.org', password });
  const before = await contents();
  expect(await seedDemo(db, passwords)).toBe('foreign');
  expect(await contents()).toEqual(before);
});
