import { randomUUID } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { WHOLE, type Role } from '../../server/contract/enums';
import { encodeBarcode } from '../../db/codecs/barcode';
import { encodeBlockResult } from '../../db/codecs/blockResult';
import { encodeUint32 } from '../../db/codecs/typedArrays';
import { insertGroup } from '../../db/repositories/groups';
import { insertImportFile } from '../../db/repositories/importFiles';
import { insertImport, storeReading } from '../../db/repositories/imports';
import { insertMember } from '../../db/repositories/memberships';
import { listRevisions } from '../../db/repositories/revisions';
import { createRun } from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';
import { insertUser } from '../../db/repositories/users';
import { insertOwnedWorkspace } from '../../db/repositories/workspaces';
import { imports, pairDetails, revisionEstimates, runBlocks, runs } from '../../db/schema/index';
import { createDataset } from '../../server/datasets/usecases';
import type { ReadNetwork } from '../../server/datasets/readNetwork';
import { readDraft } from '../../server/reading/draft';
import type { DraftFile } from '../../server/reading/messages';
import type { TestDatabase } from './database';

type Db = TestDatabase['db'];
export interface Person {
  readonly id: string;
  readonly name: string;
  readonly email: string;
}

/** An account nobody can sign in to by password: sessions are made beside it. */
export async function makePerson(db: Db, name = 'Wren Tarn'): Promise<Person> {
  const email = `${randomUUID()}@example.org`;
  const row = await insertUser(db, { name, email, passwordHash: '-' });
  if (row === null) throw new Error('The address was taken.');
  return row;
}

export interface MadeWorkspace {
  readonly id: string;
  readonly owner: Person;
  readonly scope: Scope;
}

export async function makeWorkspace(db: Db, name = 'Fen'): Promise<MadeWorkspace> {
  const owner = await makePerson(db, `Owner of ${name}`);
  const { id } = await insertOwnedWorkspace(db, name, owner.id);
  return { id, owner, scope: { userId: owner.id, workspaceId: id } };
}

export async function makeMember(db: Db, scope: Scope, role: Role): Promise<Person> {
  const person = await makePerson(db, `The ${role}`);
  await insertMember(db, scope, person.id, role);
  return person;
}

/** Three nodes a, b, c that arrive at 1, 2, 3 and the path a – b – c; invented. */
export const PATH_OF_THREE: ReadNetwork = {
  nodes: ['a', 'b', 'c'].map((id, row) => ({
    id,
    label: `Node ${id}`,
    entryRaw: String(row + 1),
    entry: row + 1,
    earliestRaw: '',
    earliest: null,
    latestRaw: '',
    latest: null,
  })),
  edges: Uint32Array.of(0, 1, 1, 2),
  entryUnit: 'number',
  contentHash: 'f'.repeat(64),
  report: {
    nodeRows: 3,
    edgeRows: 2,
    selfLoops: 0,
    duplicateEdges: 0,
    reversedEdges: 0,
    tiedNodes: 0,
    repeatedLabels: 0,
    isolatedNodes: 0,
    components: 1,
    ignoredColumns: [],
  },
};

/** The same with edges of weight 0.25 and 0.75; invented. */
export const WEIGHTED_PATH: ReadNetwork = {
  ...PATH_OF_THREE,
  weights: Float64Array.of(0.25, 0.75),
};

export async function makeDataset(
  db: Db,
  scope: Scope,
  name = 'Path of three',
  network = PATH_OF_THREE,
) {
  const id = await createDataset(db, scope, { name, description: '' }, network);
  const [revision] = await listRevisions(db, scope, [id]);
  if (revision === undefined) throw new Error('The dataset has no revision.');
  return { id, revisionId: revision.id };
}

/** Queued runs cover different parts, so that none is answered with another; all have the same three pairs. */
let parts = 2;

/** A run that waits for a worker; none works in these tests. */
export async function makeQueuedRun(db: Db, scope: Scope, revisionId: string): Promise<string> {
  const part = { kind: 'within' as const, positions: (parts += 1) };
  const chosen = { scale: 'entry' as const, dimensions: [0], part };
  const wanted = { revisionId, ...chosen, idempotencyKey: null };
  const made = await createRun(db, scope, wanted);
  if (made.kind !== 'created') throw new Error(made.kind);
  return made.runId;
}

