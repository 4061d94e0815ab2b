import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { encodeArrays, type StoredArray } from '../../db/codecs/typedArrays';
import {
  askImportEstimate,
  findImportEstimate,
  redispatchImportEstimates,
} from '../../db/repositories/importEstimates';
import { encodedPieces } from '../../db/repositories/stagedPieces';
import { importEstimates, outbox, stagedPieces } from '../../db/schema/index';
import { importEstimate } from '../../server/contract/imports';
import { estimate } from '../../jobs/engine/index';
import { bettiSteps } from '../../jobs/bettiSteps';
import { makeImport, makeWorkspace, type MadeWorkspace } from '../support/factories';
import { until, Workshop } from '../support/workshop';

let workshop: Workshop;
let workspace: MadeWorkspace;
beforeAll(async () => {
  workshop = await Workshop.open();
  workspace = await makeWorkspace(workshop.db);
});
afterAll(() => workshop.close());

/** Pieces of seven bytes, so that there are many. */
const inPieces = (array: StoredArray) =>
  encodedPieces(array.length, async function* () {
    const bytes = encodeArrays([array]);
    for (let from = 0; from < bytes.length; from += 7) {
      yield await Promise.resolve(bytes.subarray(from, from + 7));
    }
  });

/** A square whose fourth corner closes a loop at 8 that nothing fills. */
const SQUARE = {
  nodeCount: 4,
  values: Float64Array.of(1, 2, 4, 8),
  edges: Uint32Array.of(0, 1, 0, 3, 1, 2, 2, 3),
};

const ask = (importId: string, version: number, { lost = false } = {}) =>
  workshop.db.transaction(async (transaction) => {
    const arrays = { entries: inPieces(SQUARE.values), edges: inPieces(SQUARE.edges) };
    await askImportEstimate(transaction, workspace.scope, { importId, version }, arrays);
    if (lost) await transaction.delete(outbox).where(eq(outbox.kind, 'import_estimate'));
  });

const answered = async (importId: string): Promise<unknown> => {
  const found = await until(
    () => findImportEstimate(workshop.db, workspace.scope, importId),
    (seen) => seen !== null && (seen.estimate !== null || seen.failure !== null),
  );
  return found?.estimate ?? found?.failure;
};

describe('what the matrix of a draft would need', () => {
  test('is the engine’s own count, with the Betti curves of the growth', async () => {
    const id = await makeImport(workshop.db, workspace.scope);
    await ask(id, 1);
    expect(await workshop.db.$count(stagedPieces)).toBe(0);
    workshop.startWorker();
    const read = importEstimate.options[3].omit({ state: true }).parse(await answered(id));
    const expected = estimate(SQUARE, 3, workshop.config().limits);
    expect(read).toMatchObject({ cliques: expected.cliques, exact: true, pairs: 6 });
    expect(read.seconds).toBe(expected.seconds);
    expect(read.betti).toEqual([[[1, 1]], [[8, 1]], [], []]);
  });

  test('of an older version is never answered', async () => {
    const id = await makeImport(workshop.db, workspace.scope);
    await ask(id, 1);
    await ask(id, 2);
    await answered(id);
    const [row] = await workshop.db
      .select({ version: importEstimates.version })
      .from(importEstimates)
      .where(eq(importEstimates.importId, id));
    expect(row?.version).toBe(2);
  });

  test('is asked again where its job was lost', async () => {
    const id = await makeImport(workshop.db, workspace.scope);
    await ask(id, 1, { lost: true });
    await redispatchImportEstimates(workshop.db, 0);
    expect(await answered(id)).toMatchObject({ exact: true });
  });
});

test('a Betti curve counts the bars alive, and bars of no length are nothing', () => {
  const births = Float64Array.of(1, 1, 3, 5);
  const deaths = Float64Array.of(Infinity, 3, 7, 5);
  expect(bettiSteps({ births, deaths })).toEqual([
    [1, 2],
    [7, 1],
  ]);
});
