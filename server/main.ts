import { mkdirSync, readFileSync } from 'node:fs';
import http from 'node:http';
import https from 'node:https';
import type { Express } from 'express';
import { createApp } from './app';
import { readConfig, type Config } from './config';
import { makeDeps } from './makeDeps';
import { startOutboxWorker } from './workers/outboxWorker';

const GRACE_MS = 8_000;

const serverFor = (config: Config, app: Express): http.Server => {
  if (!config.tls) return http.createServer(app);
  const { cert, key } = config.tls;
  return https.createServer({ cert: readFileSync(cert), key: readFileSync(key) }, app);
};

const listen = (server: http.Server, { port, host }: Config): Promise<void> =>
  new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, resolve);
  });

/** Lets requests under way end, and cuts those that do not in time: their tablets send again. */
const closeServer = (server: http.Server): Promise<void> =>
  new Promise((resolve) => {
    const impatience = setTimeout(() => server.closeAllConnections(), GRACE_MS);
    server.close(() => {
      clearTimeout(impatience);
      resolve();
    });
    server.closeIdleConnections();
  });

const main = async (): Promise<void> => {
  const config = readConfig(process.env);
  mkdirSync(config.blobDir, { recursive: true });
  const deps = makeDeps(config);
  const server = serverFor(config, createApp(deps));
  await listen(server, config);
  const worker = startOutboxWorker(deps);
  deps.log.info({ port: config.port, demo: config.demo }, 'the server answers');

  let stopping = false;
  const stop = async (): Promise<void> => {
    if (stopping) return;
    stopping = true;
    await closeServer(server);
    await worker.stop();
    await deps.client.close();
  };
  for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => void stop());
};

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
