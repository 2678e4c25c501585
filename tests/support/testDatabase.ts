import { randomUUID } from 'node:crypto';
import path from 'node:path';
import type { ClusterSettings } from '../../db/clusterSql.mjs';
import { createDatabase, databaseExists, databaseUrl, dropDatabase, runSql } from '../../db/clusterSql.mjs';
import { migrateDatabase, seedDatabase } from '../../server/start/database.mjs';
import { localPlace, oneAtATime } from '../../server/start/place.mjs';
import { clusterVariable } from './testCluster.mjs';

/** A database of one's own, made of the migrated (or seeded) template. */
export interface TestDatabase {
  /** As the server signs in: no bypass of row-level security. */
  appUrl: string;
  ownerUrl: string;
  backupUrl: string;
  /** Passes by every policy: for looking at what is really stored, never for the code under test. */
  superUrl: string;
  drop(): void;
}

const templates = { migrated: 'boltwalk_template', seeded: 'boltwalk_template_seeded' };

/** The cluster of this run, which the global set-up or tests/run.mjs opened. */
export const testCluster = (): ClusterSettings => {
  const text = process.env[clusterVariable];
  if (!text) throw new Error(`${clusterVariable} is not set: the project's globalSetup opens the cluster`);
  return JSON.parse(text) as ClusterSettings;
};

/** Makes a template once for all test processes; it appears under its name only when it is whole. */
const ensureTemplate = (settings: ClusterSettings, name: string, fill: (unfinished: string) => Promise<void>) =>
  oneAtATime(path.join(localPlace('test'), `template-${settings.port}.lock`), async () => {
    if (databaseExists(settings, name)) return;
    const unfinished = `${name}_unfinished`;
    dropDatabase(settings, unfinished);
    await fill(unfinished);
    runSql(settings, 'alter database :"unfinished" rename to :"name";', { variables: { unfinished, name } });
  });

/** The migrated template, made when it is missing. */
export const ensureMigratedTemplate = async () => {
  const settings = testCluster();
  await ensureTemplate(settings, templates.migrated, (name) => migrateDatabase(settings, name));
};

const ensureSeededTemplate = async () => {
  await ensureMigratedTemplate();
  const settings = testCluster();
  await ensureTemplate(settings, templates.seeded, async (name) => {
    createDatabase(settings, name, templates.migrated);
    await seedDatabase(settings, name);
  });
};

/** Clones a database for one test file; `seeded` holds the demo's shops as well. Drop it in `afterAll`. */
export const createTestDatabase = async ({ seeded = false } = {}): Promise<TestDatabase> => {
  await (seeded ? ensureSeededTemplate() : ensureMigratedTemplate());
  const settings = testCluster();
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  createDatabase(settings, name, seeded ? templates.seeded : templates.migrated);
  return {
    appUrl: databaseUrl(settings, 'app', name),
    ownerUrl: databaseUrl(settings, 'owner', name),
    backupUrl: databaseUrl(settings, 'backup', name),
    superUrl: databaseUrl(settings, 'super', name),
    drop: () => dropDatabase(settings, name),
  };
};
