import type { Router } from 'express';
import * as contract from '@shared/contracts/sync.contract';
import type { Deps } from '../../deps';
import { tabletRoute } from '../../http/route';
import { checkPinOnline } from '../pins/pinCheck.usecases';
import { walkChain } from '../walks/walks.usecases';
import { syncBatch } from './sync.usecases';
import { takeOverWalk } from './takeOver.usecases';

/** Adds the addresses by which a tablet brings and fetches walks. */
export const syncRoutes = (router: Router, deps: Deps): void => {
  tabletRoute(router, deps, contract.syncEvents, ({ tx, caller, params, body }) =>
    syncBatch(deps, tx, caller, { walk: params.walk, ...body }),
  );
  tabletRoute(router, deps, contract.walkForTablet, ({ tx, params, query }) =>
    walkChain(deps, tx, params.walk, query.branch),
  );
  tabletRoute(router, deps, contract.takeOver, ({ tx, caller, params, body }) =>
    takeOverWalk(deps, tx, caller, { walk: params.walk, ...body }),
  );
  tabletRoute(router, deps, contract.pinCheck, ({ tx, caller, body }) => checkPinOnline(deps, tx, caller, body));
};
