import { z } from 'zod';
import type { ProcedureDocument } from '../procedure/procedure';
import { id, moment, sha256 } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** A revision of a procedure, without its document. */
export const revisionRow = z.object({
  revision: z.number().int(),
  hash: sha256,
  state: z.enum(['draft', 'approved', 'superseded', 'withdrawn']),
  writtenBy: id,
  approvedBy: id.nullable(),
  approvedAt: moment.nullable(),
});
/** A procedure and its revisions, newest first. */
export const procedureRow = z.object({
  id,
  code: z.string(),
  title: z.string(),
  engine: z.string(),
  component: z.string(),
  revisions: z.array(revisionRow),
});
/** A procedure and its revisions. */
export type ProcedureRow = z.output<typeof procedureRow>;

/** Every procedure of the shop. */
export const listProcedures = defineEndpoint({
  method: 'GET',
  path: '/api/procedures',
  auth: 'office',
  right: 'see',
  responses: { 200: z.object({ procedures: z.array(procedureRow) }) },
});
/** A procedure with the document of one revision (default: the approved one, else the newest). Errors: `procedure.unknown` 404. */
export const getProcedure = defineEndpoint({
  method: 'GET',
  path: '/api/procedures/:id',
  auth: 'office',
  right: 'see',
  params: z.object({ id }),
  query: z.object({ revision: z.coerce.number().int().min(1).optional() }),
  responses: {
    200: procedureRow.extend({
      revision: revisionRow,
      document: z.custom<ProcedureDocument>((value) => typeof value === 'object' && value !== null),
    }),
  },
});
