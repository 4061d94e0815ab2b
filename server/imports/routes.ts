import { z } from 'zod';
import { changeImportRequest, saveImportRequest } from '#contract/imports';
import { findImportEstimate } from '../../db/repositories/importEstimates';
import type { ImportRow } from '../../db/repositories/imports';
import type { Scope } from '../../db/repositories/scope';
import type { Dependencies } from '../dependencies';
import { created, done, ok, route, type RouteMap } from '../http/route';
import { sendCsv } from '../http/sendCsv';
import {
  presentImport,
  presentImports,
  presentWeights,
  problemRows,
  PROBLEMS_HEADER,
} from './presenter';
import { IMPORT_FORM } from './receive';
import { saveImport } from './save';
import { changeDraft, createImport, dropDraft, importOf, importsOf, problemsOf } from './usecases';

const oneImport = z.strictObject({ workspaceId: z.uuid(), importId: z.uuid() });

type ImportRoutes = Pick<
  RouteMap,
  | 'imports'
  | 'createImport'
  | 'importDraft'
  | 'changeImport'
  | 'importProblems'
  | 'importWeights'
  | 'saveImport'
  | 'deleteImport'
>;

export function importRoutes({ database: { db }, uploads, reader }: Dependencies): ImportRoutes {
  const tools = { db, uploads, reader };
  const one = { params: oneImport };
  const shown = async (scope: Scope, row: ImportRow) =>
    presentImport(row, await findImportEstimate(db, scope, row.id));
  return {
    imports: route('imports', {}, async ({ member }) =>
      ok(presentImports(await importsOf(tools, member))),
    ),
    createImport: route('createImport', { body: 'multipart' }, ({ member, request }) =>
      uploads.receive(request, IMPORT_FORM, async (received) =>
        created(await shown(member, await createImport(tools, member, received))),
      ),
    ),
    importDraft: route('importDraft', one, async ({ member, params }) =>
      ok(await shown(member, await importOf(tools, member, params.importId))),
    ),
    changeImport: route(
      'changeImport',
      { ...one, body: changeImportRequest },
      async ({ member, params, body }) =>
        ok(await shown(member, await changeDraft(tools, member, params.importId, body))),
    ),
    importProblems: route('importProblems', one, async ({ member, params, response }) => {
      const { row, problems } = await problemsOf(tools, member, params.importId);
      return sendCsv(response, `${row.name} problems`, PROBLEMS_HEADER, problemRows(problems));
    }),
    importWeights: route('importWeights', one, async ({ member, params }) =>
      ok(presentWeights(await importOf(tools, member, params.importId))),
    ),
    saveImport: route(
      'saveImport',
      { ...one, body: saveImportRequest },
      async ({ member, params, body }) =>
        created(await saveImport(tools, member, params.importId, body)),
    ),
    deleteImport: route('deleteImport', one, async ({ member, params }) => {
      await dropDraft(tools, member, params.importId);
      return done;
    }),
  };
}
