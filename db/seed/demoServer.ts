import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';

/** The program's own server, running while the demo's walks are sent to it as a tablet would send them. */
export interface DemoServer {
  url: string;
  stop(): Promise<void>;
}

const freePort = (): Promise<number> =>
  new Promise((resolve) => {
    const probe = createServer().listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });

async function untilWell(url: string, ended: () => number | null, said: () => string): Promise<void> {
  for (let waits = 0; waits < 400; waits += 1) {
    if (ended() !== null) throw new Error(`the server ended while the demo was made:\n${said()}`);
    const well = await fetch(`${url}/api/health`).then(
      (answer) => answer.ok,
      () => false,
    );
    if (well) return;
    await sleep(50);
  }
  throw new Error(`the server does not answer:\n${said()}`);
}

/**
 * Starts the server on a free loopback port. The demo's walks go through it, so that they are verified, decided again and
 * projected by the very code that serves real tablets.
 */
export async function startDemoServer(secret: string): Promise<DemoServer> {
  const port = await freePort();
  const folder = mkdtempSync(path.join(os.tmpdir(), 'boltwalk-demo-'));
  const url = `http://127.0.0.1:${port}`;
  const environment = { DEMO: '1', NODE_ENV: 'development', HOST: '127.0.0.1', PORT: String(port), LOG_LEVEL: 'warn' };
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    env: {
      ...process.env,
      ...environment,
      APP_SECRET: secret,
      // Printed into the QR code of the demo's proof: where the shop will be reached, not this helper.
      PUBLIC_URL: process.env['PUBLIC_URL'] ?? url,
      BLOB_DIR: folder,
      DIST_DIR: folder,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (data: Buffer) => (said += data.toString()));
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  const stop = async (): Promise<void> => {
    child.kill('SIGTERM');
    await Promise.race([gone, sleep(5_000).then(() => child.kill('SIGKILL'))]);
    rmSync(folder, { recursive: true, force: true });
  };
  await untilWell(
    url,
    () => child.exitCode,
    () => said,
  ).catch(async (error: unknown) => {
    await stop();
    throw error;
  });
  return { url, stop };
}
