/** The stages of `npm test`, each answering what passed and what failed. Imports only `node:`. */
import fs from 'node:fs';
import path from 'node:path';
import { ensurePages } from '../../server/start/build.mjs';
import { localPlace } from '../../server/start/place.mjs';
import { execute, inLanes } from './execute.mjs';

/**
 * @typedef {{ passed: number, failed: number, skipped?: number, output: string }} Result
 * @typedef {{ setFsync(on: boolean): void }} StageCluster
 * @typedef {{ cluster?: StageCluster, lanes: number }} Context
 * @typedef {{ name: string, needs: string[], database?: boolean, alone?: boolean, run(context: Context): Promise<Result> }} Stage
 *   `needs`: Debian packages; `database`: wants the cluster; `alone`: nothing may run beside it
 */

const place = localPlace('test');
const prettier = 'node_modules/prettier/bin/prettier.cjs';
const eslint = 'node_modules/eslint/bin/eslint.js';
const knip = 'node_modules/knip/bin/knip.js';
const vitest = 'node_modules/vitest/vitest.mjs';
const playwright = 'node_modules/@playwright/test/cli.js';
const cache = path.join(place, 'cache');

/** A stage of commands counts as one: all of them pass, or it failed. @param {string[][]} commands @param {number} lanes */
const asOne = async (commands, lanes) => {
  const tasks = commands.map((args) => () => execute(args));
  const outcomes = await inLanes(tasks, lanes);
  const failed = outcomes.filter((outcome) => outcome.code !== 0);
  const output = failed.map((outcome) => outcome.output).join('\n');
  return { passed: failed.length === 0 ? 1 : 0, failed: failed.length === 0 ? 0 : 1, output };
};

/** A report that is missing, empty or better than its exit code is a failure. @param {Result} counts @param {number} code */
const distrusted = (counts, code) => {
  if (counts.passed + counts.failed === 0) {
    return { ...counts, failed: 1, output: `${counts.output}\nNo test was run: an empty stage is a failed one.` };
  }
  return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
};

/** @param {string} file @returns {any} */
const readReport = (file) => (fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')) : null);

/** Runs one of Vitest's projects. @param {string} project @returns {Promise<Result>} */
export const vitestProject = async (project) => {
  const report = path.join(place, `${project}.json`);
  fs.rmSync(report, { force: true });
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  const outcome = await execute([vitest, 'run', '--project', project, ...reporters], { environment: { CI: 'true' } });
  const found = readReport(report);
  const brokenFiles = found?.testResults.filter(
    (/** @type {{ status: string, assertionResults: unknown[] }} */ file) =>
      file.status === 'failed' && file.assertionResults.length === 0,
  );
  return distrusted(
    {
      passed: found?.numPassedTests ?? 0,
      failed: (found?.numFailedTests ?? 0) + (brokenFiles?.length ?? 0),
      skipped: (found?.numPendingTests ?? 0) + (found?.numTodoTests ?? 0),
      output: outcome.output,
    },
    outcome.code,
  );
};

/** @returns {Promise<Result>} */
const endToEnd = async () => {
  const report = path.join(place, 'e2e.json');
  fs.rmSync(report, { force: true });
  await ensurePages(place);
  const environment = { CI: 'true', BOLTWALK_E2E_REPORT: report, BOLTWALK_E2E_OUTPUT: path.join(place, 'e2e') };
  const outcome = await execute([playwright, 'test', '-c', 'e2e/playwright.config.ts'], { environment });
  const stats = readReport(report)?.stats;
  const counts = {
    passed: (stats?.expected ?? 0) + (stats?.flaky ?? 0),
    failed: stats?.unexpected ?? 0,
    skipped: stats?.skipped ?? 0,
    output: outcome.output,
  };
  return distrusted(counts, outcome.code);
};

/**
 * Rules that know types may answer from another file's past, so the build machine asks afresh; at the desk what did not
 * change is not read again.
 */
const lintCache = () =>
  process.env.CI ? [] : ['--cache', '--cache-strategy', 'content', '--cache-location', `${cache}/eslint`];

const lintCommands = () => [
  [eslint, '.', '--max-warnings', '0', ...lintCache()],
  [knip, '--no-progress', '--no-config-hints'],
];

/** @param {string} folder */
const typeCheck = (folder) => [
  folder === 'src' ? 'node_modules/vue-tsc/bin/vue-tsc.js' : 'node_modules/typescript/bin/tsc',
  '-p',
  folder,
];

const judges = ['poppler-utils', 'zbar-tools', 'qpdf'];

/** @type {Stage[]} */
export const stages = [
  {
    name: 'format',
    needs: [],
    run: ({ lanes }) =>
      asOne(
        [[prettier, '--check', '.', '--log-level', 'warn', '--cache', '--cache-location', `${cache}/prettier`]],
        lanes,
      ),
  },
  { name: 'lint', needs: [], run: ({ lanes }) => asOne(lintCommands(), lanes) },
  {
    name: 'types',
    needs: [],
    run: ({ lanes }) => asOne(['src', 'server', 'shared', 'src/sw', 'e2e'].map(typeCheck), lanes),
  },
  { name: 'unit', needs: [], run: () => vitestProject('unit') },
  { name: 'component', needs: [], alone: true, run: () => vitestProject('component') },
  { name: 'handbook', needs: ['units'], alone: true, run: () => vitestProject('handbook') },
  {
    name: 'integration',
    needs: ['postgresql', ...judges],
    database: true,
    alone: true,
    run({ cluster }) {
      cluster?.setFsync(false); // a lost file costs nothing here, and it is twice as fast
      return vitestProject('integration').finally(() => cluster?.setFsync(true));
    },
  },
  { name: 'sync', needs: ['postgresql'], database: true, alone: true, run: () => vitestProject('sync') },
  {
    name: 'e2e',
    needs: ['postgresql', 'chromium', ...judges],
    database: true,
    alone: true,
    run: endToEnd,
  },
];
