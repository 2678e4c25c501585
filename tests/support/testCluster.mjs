/** A throw-away PostgreSQL cluster for one run of tests. Imports only `node:`: tests/run.mjs uses it early. */
import fs from 'node:fs';
import path from 'node:path';
import { openCluster, stopLeftover } from '../../db/cluster.mjs';
import { isAlive, localPlace } from '../../server/start/place.mjs';

/** The environment variable that tells test processes which cluster to use. */
export const clusterVariable = 'BOLTWALK_TEST_PG';

const home = () => path.join(localPlace('test'), 'clusters');
let opened = 0;

/** Removes clusters whose run was killed before it could do so itself. */
const removeOrphans = async () => {
  for (const name of fs.readdirSync(home())) {
    if (isAlive(Number(name.split('-')[0]))) continue;
    const folder = path.join(home(), name);
    const where = fs.existsSync(path.join(folder, 'home'))
      ? fs.readFileSync(path.join(folder, 'home'), 'utf8')
      : folder;
    await stopLeftover(path.join(where, 'data'));
    fs.rmSync(where, { recursive: true, force: true });
    fs.rmSync(folder, { recursive: true, force: true });
  }
};

/**
 * Opens a fresh cluster; `close` stops and removes it. Every run has its own, so that runs never meet.
 * @param {{ fsync?: boolean }} [options]
 */
export const openTestCluster = async ({ fsync = true } = {}) => {
  fs.mkdirSync(home(), { recursive: true });
  await removeOrphans();
  const folder = path.join(home(), `${process.pid}-${(opened += 1)}`);
  const cluster = await openCluster({ folder, fsync });
  // The data may have had to go elsewhere; whoever cleans up after us must find it.
  if (cluster.home !== folder) fs.writeFileSync(path.join(folder, 'home'), cluster.home);
  return {
    ...cluster,
    async close() {
      await cluster.stop();
      for (const place of [cluster.home, folder]) fs.rmSync(place, { recursive: true, force: true });
    },
  };
};
