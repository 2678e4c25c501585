import type { Router } from 'express';
import * as contract from '@shared/contracts/walks.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { countersignWalk, sendBackWalk, voidWalk } from './countersign.usecases';
import { chooseBranch, settleQuarantine } from './forks.usecases';
import { placeOrder } from './orders.usecases';

/** Adds the addresses by which the office writes into walks and settles what waits beside them. */
export const countersignRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.countersign, ({ tx, caller, params, body }) =>
    countersignWalk(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.sendBack, ({ tx, caller, params, body }) =>
    sendBackWalk(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.voidWalk, ({ tx, caller, params, body }) =>
    voidWalk(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.placeOrder, ({ tx, caller, params, body }) =>
    placeOrder(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.chooseBranch, ({ tx, caller, params, body }) =>
    chooseBranch(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.settleQuarantine, ({ tx, caller, params, body }) =>
    settleQuarantine(deps, tx, caller, { walk: params.id, ...body }),
  );
};
