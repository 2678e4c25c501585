/** `npm run bench`: runs tests/bench/*.bench.ts and prints `name value unit`, one figure a line. */
import fs from 'node:fs';
import path from 'node:path';
import { ensurePages } from '../../server/start/build.mjs';
import { localPlace, root } from '../../server/start/place.mjs';
import { execute } from './execute.mjs';

const folder = path.join(root, 'tests/bench');

/** The figures a file says it prints, on its line `Figures: a, b, c`. @param {string} file */
const figuresOf = (file) => {
  const line = /Figures:([^\n*]*)/.exec(fs.readFileSync(path.join(folder, file), 'utf8'));
  return (line?.[1] ?? '').split(',').map((name) => name.trim());
};

/** @param {string} name a file's stem, a figure, or the beginning of figures @param {string} figure @param {string} file */
const asksFor = (name, figure, file) => file === `${name}.bench.ts` || figure.startsWith(name);

/**
 * Prints the figures asked for (all without names) and answers how many files failed.
 * @param {string[]} names
 */
export const runBench = async (names) => {
  const files = fs.existsSync(folder) ? fs.readdirSync(folder).filter((file) => file.endsWith('.bench.ts')) : [];
  const wants = (/** @type {string} */ figure, /** @type {string} */ file) =>
    names.length === 0 || names.some((name) => asksFor(name, figure, file));
  const chosen = files.filter((file) => figuresOf(file).some((figure) => wants(figure, file)));
  if (chosen.length === 0) {
    const known = files.flatMap(figuresOf).join(', ') || 'none yet';
    process.stderr.write(`No figure is called ${names.join(', ') || 'anything'}. Known: ${known}\n`);
    return 1;
  }
  const pages = await ensurePages(localPlace('test'));
  let failed = 0;
  for (const file of chosen) {
    const onLine = (/** @type {string} */ line) => {
      if (/^\w+ -?[\d.]+ \S+$/.test(line) && wants(line.split(' ')[0] ?? '', file)) process.stdout.write(`${line}\n`);
    };
    const environment = { DIST_DIR: pages };
    const outcome = await execute(['--import', 'tsx', path.join('tests/bench', file)], { environment, onLine });
    if (outcome.code === 0) continue;
    failed += 1;
    process.stderr.write(`${file} failed:\n${outcome.output}\n`);
  }
  return failed;
};
