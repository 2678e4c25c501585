import { readConfig } from './config';
import { makeDeps } from './makeDeps';
import { rebuildWalk } from './modules/walks/rebuildWalk.usecases';
import { walkIds } from './modules/walks/walks.repository';
import { withShop } from './tenancy/withShop';

/**
 * Rebuilds every projection of the shops named on the command line from their chains:
 * `node --import tsx server/rebuild.ts SHOP …`. One transaction a walk, so that a shop goes on working meanwhile.
 */
const main = async (shops: readonly string[]): Promise<void> => {
  if (shops.length === 0) throw new Error('Name the shops (their ids) whose projections are to be rebuilt.');
  const deps = makeDeps(readConfig(process.env));
  for (const shop of shops) {
    const walks = await withShop(deps.client, shop, walkIds);
    for (const walk of walks) await withShop(deps.client, shop, (tx) => rebuildWalk(deps, tx, walk));
    process.stdout.write(`${shop}: ${walks.length} walks rebuilt\n`);
  }
  await deps.client.close();
};

main(process.argv.slice(2)).catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
