import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { JobWhole } from '@shared/contracts/jobs.contract';
import { anybody, callerWith, signedIn, type Caller, type Reply } from './support/calls';
import { enrolledTablet, walked } from './support/testTablet';
import { makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let shop: TestShop;
let clerk: Caller;

beforeAll(async () => {
  server = await startTestServer();
  shop = await makeTestShop(server.deps);
  clerk = await signedIn(server, shop.people.clerk);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const codeOf = (reply: Reply) => [reply.status, reply.body.error?.code];

describe('a VIN', () => {
  const open = (number: string, vin: string) => clerk.send('POST', '/api/jobs', { number, vin });

  it('with O or I names the place, the letter and the digit that is meant', async () => {
    const reply = await open('V-1', 'ZZ9KD63X5TBO04417');
    expect(codeOf(reply)).toEqual([400, 'vin.letterIOQ']);
    expect(reply.body.error?.details).toMatchObject({ at: 12, character: 'O', meant: '0', field: 'vin' });
    const other = await open('V-1', 'ZZ9KD63X5TB0044I7');
    expect(other.body.error?.details).toMatchObject({ at: 16, character: 'I', meant: '1' });
  });

  it('too short says how long it is', async () => {
    const reply = await open('V-1', 'ZZ9KD63X5TB00441');
    expect(codeOf(reply)).toEqual([400, 'vin.length']);
    expect(reply.body.error?.details).toMatchObject({ length: 16 });
  });

  it('with a wrong check digit is taken, without blanks and hyphens, and found when read wrongly', async () => {
    const reply = await open('V-2', ' zz9kd63x-7tb004417 ');
    expect(reply.status).toBe(201);
    expect((reply.body as unknown as JobWhole).vin).toBe('ZZ9KD63X7TB004417');
    const found = await clerk.get('/api/jobs?q=ZZ9KD63X7TBOO44I7');
    expect((found.body as unknown as { jobs: JobWhole[] }).jobs.map(({ number }) => number)).toEqual(['V-2']);
  });
});

describe('a job', () => {
  it('of a number that is taken, of an unknown procedure, of text that cannot be stored is refused', async () => {
    expect(codeOf(await clerk.send('POST', '/api/jobs', { number: shop.jobNumber }))).toEqual([409, 'job.numberTaken']);
    const joints = [{ procedure: 'NONE-1' }];
    expect(codeOf(await clerk.send('POST', '/api/jobs', { number: 'J-1', joints }))).toEqual([
      400,
      'procedure.unknown',
    ]);
    const broken = await clerk.send('POST', '/api/jobs', { number: 'J-1', customer: 'a\u0000b' });
    expect(codeOf(broken)).toEqual([400, 'text.notWellFormed']);
    const lone = await clerk.send('POST', '/api/jobs', { number: 'J-1', customer: '\ud800' });
    expect(codeOf(lone)).toEqual([400, 'text.notWellFormed']);
    const comma = await clerk.send('POST', '/api/jobs', { number: 'J-1', odometer: { value: '84,2', unit: 'km' } });
    expect(codeOf(comma)).toEqual([400, 'request.invalid']);
    expect(comma.body.error?.details).toMatchObject({ field: 'odometer.value' });
  });

  it('of two opened under one number at the same moment is opened once', async () => {
    const replies = await Promise.all([1, 2, 3].map(() => clerk.send('POST', '/api/jobs', { number: 'J-SAME' })));
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
  });

  it('is not closed while a joint is unfinished, and takes no joint once it is closed', async () => {
    const tablet = await enrolledTablet(server, shop);
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 5 });
    await walk.send();
    const path = `/api/jobs/${shop.job}`;
    expect(codeOf(await clerk.send('PATCH', path, { state: 'closed' }))).toEqual([409, 'job.walksOpen']);
    const made = (await clerk.send('POST', '/api/jobs', { number: 'J-2' })).body as unknown as JobWhole;
    expect((await clerk.send('PATCH', `/api/jobs/${made.id}`, { state: 'closed' })).status).toBe(200);
    const joint = await clerk.send('POST', `/api/jobs/${made.id}/joints`, { procedure: 'HEAD-D6' });
    expect(codeOf(joint)).toEqual([409, 'job.closed']);
  });
});

describe('an address', () => {
  it.each([
    ['GET', '/api/nothing-here', 404, 'route.unknown'],
    ['GET', '/api/jobs/%E0%A4%A', 400, 'request.badPath'],
    ['GET', '/api/jobs/not-a-uuid', 400, 'id.notUuid'],
    ['GET', '/api/jobs?limit=many', 400, 'request.invalid'],
    ['GET', '/api/jobs?state=open&state=closed', 400, 'request.invalid'],
    ['DELETE', '/api/jobs', 404, 'route.unknown'],
    ['GET', '/api/demo/doors', 404, 'route.unknown'],
    ['POST', '/api/demo/tablet', 404, 'route.unknown'],
    ['GET', '/api/public/proofs/short', 404, 'proof.unknown'],
    ['GET', '/missing.js', 404, 'route.unknown'],
  ])('%s %s is answered with %i %s', async (method, path, status, code) => {
    expect(codeOf(await clerk.send(method, path, method === 'POST' ? {} : undefined))).toEqual([status, code]);
  });

  it('that is unknown is never answered with the page under /api', async () => {
    const reply = await anybody(server).get('/api/office');
    expect(reply.headers.get('content-type')).toMatch(/^application\/json/);
  });
});

describe('a body', () => {
  const post = async (body: string | undefined, headers: Record<string, string>) => {
    const init = { method: 'POST', headers, ...(body === undefined ? {} : { body }) };
    const response = await fetch(`${server.url}/api/office/sign-in`, init);
    return [response.status, ((await response.json()) as { error: { code: string } }).error.code];
  };
  const json = { 'content-type': 'application/json' };

  it('malformed, empty, of another type or encoding, or too large is refused as such', async () => {
    expect(await post('{"email":', json)).toEqual([400, 'body.notJson']);
    expect(await post('', json)).toEqual([400, 'request.invalid']);
    expect(await post(undefined, {})).toEqual([415, 'body.wrongType']);
    expect(await post('{}', { 'content-type': 'text/html' })).toEqual([415, 'body.wrongType']);
    expect(await post('{}', { ...json, 'content-encoding': 'zstd-x' })).toEqual([415, 'body.wrongEncoding']);
    expect(await post('{}', { 'content-type': 'application/json; charset=ebcdic' })).toEqual([
      415,
      'body.wrongEncoding',
    ]);
    expect(await post(`"${'x'.repeat(300_000)}"`, json)).toEqual([413, 'body.tooLarge']);
    expect(await post('"text"', json)).toEqual([400, 'body.notJson']);
  });
});

describe('signing in', () => {
  it('slows the one name that is guessed at, and opens again', async () => {
    const own = await makeTestShop(server.deps);
    const { supervisor, technician } = own.people;
    const tryIn = async (password: string, person = supervisor) => {
      const reply = await anybody(server).send('POST', '/api/office/sign-in', { email: person.email, password });
      return reply.body.error?.code ?? 'in';
    };
    expect([await tryIn('a'), await tryIn('b'), await tryIn('c')]).toEqual(Array(3).fill('signIn.refused'));
    expect(await tryIn(supervisor.password)).toBe('signIn.wait');
    expect(await tryIn(technician.password, technician)).toBe('in');
    server.pass(2_001);
    expect(await tryIn(supervisor.password)).toBe('in');
  });

  it('says the same for an unknown address, and slows it as well', async () => {
    const tries: (string | undefined)[] = [];
    for (let count = 0; count < 4; count += 1) {
      const body = { email: 'nobody@nowhere.example', password: 'x' };
      tries.push((await anybody(server).send('POST', '/api/office/sign-in', body)).body.error?.code);
    }
    expect(tries).toEqual(['signIn.refused', 'signIn.refused', 'signIn.refused', 'signIn.wait']);
  });

  it('asks which shop where one address and password fit two', async () => {
    const [one, two] = [await makeTestShop(server.deps), await makeTestShop(server.deps)];
    const { stored } = await import('./support/stored');
    const email = one.people.admin.email;
    await stored(server, 'update people set email = $1 where id = $2', [email, two.people.admin.id]);
    const { password } = one.people.admin;
    const reply = await anybody(server).send('POST', '/api/office/sign-in', { email, password });
    expect(codeOf(reply)).toEqual([409, 'signIn.whichShop']);
    const shops = (reply.body.error?.details as { shops: { id: string }[] }).shops.map(({ id }) => id);
    expect(shops.sort()).toEqual([one.id, two.id].sort());
    const chosen = await anybody(server).send('POST', '/api/office/sign-in', { email, password, shop: two.id });
    expect(chosen.status).toBe(200);
  });

  it('ends with signing out, and after its days', async () => {
    const keeper = await signedIn(server, shop.people.keeper);
    expect((await keeper.send('POST', '/api/office/sign-out')).status).toBe(200);
    expect(codeOf(await keeper.get('/api/office/me'))).toEqual([401, 'session.missing']);
    const later = await signedIn(server, shop.people.keeper);
    server.pass(14 * 24 * 3_600_000 + 1);
    expect(codeOf(await later.get('/api/office/me'))).toEqual([401, 'session.expired']);
    clerk = await signedIn(server, shop.people.clerk);
  });

  it('sets a cookie that no script reads and no other site sends', async () => {
    const { email, password } = shop.people.clerk;
    const reply = await anybody(server).send('POST', '/api/office/sign-in', { email, password });
    expect(reply.headers.get('set-cookie')).toMatch(/^boltwalk=[\w-]{65}; .*HttpOnly; SameSite=Strict$/);
  });

  it('with a token of another shop or made up is nobody', async () => {
    const made = callerWith(server, { cookie: `boltwalk=${'A'.repeat(65)}` });
    expect(codeOf(await made.get('/api/office/me'))).toEqual([401, 'session.missing']);
  });
});

describe('a PIN', () => {
  it('is set after the password, and never one that is guessed first (P4)', async () => {
    const keeper = await signedIn(server, shop.people.keeper);
    const set = (pin: string, password = shop.people.keeper.password) =>
      keeper.send('POST', '/api/people/me/pin', { pin, password });
    expect(codeOf(await set('12345'))).toEqual([400, 'pin.sixDigits']);
    expect(codeOf(await set('123456'))).toEqual([400, 'pin.trivial']);
    expect(codeOf(await set('111111'))).toEqual([400, 'pin.trivial']);
    expect(codeOf(await set('583920', 'wrong'))).toEqual([401, 'signIn.refused']);
    const reply = await set('583920');
    expect([reply.status, reply.body]).toEqual([200, { pinVersion: 2 }]);
  });
});