/** A run of three nodes that is done, with one block; the swap of the first two and the estimate were refused. */
export async function makeDoneRun(db: Db, scope: Scope, revisionId: string): Promise<string> {
  const { workspaceId } = scope;
  const runId = await makeQueuedRun(db, scope, revisionId);
  const barcode = encodeBarcode([
    { births: Float64Array.of(1), deaths: Float64Array.of(Number.POSITIVE_INFINITY) },
  ]);
  const finishedAt = new Date();
  await db
    .update(runs)
    .set({
      state: 'done',
      part: WHOLE,
      pairsTotal: 3,
      pairsDone: 3,
      blockCount: 1,
      blocksDone: 1,
      barcode,
      finishedAt,
    })
    .where(eq(runs.id, runId));
  await db.insert(runBlocks).values({
    workspaceId,
    runId,
    block: 0,
    pairs: 3,
    rows: encodeUint32(Uint32Array.of(0, 1)),
    result: encodeBlockResult({ distances: new Float64Array(3), bettiGaps: new Int32Array(3) }),
    landed: 1,
    attempt: 1,
    finishedAt,
  });
  const failure = 'Not part of this test.';
  await db.insert(pairDetails).values({ workspaceId, runId, p: 0, q: 1, failure });
  await db
    .insert(revisionEstimates)
    .values({ workspaceId, revisionId, maxDimension: 3, partKey: 'whole', part: WHOLE, failure })
    .onConflictDoNothing();
  return runId;
}

/** A draft that was read: the path of three, in one file of each kind. */
export async function makeImport(db: Db, scope: Scope): Promise<string> {
  const id = await insertImport(db, scope, { name: 'Path of three', datasetId: null });
  const folder = mkdtempSync(join(tmpdir(), 'heddle-test-'));
  try {
    const files: DraftFile[] = [];
    for (const [name, text] of [
      ['nodes.csv', NODES_CSV],
      ['edges.csv', EDGES_CSV],
    ] as const) {
      const file = { name, bytes: text.length, pasted: false };
      const position = files.length;
      await insertImportFile(db, scope, id, { ...file, position }, [Buffer.from(text)]);
      const path = join(folder, name);
      writeFileSync(path, text);
      files.push({ ...file, path, hint: {} });
    }
    const { view, weights } = await readDraft({ folder, files, choices: null });
    await storeReading(db, scope, id, { version: 1, view, weights });
    return id;
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** A revision with the files that it came from. @returns its id */
export async function makeOriginals(db: Db, scope: Scope): Promise<string> {
  const importId = await makeImport(db, scope);
  const { revisionId } = await makeDataset(db, scope, 'Came from files');
  await db.update(imports).set({ revisionId, state: 'saved' }).where(eq(imports.id, importId));
  return revisionId;
}

export function makeGroup(db: Db, scope: Scope, runId: string): Promise<string> {
  return insertGroup(db, scope, {
    runId,
    name: 'A pair',
    nodeIds: ['a', 'b'],
    origin: 'hand',
    note: '',
  });
}

/** A form as the upload page sends it; give null to leave a part out. */
export function networkForm(
  parts: {
    readonly name?: string | null;
    readonly nodes?: string | Blob | null;
    readonly edges?: string | Blob | null;
  } = {},
): FormData {
  const { name = 'Path of three', nodes = NODES_CSV, edges = EDGES_CSV } = parts;
  const form = new FormData();
  if (name !== null) form.set('name', name);
  if (nodes !== null) form.set('nodes', blobOf(nodes), 'nodes.csv');
  if (edges !== null) form.set('edges', blobOf(edges), 'edges.csv');
  return form;
}

export const NODES_CSV = 'id,label,entry\na,Node a,1\nb,Node b,2\nc,Node c,3\n';
export const EDGES_CSV = 'source,target\na,b\nb,c\n';

const blobOf = (content: string | Blob): Blob =>
  typeof content === 'string' ? new Blob([content], { type: 'text/csv' }) : content;

/** A form of an import; the values are the files by their names. */
export function importForm(
  files: Readonly<Record<string, string | Blob>>,
  fields: Readonly<Record<string, string>> = {},
): FormData {
  const form = new FormData();
  for (const [name, value] of Object.entries(fields)) form.set(name, value);
  for (const [name, content] of Object.entries(files)) form.append('files', blobOf(content), name);
  return form;
}
