import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { challengeText } from '@shared/contracts/tablets.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import { signDetached } from '@shared/record/signature';
import { makeTestSigner } from '../support/testSigner';
import { anybody, callerWith, signedIn } from './support/calls';
import { stored, storedHashes } from './support/stored';
import { enrolledTablet, enrolmentCode, enrolWith, walked } from './support/testTablet';
import { makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let shop: TestShop;

beforeAll(async () => {
  server = await startTestServer();
  shop = await makeTestShop(server.deps);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

describe('enrolment', () => {
  it('takes a code once: the second time it says so', async () => {
    const code = await enrolmentCode(server, shop);
    const first = await enrolWith(server, code, await makeTestSigner());
    expect(first.status).toBe(201);
    const second = await enrolWith(server, code, await makeTestSigner());
    expect([second.status, second.body.error?.code]).toEqual([409, 'enrolment.codeUsed']);
  });

  it('of two that use one code at the same moment lets in one', async () => {
    const code = await enrolmentCode(server, shop);
    const keys = await Promise.all([makeTestSigner(), makeTestSigner(), makeTestSigner()]);
    const replies = await Promise.all(keys.map((key) => enrolWith(server, code, key)));
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409, 409]);
  });

  it('refuses a code that has run out, one that never was, and a key that was not proved', async () => {
    const old = await enrolmentCode(server, shop);
    const key = await makeTestSigner();
    const proof = await signDetached('something else', key.signer);
    const body = { code: old, name: 'x', publicJwk: key.publicJwk, proof };
    const unproved = await anybody(server).send('POST', '/api/tablets/enrol', body);
    expect([unproved.status, unproved.body.error?.code]).toEqual([400, 'enrolment.badProof']);
    const unknown = await enrolWith(server, `${old.slice(0, -2)}zz`, key);
    expect([unknown.status, unknown.body.error?.code]).toEqual([404, 'enrolment.unknownCode']);
    server.pass(61 * 60_000);
    const late = await enrolWith(server, old, key);
    expect([late.status, late.body.error?.code]).toEqual([410, 'enrolment.codeExpired']);
  });

  it('makes whoever guesses wait longer and longer', async () => {
    const key = await makeTestSigner();
    const code = await enrolmentCode(server, shop);
    server.deps.failures.clear('enrol 127.0.0.1');
    const statuses: number[] = [];
    for (let tries = 0; tries < 5; tries += 1) statuses.push((await enrolWith(server, `${code}x`, key)).status);
    expect(statuses).toEqual([404, 404, 404, 429, 429]);
    server.deps.failures.clear('enrol 127.0.0.1');
  });
});

describe('a token', () => {
  const challengeFor = async (who: { shop: string; tablet: string }) => {
    const reply = await anybody(server).send('POST', '/api/tablets/challenge', who);
    return String((reply.body as unknown as { challenge: string }).challenge);
  };

  it('is given for a challenge signed by the tablet, and ends after a quarter of an hour', async () => {
    const tablet = await enrolledTablet(server, shop);
    const who = { shop: shop.id, tablet: tablet.enrolled.tablet.id };
    const challenge = await challengeFor(who);
    const signature = await signDetached(challengeText(challenge), tablet.key.signer);
    const reply = await anybody(server).send('POST', '/api/tablets/token', { ...who, challenge, signature });
    const { token } = reply.body as unknown as { token: string };
    const bearer = callerWith(server, { authorization: `Bearer ${token}` });
    expect((await bearer.get('/api/tablet/catalogue')).status).toBe(200);
    server.pass(15 * 60_000 + 1);
    const late = await bearer.get('/api/tablet/catalogue');
    expect([late.status, late.body.error?.code]).toEqual([401, 'token.expired']);
  });

  it('is not given for another key, an old challenge or the challenge of another tablet', async () => {
    const tablet = await enrolledTablet(server, shop);
    const who = { shop: shop.id, tablet: tablet.enrolled.tablet.id };
    const challenge = await challengeFor(who);
    const foreign = await signDetached(challengeText(challenge), (await makeTestSigner()).signer);
    const ask = (body: object) => anybody(server).send('POST', '/api/tablets/token', body);
    expect((await ask({ ...who, challenge, signature: foreign })).body.error?.code).toBe('challenge.badSignature');
    const other = await challengeFor({ ...who, tablet: (await enrolledTablet(server, shop)).enrolled.tablet.id });
    const signature = await signDetached(challengeText(other), tablet.key.signer);
    expect((await ask({ ...who, challenge: other, signature })).body.error?.code).toBe('challenge.badSignature');
    const own = await signDetached(challengeText(challenge), tablet.key.signer);
    server.pass(2 * 60_000 + 1);
    expect((await ask({ ...who, challenge, signature: own })).body.error?.code).toBe('challenge.expired');
  });

  it('is refused without one, and with one that was tampered with', async () => {
    expect((await anybody(server).get('/api/tablet/catalogue')).body.error?.code).toBe('token.missing');
    const tablet = await enrolledTablet(server, shop);
    const parts = tablet.enrolled.token.split('.');
    const longer = [...parts.slice(0, 2), '99999999999999', parts[3]].join('.');
    const reply = await callerWith(server, { authorization: `Bearer ${longer}` }).get('/api/tablet/catalogue');
    expect([reply.status, reply.body.error?.code]).toEqual([401, 'token.expired']);
  });
});

describe('a revoked tablet (fault 17)', () => {
  it('may send nothing more, while what it sent before still verifies', async () => {
    const tablet = await enrolledTablet(server, shop);
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 10 });
    expect((await walk.send(0, 6)).status).toBe(200);
    const admin = await signedIn(server, shop.people.admin);
    const { id } = tablet.enrolled.tablet;
    const revoked = await admin.send('POST', `/api/tablets/${id}/revoke`, { reason: 'stolen from the yard' });
    expect(revoked.status).toBe(200);
    const reply = await walk.send(6);
    expect([reply.status, reply.body.error?.code]).toEqual([403, 'tablet.revoked']);
    expect(await storedHashes(server, walk.id)).toHaveLength(6);
    const again = await admin.send('POST', `/api/tablets/${id}/revoke`, { reason: 'again' });
    expect(again.body.error?.code).toBe('tablet.alreadyRevoked');
  });
});

