import { spawn, type ChildProcess } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { chromium, type Browser, type BrowserContext, type Page } from '@playwright/test';

const ARGUMENTS = [
  '--headless=new',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-dev-shm-usage',
  '--remote-debugging-port=0',
];

/** A tablet's browser in a process of its own with a profile on disk: it can be killed and comes back with what it kept. */
export interface TabletBrowser {
  page: Page;
  /** Ends the whole browser at once, as an empty battery would (fault 2). */
  kill9(): Promise<void>;
  close(): Promise<void>;
}

const gone = (child: ChildProcess): Promise<void> =>
  child.exitCode !== null || child.signalCode !== null
    ? Promise.resolve()
    : new Promise((resolve) => child.once('exit', () => resolve()));

/** Chromium writes the port it took into its profile. */
async function debuggingPort(profile: string, child: ChildProcess): Promise<number> {
  const file = path.join(profile, 'DevToolsActivePort');
  for (let tries = 0; tries < 200; tries++) {
    const port = fs.existsSync(file) ? Number(fs.readFileSync(file, 'utf8').split('\n')[0]) : 0;
    if (port > 0) return port;
    if (child.exitCode !== null) throw new Error(`chromium ended with ${child.exitCode}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('chromium named no debugging port');
}

const contextOf = (browser: Browser): BrowserContext => {
  const [context] = browser.contexts();
  if (!context) throw new Error('chromium has no context');
  return context;
};

async function killGroup(child: ChildProcess): Promise<void> {
  if (child.pid !== undefined && child.exitCode === null) process.kill(-child.pid, 'SIGKILL');
  await gone(child);
}

/** A fresh profile folder; remove it with `removeProfile`. */
export const makeProfile = (): string => fs.mkdtempSync(path.join(os.tmpdir(), 'boltwalk-tablet-'));

/** Removes a profile; a browser that is still ending may hold a file for a moment. */
export const removeProfile = (profile: string): void =>
  fs.rmSync(profile, { recursive: true, force: true, maxRetries: 5 });

/** Starts a tablet's browser on a profile. Its own process group, so that `kill9` leaves nothing behind. */
export async function startTabletBrowser(profile: string, size = { width: 1280, height: 800 }): Promise<TabletBrowser> {
  fs.rmSync(path.join(profile, 'DevToolsActivePort'), { force: true });
  fs.rmSync(path.join(profile, 'SingletonLock'), { force: true });
  const child = spawn(
    '/usr/bin/chromium',
    [...ARGUMENTS, `--user-data-dir=${profile}`, `--window-size=${size.width},${size.height}`, 'about:blank'],
    { detached: true, stdio: 'ignore', env: { ...process.env, HOME: profile } },
  );
  const browser = await chromium.connectOverCDP(`http://127.0.0.1:${await debuggingPort(profile, child)}`);
  const page = contextOf(browser).pages()[0] ?? (await contextOf(browser).newPage());
  await page.setViewportSize(size);
  const kill9 = async (): Promise<void> => {
    await killGroup(child);
    await browser.close().catch(() => undefined);
  };
  return {
    page,
    kill9,
    async close() {
      const session = await browser.newBrowserCDPSession();
      await session.send('Browser.close').catch(() => undefined);
      await browser.close().catch(() => undefined);
      await Promise.race([gone(child), new Promise((resolve) => setTimeout(resolve, 5_000))]);
      await killGroup(child).catch(() => undefined);
    },
  };
}
