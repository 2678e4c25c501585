import type { Deps } from '../../deps';
import { demandDatabase } from './health.repository';

/** Program version that the health address tells. */
const VERSION = '0.1.0';

/** Whether server and database answer; throws when the database does not. */
export const askHealth = async (deps: Deps) => {
  await demandDatabase(deps.client);
  return { ok: true as const, now: deps.clock.now().toISOString(), demo: deps.config.demo, version: VERSION };
};
