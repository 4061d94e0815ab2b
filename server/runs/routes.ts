import { z } from 'zod';
import { createRunRequest, estimateQuery, runFocusRequest } from '#contract/runs';
import { BARCODES_HEADER, PAIRS_HEADER, barcodesTable } from '../../formats/matrixTable';
import { decodeBarcode } from '../../db/codecs/barcode';
import type { Db } from '../../db/client';
import type { Listener } from '../../db/listener';
import { listNodes } from '../../db/repositories/revisions';
import { findBarcode } from '../../db/repositories/runs';
import type { Scope } from '../../db/repositories/scope';
import type { Dependencies } from '../dependencies';
import { notFound } from '../http/parse';
import { created, done, ok, route, SENT } from '../http/route';
import { sendCsv } from '../http/sendCsv';
import type { RunRoutes } from '../routes';
import { notDone, notPlanned } from './errors';
import { readEstimate } from './estimates';
import { streamEvents } from './events';
import { matrixRows, readBlockBytes } from './matrix';
import { readPair } from './pairs';
import { presentBars } from './presenter';
import { pairsOfRows } from './tables';
import { completeRun, endRun, focusRun, readRun, requireRun, startRun } from './usecases';
import { RunWatches } from './watches';

const count = z
  .string()
  .regex(/^\d{1,9}$/)
  .transform(Number);
const oneRun = z.strictObject({ workspaceId: z.uuid(), runId: z.uuid() });
const oneRevision = z.strictObject({ workspaceId: z.uuid(), revisionId: z.uuid() });
const oneBlock = oneRun.extend({ block: count });
const onePair = oneRun.extend({ a: count, b: count });

/** Handlers of the routes below /runs; `listener` is the process's one listening connection. */
export const makeRunRoutes =
  (listener: Listener) =>
  ({ database: { db }, log }: Dependencies): RunRoutes => {
    const watches = new RunWatches(db, listener, (error) =>
      log.warn({ err: error }, 'a watched run could not be read'),
    );
    return {
      createRun: route(
        'createRun',
        { body: createRunRequest },
        async ({ member, body, request }) => {
          const key = request.get('idempotency-key') ?? null;
          const started = await startRun(db, member, body, key);
          return started.found ? ok(started) : created(started);
        },
      ),
      runEstimate: route(
        'runEstimate',
        { params: oneRevision, query: estimateQuery },
        async ({ member, params: { revisionId }, query, signal }) =>
          ok(await readEstimate(db, listener, member, { revisionId, ...query }, signal)),
      ),
      run: route('run', { params: oneRun }, async ({ member, params }) =>
        ok(await readRun(db, member, params.runId)),
      ),
      stopRun: route('stopRun', { params: oneRun }, async ({ member, params }) =>
        ok(await endRun(db, member, params.runId)),
      ),
      extendRun: route('extendRun', { params: oneRun }, async ({ member, params }) =>
        ok(await completeRun(db, member, params.runId)),
      ),
      focusRun: route(
        'focusRun',
        { params: oneRun, body: runFocusRequest },
        async ({ member, params, body }) => {
          await focusRun(db, member, params.runId, body);
          return done;
        },
      ),
      runEvents: route('runEvents', { params: oneRun }, async ({ member, params, ...stream }) => {
        await requireRun(db, member, params.runId);
        const lastEventId = stream.request.get('last-event-id');
        await streamEvents(watches, member, { ...stream, runId: params.runId, lastEventId });
        return SENT;
      }),
      runBlock: route('runBlock', { params: oneBlock }, async ({ member, params, ...raw }) => {
        const { runId, block } = params;
        const etag = `"${runId}-${block}"`;
        // A stored block never changes, so whoever has it needs no second copy.
        const headers = { ETag: etag, 'Cache-Control': 'private, max-age=31536000, immutable' };
        const bytes = await readBlockBytes(db, member, runId, block);
        if (raw.request.get('if-none-match') === etag) {
          raw.response.status(304).set(headers).end();
          return SENT;
        }
        return { status: 200, bytes, contentType: 'application/octet-stream', headers };
      }),
      runBarcode: route('runBarcode', { params: oneRun }, async ({ member, params }) =>
        ok({ bars: (await readBarcode(db, member, params.runId)).map(presentBars) }),
      ),
      runPair: route('runPair', { params: onePair }, async ({ member, params, signal }) =>
        ok(await readPair(db, listener, member, params, signal)),
      ),
      runPairsCsv: route(
        'runPairsCsv',
        { params: oneRun },
        async ({ member, params, response }) => {
          const run = await requireRun(db, member, params.runId);
          const { id: runId, nodeCount, blocksBefore } = run;
          const isDone = run.state === 'done';
          // While it is extended, a run has the pairs it had before.
          if (!isDone && run.extendedFrom === null) throw notDone(run.state);
          const nodes = await listNodes(db, member, run.revisionId);
          const blocks = isDone ? (run.blockCount ?? 0) : blocksBefore;
          const rows = matrixRows(db, member, { runId, nodeCount, blocks });
          const { scale, dimensions } = run;
          const table = pairsOfRows({ nodes, scale, dimensions, rows });
          return sendCsv(
            response,
            `${run.datasetName} run ${run.number} pairs`,
            PAIRS_HEADER,
            table,
          );
        },
      ),
      runBarcodesCsv: route(
        'runBarcodesCsv',
        { params: oneRun },
        async ({ member, params, response }) => {
          const run = await requireRun(db, member, params.runId);
          const table = barcodesTable(await readBarcode(db, member, params.runId));
          const name = `${run.datasetName} run ${run.number} barcodes`;
          return sendCsv(response, name, BARCODES_HEADER, table);
        },
      ),
    };
  };

async function readBarcode(db: Db, scope: Scope, runId: string) {
  const stored = await findBarcode(db, scope, runId);
  if (stored === undefined) throw notFound('runs');
  if (stored === null) throw notPlanned();
  return decodeBarcode(stored);
}
