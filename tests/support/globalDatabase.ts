import { clusterVariable, openTestCluster } from './testCluster.mjs';
import { ensureMigratedTemplate } from './testDatabase';

/**
 * Global set-up of every project with a database (Vitest's and Playwright's): uses the cluster tests/run.mjs opened,
 * or opens one when the tests were called by hand. Answers what tears it down.
 */
const setUpDatabase = async () => {
  if (process.env[clusterVariable]) {
    await ensureMigratedTemplate();
    return undefined;
  }
  const cluster = await openTestCluster();
  process.env[clusterVariable] = JSON.stringify(cluster.settings);
  const close = async () => {
    delete process.env[clusterVariable];
    await cluster.close();
  };
  await ensureMigratedTemplate().catch(async (error: unknown) => {
    await close();
    throw error;
  });
  return close;
};

export default setUpDatabase;
