import type { Router } from 'express';
import { health } from '@shared/contracts/health.contract';
import type { Deps } from '../../deps';
import { publicRoute } from '../../http/route';
import { askHealth } from './health.usecases';

/** Adds the address that tells whether server and database answer. */
export const healthRoutes = (router: Router, deps: Deps): void => {
  publicRoute(router, deps, health, () => askHealth(deps));
};
