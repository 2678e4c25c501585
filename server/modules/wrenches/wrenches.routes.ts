import type { Router } from 'express';
import { listWrenches } from '@shared/contracts/wrenches.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { listCrib } from './wrenches.usecases';

/** Adds the addresses of the crib. */
export const wrenchRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, listWrenches, async ({ tx }) => ({ wrenches: await listCrib(tx) }));
};
