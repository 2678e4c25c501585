import type { Router } from 'express';
import * as contract from '@shared/contracts/demo.contract';
import type { Deps } from '../../deps';
import { publicRoute } from '../../http/route';
import { demoShop, enrolDemoTablet, showDoors } from './demo.usecases';

/** Adds the demo's doors. Called only in the demo: elsewhere these addresses do not exist. */
export const demoRoutes = (router: Router, deps: Deps): void => {
  publicRoute(router, deps, contract.doors, ({ inShop }) => inShop(demoShop, showDoors));
  publicRoute(router, deps, contract.demoTablet, ({ body, inShop }) =>
    inShop(demoShop, (tx) => enrolDemoTablet(deps, tx, body.publicJwk)),
  );
};
