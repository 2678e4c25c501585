import { spawn } from 'node:child_process';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { makeTestSigner } from '../support/testSigner';
import { anybody, callerWith, signedIn } from './support/calls';
import { stored } from './support/stored';
import { enrolWith } from './support/testTablet';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer();
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

interface Run {
  code: number;
  said: string;
  failed: string;
}

/** Runs the command as a shell would. */
const shop = (args: string[], environment: Record<string, string> = {}): Promise<Run> =>
  new Promise((resolve) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'server/createShop.ts', ...args], {
      env: {
        ...process.env,
        DATABASE_URL: server.database.appUrl,
        APP_SECRET: server.deps.config.appSecret,
        ...environment,
      },
    });
    const run: Run = { code: 1, said: '', failed: '' };
    child.stdout.on('data', (data) => (run.said += String(data)));
    child.stderr.on('data', (data) => (run.failed += String(data)));
    child.once('close', (code) => resolve({ ...run, code: code ?? 1 }));
  });

const wanted = {
  name: 'Thistle Row Engines',
  prefix: 'TR',
  'time-zone': 'Europe/London',
  admin: 'Ada Merrow',
  email: 'ada@thistle-row.example',
};
const create = (changes: Record<string, string> = {}, environment: Record<string, string> = {}): Promise<Run> =>
  shop(
    ['create', ...Object.entries({ ...wanted, ...changes }).flatMap(([name, value]) => [`--${name}`, value])],
    environment,
  );

const shopCount = async (): Promise<number> =>
  Number((await stored<{ count: string }>(server, 'select count(*) from shops'))[0]?.count);

describe('npm run shop -- create', () => {
  it('makes a shop whose admin signs in and lets in the first tablet', async () => {
    const run = await create();
    expect([run.code, run.failed]).toEqual([0, '']);
    const password = /: ([A-Z2-9]{4}(?:-[A-Z2-9]{4}){4})\n/.exec(run.said)?.[1] ?? '';
    const admin = await signedIn(server, {
      ...{ id: '', name: wanted.admin, pin: '', roles: ['admin'] },
      email: wanted.email,
      password,
    });
    expect(admin.me.shop).toMatchObject({ name: wanted.name, timeZone: 'Europe/London' });
    expect(admin.me.person).toMatchObject({ name: 'Ada Merrow', roles: ['admin'] });

    const made = await admin.send('POST', '/api/tablets/enrolment-codes', {});
    const { code } = made.body as unknown as { code: string };
    const enrolled = await enrolWith(server, code, await makeTestSigner());
    expect(enrolled.status).toBe(201);
    const { token } = enrolled.body as unknown as { token: string };
    const catalogue = await callerWith(server, { authorization: `Bearer ${token}` }).get('/api/tablet/catalogue');
    expect(catalogue.status).toBe(200);
  });

  it('shows the password once: only its hash is stored, and another one does not sign in', async () => {
    const run = await create({ name: 'Osier Yard', email: 'ines@osier-yard.example' });
    const password = run.said.trim().split(' ').at(-1) ?? '';
    const rows = await stored<{ all: string }>(
      server,
      `select row_to_json(p)::text as all from people p where email = 'ines@osier-yard.example'`,
    );
    expect(rows).toHaveLength(1);
    expect(rows[0]?.all).toContain('$argon2id$');
    expect(rows[0]?.all).not.toContain(password);
    const body = { email: 'ines@osier-yard.example', password: password.toLowerCase() };
    expect((await anybody(server).send('POST', '/api/office/sign-in', body)).status).toBe(401);
  });

  it('typed twice makes one shop', async () => {
    const two = { name: 'Withy End', email: 'jo@withy-end.example' };
    expect((await create(two)).code).toBe(0);
    const before = await shopCount();
    const again = await create(two);
    expect([again.code, again.said]).toEqual([1, '']);
    expect(again.failed).toMatch(/^Nothing was made\. jo@withy-end\.example signs in at "Withy End" already/);
    expect(await shopCount()).toBe(before);
  });

  it('refuses what does not do in a sentence, and makes nothing', async () => {
    const before = await shopCount();
    const run = await create({ prefix: 'tr' });
    expect([run.code, run.said]).toEqual([1, '']);
    expect(run.failed).toMatch(
      /^Nothing was made\.\n--prefix "tr" does not do\. The prefix begins every proof number[^\n]*\n$/,
    );
    expect(await shopCount()).toBe(before);
  });

  it('says what is wrong with the database, in a sentence', async () => {
    const away = await create({}, { DATABASE_URL: 'postgres://nobody:x@127.0.0.1:1/none' });
    expect(away.failed).toBe('Nothing was made. The database does not answer: is Boltwalk running?\n');
    const stranger = await create({}, { DATABASE_URL: server.database.appUrl.replace(/:[^:@]+@/, ':wrong@') });
    expect(stranger.failed).toBe('Nothing was made. The database refuses the password of DATABASE_URL.\n');
    const elsewhere = await create({}, { DATABASE_URL: server.database.appUrl.replace(/[^/]+$/, 'nowhere') });
    expect(elsewhere.failed).toBe(
      'Nothing was made. There is no such database: start Boltwalk once, which makes it.\n',
    );
  });

  it('keeps the rules of production: a simple secret is refused', async () => {
    const run = await create({}, { NODE_ENV: 'production', APP_SECRET: 'a'.repeat(40) });
    expect([run.code, run.failed]).toEqual([1, expect.stringContaining('APP_SECRET: too simple')]);
  });
});
