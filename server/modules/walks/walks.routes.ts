import type { Router } from 'express';
import * as contract from '@shared/contracts/walks.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { listOfficeWalks, officeWalkWhole } from './officeWalks.usecases';

/** Adds the addresses by which the office reads walks. */
export const walkRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.listWalks, async ({ tx, caller, query }) => ({
    walks: await listOfficeWalks(tx, caller, query),
  }));
  officeRoute(router, deps, contract.getWalk, ({ tx, params, query }) =>
    officeWalkWhole(deps, tx, params.id, query.branch),
  );
};
