import type { Router } from 'express';
import * as contract from '@shared/contracts/people.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { listPeople, markLeft, setOwnPin } from './people.usecases';
import { answerOwnPinUse, listPinUses } from './pinUses.usecases';

/** Adds the addresses of people, their PINs and the uses of these. */
export const peopleRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.listPeople, async ({ tx, caller }) => ({ people: await listPeople(tx, caller) }));
  officeRoute(router, deps, contract.setOwnPin, ({ tx, caller, body }) => setOwnPin(deps, tx, caller, body));
  officeRoute(router, deps, contract.markLeft, ({ tx, caller, params, body }) =>
    markLeft(deps, tx, caller, params.id, body.reason),
  );
  officeRoute(router, deps, contract.listPinUses, async ({ tx, caller }) => ({
    uses: await listPinUses(deps, tx, caller),
  }));
  officeRoute(router, deps, contract.ownPinUse, ({ tx, caller, params }) =>
    answerOwnPinUse(deps, tx, caller, params.id, 'mine'),
  );
  officeRoute(router, deps, contract.disownPinUse, ({ tx, caller, params }) =>
    answerOwnPinUse(deps, tx, caller, params.id, 'notMine'),
  );
};
