import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { CSRF_HEADER } from '@shared/contracts/officeAuth.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import { challengeText } from '@shared/contracts/tablets.contract';
import { signDetached } from '@shared/record/signature';
import { anybody, callerWith, signedIn, type Caller } from './support/calls';
import { stored, storedHashes } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

/*
 * Fault 24: whatever is signed in, ended or missing in this browser, a tablet's events wait, go out by the tablet's own
 * renewed token, and keep the person who made them.
 */

const QUARTER = 15 * 60_000;

let server: TestServer;
let shop: TestShop;
let tablet: TestTablet;

beforeAll(async () => {
  server = await startTestServer();
  shop = await makeTestShop(server.deps);
  tablet = await enrolledTablet(server, shop);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const twelveEvents = { until: (_: unknown, book: { events: readonly unknown[] }) => book.events.length >= 12 };
const hashes = (walk: TabletWalk): string[] => walk.log.signed.map(({ hash }) => hash);
const sendAs = (caller: Caller, walk: TabletWalk) =>
  caller.send('POST', `/api/tablet/walks/${walk.id}/events`, walk.batch());

/** A new bearer for a challenge that the tablet signs: no person has a part in it. */
const renewedToken = async (): Promise<string> => {
  const who = { shop: shop.id, tablet: tablet.enrolled.tablet.id };
  const asked = await anybody(server).send('POST', '/api/tablets/challenge', who);
  const { challenge } = asked.body as unknown as { challenge: string };
  const signature = await signDetached(challengeText(challenge), tablet.key.signer);
  const given = await anybody(server).send('POST', '/api/tablets/token', { ...who, challenge, signature });
  return (given.body as unknown as { token: string }).token;
};

describe('a token that ended before the batch came (fault 24)', () => {
  it('is refused as such and stores nothing; the same batch goes out with a new one', async () => {
    const walk = await walked(tablet, twelveEvents);
    server.pass(QUARTER + 1);
    const late = await sendAs(tablet, walk);
    expect([late.status, late.body.error?.code]).toEqual([401, 'token.expired']);
    expect(await storedHashes(server, walk.id)).toEqual([]);

    const again = await sendAs(callerWith(server, { authorization: `Bearer ${await renewedToken()}` }), walk);
    expect(again.body as unknown as Receipt).toMatchObject({ accepted: 12, next: 12, quarantined: [] });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });

  it('leaves the events to those who made them, whoever is signed in at the office of this browser', async () => {
    const walk = await walked(tablet, twelveEvents);
    const { email, password } = shop.people.admin;
    const reply = await anybody(server).send('POST', '/api/office/sign-in', { email, password });
    const cookie = (reply.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
    const { csrf } = reply.body as unknown as { csrf: string };
    const token = await renewedToken();
    const both = { cookie, [CSRF_HEADER]: csrf, authorization: `Bearer ${token}` };
    expect((await sendAs(callerWith(server, both), walk)).status).toBe(200);
    const rows = await stored<{ by_person: string; tablet: string }>(
      server,
      'select distinct by_person, tablet from walk_events where walk_id = $1',
      [walk.id],
    );
    const authors = new Set(walk.log.book.events.map(({ by }) => by));
    expect(authors.has(shop.people.admin.id)).toBe(false);
    expect(new Set(rows.map((row) => row.by_person))).toEqual(authors);
    expect(new Set(rows.map((row) => row.tablet))).toEqual(new Set([tablet.enrolled.tablet.id]));
  });

  it('cannot be made up for by an office session: events are taken from a tablet alone', async () => {
    const walk = await walked(tablet, twelveEvents);
    const office = await signedIn(server, shop.people.supervisor);
    const refused = await sendAs(office, walk);
    expect([refused.status, refused.body.error?.code]).toEqual([401, 'token.missing']);
    expect(await storedHashes(server, walk.id)).toEqual([]);
  });
});
