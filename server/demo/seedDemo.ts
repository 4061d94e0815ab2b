import { Readable } from 'node:stream';
import { UPLOAD_LIMITS } from '#contract/datasets';
import { WHOLE } from '#contract/enums';
import type { Db } from '../../db/client';
import { listNamesWithDeleted } from '../../db/repositories/datasetLife';
import { insertMember, listMemberships } from '../../db/repositories/memberships';
import type { Scope } from '../../db/repositories/scope';
import { withSeedLock } from '../../db/repositories/seeding';
import { findUserByEmail, hasUsers, insertUser, lockAccounts } from '../../db/repositories/users';
import { insertOwnedWorkspace } from '../../db/repositories/workspaces';
import { demoNetworks, type DemoNetwork } from '../../db/seed/index';
import { contentHash } from '../../formats/canonical';
import { readNetwork } from '../../formats/nodesAndEdges';
import type { Passwords } from '../auth/passwords';
import { createDataset, datasetsOf } from '../datasets/usecases';
import { startRun } from '../runs/usecases';
import { DEMO_ACCOUNTS, type DemoAccount } from './accounts';

const WORKSPACE = 'Saltmere Fen';
/** The demo network that a first visit shows with a run. */
const SHOWN = 'Saltmere re-flooding survey';

/** `present`: the demo was whole already. `foreign`: other people's accounts exist, so none is made. */
export type SeedOutcome = 'made' | 'present' | 'foreign';

/**
 * Makes the demo workspace in an instance without accounts: people, networks, and one queued run.
 * Any number of processes may call it at once, and again. The first owner is made first and the
 * other people last: an interrupted call is taken up by the next, and a finished one never again,
 * whatever people have changed or deleted since.
 */
export async function seedDemo(db: Db, passwords: Passwords): Promise<SeedOutcome> {
  return withSeedLock(db, async () => {
    const [first, ...others] = DEMO_ACCOUNTS;
    const last = others.at(-1);
    if (!first || !last) throw new Error('There are no demo accounts.');
    if (await findUserByEmail(db, last.email)) return 'present';
    const scope = await firstOwner(db, passwords, first);
    if (scope === null) return 'foreign';
    await makeNetworks(db, scope);
    await makeRun(db, scope);
    await makePeople(db, scope, passwords, others);
    return 'made';
  });
}

/** @returns the owner in the demo workspace, or null where other accounts exist. */
async function firstOwner(
  db: Db,
  passwords: Passwords,
  { name, email, password }: DemoAccount,
): Promise<Scope | null> {
  const passwordHash = await passwords.hash(password);
  return db.transaction(async (transaction) => {
    await lockAccounts(transaction);
    const found = await findUserByEmail(transaction, email);
    if (found) {
      const [membership] = await listMemberships(transaction, found.id);
      return membership ? { userId: found.id, workspaceId: membership.workspaceId } : null;
    }
    if (await hasUsers(transaction)) return null;
    const user = await insertUser(transaction, { name, email, passwordHash });
    if (user === null) throw new Error(`${email} was taken while accounts were locked.`);
    const workspace = await insertOwnedWorkspace(transaction, WORKSPACE, user.id);
    return { userId: user.id, workspaceId: workspace.id };
  });
}

async function makeNetworks(db: Db, scope: Scope): Promise<void> {
  // A deleted one is there too: somebody took it away, and may restore it.
  const there = await listNamesWithDeleted(db, scope);
  for (const network of demoNetworks()) {
    if (there.has(network.name)) continue;
    const { name, description, invented } = network;
    await createDataset(db, scope, { name, description, invented }, await read(network));
  }
}

/** Reads the files of a demo network as an upload is read. */
async function read({ name, nodesCsv, edgesCsv }: DemoNetwork) {
  const outcome = await readNetwork(
    { name: 'nodes.csv', bytes: Readable.from([Buffer.from(nodesCsv)]) },
    { name: 'edges.csv', bytes: Readable.from([Buffer.from(edgesCsv)]) },
    UPLOAD_LIMITS,
  );
  if (!outcome.ok) throw new Error(`${name}: ${outcome.issues[0]?.message}`);
  const { nodes, edges, entryUnit, report } = outcome;
  return { nodes, edges, entryUnit, report, contentHash: contentHash({ nodes, edges, entryUnit }) };
}

async function makeRun(db: Db, scope: Scope): Promise<void> {
  const shown = (await datasetsOf(db, scope, 'shown')).find(
    ({ dataset }) => dataset.name === SHOWN,
  );
  const revision = shown?.revisions[0];
  if (!shown || !revision || shown.runs.length > 0) return;
  const chosen = { scale: 'rank' as const, dimensions: [1, 2, 3], part: WHOLE };
  const wanted = { revisionId: revision.id, ...chosen };
  await startRun(db, scope, wanted, 'demo');
}

/** All other people at once, so that the last of them means that nothing is missing. */
async function makePeople(
  db: Db,
  scope: Scope,
  passwords: Passwords,
  people: readonly DemoAccount[],
): Promise<void> {
  const hashes = await Promise.all(people.map(({ password }) => passwords.hash(password)));
  await db.transaction(async (transaction) => {
    await lockAccounts(transaction);
    for (const [i, { name, email, role }] of people.entries()) {
      const passwordHash = hashes[i];
      if (passwordHash === undefined) throw new Error('A password was not hashed.');
      const user = await insertUser(transaction, { name, email, passwordHash });
      // Somebody signed up with this address meanwhile: theirs it stays.
      if (user !== null) await insertMember(transaction, scope, user.id, role);
    }
  });
}
