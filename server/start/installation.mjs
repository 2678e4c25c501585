/** How another program reaches what `npm start` runs on this machine. Imports only `node:`. */
import fs from 'node:fs';
import path from 'node:path';
import { enterableFolder } from '../../db/cluster.mjs';
import { environmentOf } from './database.mjs';
import { localPlace } from './place.mjs';

/** The database `npm start` keeps in its own cluster. */
export const databaseName = 'boltwalk';

/**
 * The database and secret of the installation in this checkout, or null where `npm start` never ran.
 * @returns {Record<string, string> | null}
 */
export const installedEnvironment = () => {
  const place = localPlace('start');
  const secret = path.join(place, 'secret');
  if (!fs.existsSync(secret) || !fs.existsSync(path.join(place, 'postgresql'))) return null;
  const cluster = path.join(enterableFolder(path.join(place, 'postgresql')), 'cluster.json');
  if (!fs.existsSync(cluster)) return null;
  const settings = JSON.parse(fs.readFileSync(cluster, 'utf8'));
  return { ...environmentOf(settings, databaseName), APP_SECRET: fs.readFileSync(secret, 'utf8').trim() };
};
