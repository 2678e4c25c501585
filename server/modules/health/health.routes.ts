import type { Router } from 'express';
import { health } from '@shared/contracts/health.contract';
import type { Deps } from '../../deps';
import { publicRoute } from '../../http/route';
import { demandDatabase } from './health.repository';

/** Program version that the health address tells. */
const VERSION = '0.1.0';

/** Adds the address that tells whether server and database answer. */
export const healthRoutes = (router: Router, deps: Deps): void => {
  publicRoute(router, deps, health, async () => {
    await demandDatabase(deps.client);
    return { ok: true as const, now: deps.clock.now().toISOString(), demo: deps.config.demo, version: VERSION };
  });
};
