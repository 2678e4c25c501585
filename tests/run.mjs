/**
 * `npm test`: every stage in turn, then one line `N passed, N failed`.
 *
 *   --only a,b        these stages alone
 *   --bench [NAMES…]  measures instead, one line a figure
 *   --drill           the long drill instead
 *
 * It has a cluster, ports and folders of its own, so that it may run beside `npm start`. Imports only `node:`.
 */
import fs from 'node:fs';
import path from 'node:path';
import { ensureDebianPackages, ensureNode, ensurePackages } from '../server/start/packages.mjs';
import { localPlace } from '../server/start/place.mjs';
import { runBench } from './support/bench.mjs';
import { inLanes, stopRunning } from './support/execute.mjs';
import { stages, vitestProject } from './support/stages.mjs';
import { clusterVariable, openTestCluster } from './support/testCluster.mjs';

/** @typedef {import('./support/stages.mjs').Stage} Stage @typedef {import('./support/stages.mjs').Result} Result */

const place = localPlace('test');
const args = process.argv.slice(2);

/** @type {Stage} */
const drill = {
  name: 'drill',
  needs: ['postgresql', 'chromium'],
  database: true,
  alone: true,
  run: () => vitestProject('drill'),
};

/** @type {Stage} */
const bench = {
  name: 'bench',
  needs: ['postgresql', 'chromium'],
  database: true,
  alone: true,
  async run() {
    const failed = await runBench(args.slice(args.indexOf('--bench') + 1));
    return { passed: 0, failed, output: '' };
  },
};

/** @returns {Stage[]} */
const chosenStages = () => {
  if (args.includes('--bench')) return [bench];
  if (args.includes('--drill')) return [drill];
  if (!args.includes('--only')) return stages;
  const names = (args[args.indexOf('--only') + 1] ?? '').split(',');
  return names.map((name) => {
    const stage = stages.find((one) => one.name === name);
    if (!stage) throw new Error(`No stage is called "${name}". Stages: ${stages.map((one) => one.name).join(', ')}`);
    return stage;
  });
};

/** Chromium writes to HOME; where that cannot be written it gets one of ours. */
const ensureHome = () => {
  try {
    fs.accessSync(process.env.HOME ?? '', fs.constants.W_OK);
  } catch {
    process.env.HOME = path.join(place, 'home');
    fs.mkdirSync(process.env.HOME, { recursive: true });
  }
};

/** @param {Stage} stage @param {import('./support/stages.mjs').Context} context @returns {Promise<Result>} */
const runStage = async (stage, context) => {
  const begun = performance.now();
  const result = await stage.run(context).catch((/** @type {Error} */ error) => ({
    passed: 0,
    failed: 1,
    skipped: 0,
    output: error.stack ?? error.message,
  }));
  if (stage === bench) {
    if (result.output) process.stderr.write(`${result.output}\n`);
    return result;
  }
  if (result.failed > 0) process.stdout.write(`\n--- ${stage.name} ---\n${result.output.trim()}\n\n`);
  const seconds = ((performance.now() - begun) / 1000).toFixed(1).padStart(7);
  const skipped = result.skipped ? `, ${result.skipped} skipped` : '';
  process.stdout.write(
    `${stage.name.padEnd(12)}${seconds} s   ${result.passed} passed, ${result.failed} failed${skipped}\n`,
  );
  return result;
};

/** What is only read may run two at a time; the rest takes turns, so that no test meets another's load. */
const runAll = async (
  /** @type {Stage[]} */ chosen,
  /** @type {import('./support/stages.mjs').StageCluster | undefined} */ cluster,
) => {
  const together = chosen.filter((stage) => !stage.alone);
  const context = { cluster, lanes: together.length > 1 ? 1 : 2 };
  const results = await inLanes(
    together.map((stage) => () => runStage(stage, context)),
    2,
  );
  for (const stage of chosen.filter((one) => one.alone)) results.push(await runStage(stage, context));
  return results;
};

let isStopping = false;

const main = async () => {
  const chosen = chosenStages();
  ensureNode();
  ensureDebianPackages([...new Set(chosen.flatMap((stage) => stage.needs))]);
  await ensurePackages(place);
  ensureHome();
  const cluster = chosen.some((stage) => stage.database) ? await openTestCluster() : undefined;
  if (cluster) process.env[clusterVariable] = JSON.stringify(cluster.settings);
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (isStopping) return;
      isStopping = true;
      stopRunning();
      void Promise.resolve(cluster?.close()).then(() => process.exit(130));
    });
  }
  const results = await runAll(chosen, cluster).finally(() => cluster?.close());
  const sum = (/** @type {'passed' | 'failed'} */ key) => results.reduce((total, result) => total + result[key], 0);
  if (!args.includes('--bench')) process.stdout.write(`\n${sum('passed')} passed, ${sum('failed')} failed\n`);
  process.exitCode = sum('failed') > 0 ? 1 : 0;
};

main().catch((/** @type {Error} */ error) => {
  process.stderr.write(`\n${error.message}\n`);
  process.exitCode = 1;
});
