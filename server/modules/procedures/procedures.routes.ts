import type { Router } from 'express';
import * as contract from '@shared/contracts/procedures.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { getProcedure, listProcedures } from './procedures.usecases';

/** Adds the addresses of procedures. */
export const procedureRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.listProcedures, async ({ tx }) => ({ procedures: await listProcedures(tx) }));
  officeRoute(router, deps, contract.getProcedure, ({ tx, params, query }) =>
    getProcedure(tx, params.id, query.revision),
  );
};