describe('somebody who left (fault 16)', () => {
  it('is believed for what was written before the tablet knew, marked; later events go into quarantine', async () => {
    const own = await makeTestShop(server.deps);
    const tablet = await enrolledTablet(server, own);
    const until = { until: (_: unknown, book: { events: readonly unknown[] }) => book.events.length >= 8 };
    const early = await walked(tablet, until);
    const admin = await signedIn(server, own.people.admin);
    await admin.send('POST', `/api/people/${own.people.colleague.id}/leave`, { reason: 'moved away' });

    const accepted = (await early.send()).body as unknown as Receipt;
    expect(accepted).toMatchObject({ next: 8, quarantined: [] });
    const flags = await stored<{ flags: string[] }>(server, 'select flags from walk_events where walk_id = $1', [
      early.id,
    ]);
    expect(flags.every((row) => row.flags.includes('personLeftSince'))).toBe(true);

    const catalogue = await tablet.get('/api/tablet/catalogue');
    const { cursor, people } = catalogue.body as unknown as {
      cursor: number;
      people: { id: string; state: string }[];
    };
    expect(people.find(({ id }) => id === own.people.colleague.id)?.state).toBe('left');
    const late = await walked(tablet, until, { known: cursor });
    const receipt = (await late.send()).body as unknown as Receipt;
    expect(receipt.next).toBe(0);
    expect(receipt.quarantined[0]?.code).toBe('event.personLeft');
    expect(receipt.quarantined).toHaveLength(8);
  });

  it('has a PIN that is not accepted any more, and no session', async () => {
    const own = await makeTestShop(server.deps);
    const tablet = await enrolledTablet(server, own);
    const { colleague, admin } = own.people;
    const check = async (pin: string) => {
      const at = server.deps.clock.now().toISOString();
      const jwe = await tablet.seal({ pin, person: colleague.id, tablet: tablet.enrolled.tablet.id, at });
      return tablet.send('POST', '/api/tablet/pin-check', { person: colleague.id, jwe });
    };
    expect((await check(colleague.pin)).status).toBe(200);
    const office = await signedIn(server, colleague);
    const boss = await signedIn(server, admin);
    await boss.send('POST', `/api/people/${colleague.id}/leave`, { reason: 'moved away' });
    const refused = await check(colleague.pin);
    expect([refused.status, refused.body.error?.code]).toEqual([403, 'pin.personLeft']);
    expect((await office.get('/api/office/me')).body.error?.code).toBe('session.missing');
    const again = await anybody(server).send('POST', '/api/office/sign-in', {
      email: colleague.email,
      password: colleague.password,
    });
    expect([again.status, again.body.error?.code]).toEqual([401, 'signIn.refused']);
  });
});

describe('a PIN', () => {
  it('that is wrong makes the next try wait, longer each time, and at that tablet only', async () => {
    const own = await makeTestShop(server.deps);
    const [one, two] = [await enrolledTablet(server, own), await enrolledTablet(server, own)];
    const { technician } = own.people;
    const check = async (tablet: typeof one, pin: string) => {
      const at = server.deps.clock.now().toISOString();
      const jwe = await tablet.seal({ pin, person: technician.id, tablet: tablet.enrolled.tablet.id, at });
      const reply = await tablet.send('POST', '/api/tablet/pin-check', { person: technician.id, jwe });
      return reply.body.error?.code ?? 'right';
    };
    expect([await check(one, '000001'), await check(one, '000002'), await check(one, '000003')]).toEqual([
      ...['pin.wrong', 'pin.wrong', 'pin.wrong'],
    ]);
    expect(await check(one, technician.pin)).toBe('pin.wait');
    expect(await check(two, technician.pin)).toBe('right');
    server.pass(2_001);
    expect(await check(one, '000004')).toBe('pin.wrong');
    server.pass(2_001);
    expect(await check(one, technician.pin)).toBe('pin.wait');
    server.pass(2_000);
    expect(await check(one, technician.pin)).toBe('right');
  });

  it('sealed for something else, sealed long ago, or not sealed to the shop is refused as such', async () => {
    const tablet = await enrolledTablet(server, shop);
    const { technician, colleague } = shop.people;
    const at = server.deps.clock.now().toISOString();
    const mine = { pin: technician.pin, person: technician.id, tablet: tablet.enrolled.tablet.id, at };
    const check = async (jwe: string) => {
      const reply = await tablet.send('POST', '/api/tablet/pin-check', { person: technician.id, jwe });
      return [reply.status, reply.body.error?.code];
    };
    expect(await check(await tablet.seal({ ...mine, person: colleague.id }))).toEqual([400, 'seal.otherEvent']);
    expect(await check(await tablet.seal({ ...mine, at: '2026-06-13T09:00:00.000Z' }))).toEqual([400, 'seal.stale']);
    expect(await check('e30..AAAA.BBBB.CCCC')).toEqual([400, 'seal.unreadable']);
    expect(await check((await tablet.seal(mine)).replace(/.$/, 'A').replace(/^./, 'f'))).toEqual([
      400,
      'seal.unreadable',
    ]);
  });
});
