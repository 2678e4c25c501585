import { readConfig, type Config } from './config';
import { makeDeps } from './makeDeps';
import { createShop } from './modules/shops/newShop.usecases';
import { readShopCommand, Refusal } from './readShopCommand';
import { installedEnvironment } from './start/installation.mjs';

/*
 * `npm run shop -- create …`: the first shop of a real installation, with its first admin. The demo makes its own.
 */

/** The command reads database and secret only; pages and blobs are none of its business. */
const configOf = (environment: NodeJS.ProcessEnv): Config => {
  const here = environment.DATABASE_URL ? {} : installedEnvironment();
  if (here === null) {
    throw new Refusal('No installation is here: run `npm start` once, or set DATABASE_URL and APP_SECRET.');
  }
  const unused = { PUBLIC_URL: 'http://localhost', BLOB_DIR: 'unused', DIST_DIR: 'unused', LOG_LEVEL: 'silent' };
  return readConfig({ ...unused, ...here, ...environment });
};

/** The database's own words for what only the one who runs it can put right. */
const REASONS: Record<string, string> = {
  ECONNREFUSED: 'The database does not answer: is Boltwalk running?',
  '28P01': 'The database refuses the password of DATABASE_URL.',
  '3D000': 'There is no such database: start Boltwalk once, which makes it.',
  '42P01': 'The database has no tables yet: start Boltwalk once, which makes them.',
};

const reasonOf = (error: unknown): string | undefined => {
  for (let at = error; at instanceof Error; at = at.cause) {
    const { code } = at as NodeJS.ErrnoException;
    if (code !== undefined && REASONS[code]) return `Nothing was made. ${REASONS[code]}`;
  }
  return undefined;
};

const main = async (): Promise<void> => {
  const wanted = readShopCommand(process.argv.slice(2));
  const deps = makeDeps(configOf(process.env));
  try {
    const outcome = await createShop(deps, wanted);
    if (outcome.kind === 'exists') {
      throw new Refusal(`Nothing was made. ${wanted.email} signs in at "${wanted.name}" already (${outcome.shop}).`);
    }
    process.stdout.write(
      `The shop "${wanted.name}" is there (${outcome.shop}).\n` +
        `${wanted.admin} signs in at the office as ${wanted.email}.\n` +
        `Password, shown this once and stored nowhere: ${outcome.password}\n`,
    );
  } finally {
    await deps.client.close();
  }
};

main().catch((error: unknown) => {
  const said = error instanceof Error ? error.message : String(error);
  process.stderr.write(`${reasonOf(error) ?? said}\n`);
  process.exitCode = 1;
});
