import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { ProofWhole, PublicProof } from '@shared/contracts/proofs.contract';
import { readSavedProof } from '@shared/proof/savedProof';
import { verifyProof } from '@shared/proof/verifyProof';
import { pdfOfProof } from '../../server/modules/proofs/proofPdf';
import { withShop } from '../../server/tenancy/withShop';
import { flat, judgePdf } from '../support/pdfTools';
import { sketchPlan } from '../support/proofKit';
import { testCrypto } from '../support/testSigner';
import { anybody, signedIn, type Caller, type Reply } from './support/calls';
import { stored } from './support/stored';
import { startTestServer, type TestServer } from './support/testServer';
import { makeJob, makeTestShop, type TestShop } from './support/testShop';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';

let server: TestServer;
let shop: TestShop;
let tablet: TestTablet;
let clerk: Caller;
let jobs = 0;

beforeAll(async () => {
  server = await startTestServer();
  server.deps.proofPdf = pdfOfProof;
  shop = await makeTestShop(server.deps);
  tablet = await enrolledTablet(server, shop);
  clerk = await signedIn(server, shop.people.clerk);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const bodyOf = <T>(reply: Reply, status = 200): T => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(status);
  return reply.body as unknown as T;
};

/** A walk of the sketch, sent and proved; the clerk issues in the language asked for. */
const proved = async (language: 'en' | 'es' = 'en'): Promise<{ walk: TabletWalk; proof: ProofWhole }> => {
  const made = await withShop(server.deps.client, shop.id, (tx) => makeJob(tx, 'HEAD-D6', `25-P${(jobs += 1)}`));
  const walk = await walked(tablet, sketchPlan, { job: made.id, joint: made.joint });
  bodyOf(await walk.send());
  return { walk, proof: bodyOf(await clerk.send('POST', `/api/walks/${walk.id}/proof`, { language }), 201) };
};
const seenByAnybody = async ({ publicUrl }: ProofWhole): Promise<PublicProof> =>
  bodyOf(await anybody(server).get(`/api/public/proofs/${publicUrl.split('/p/')[1] ?? ''}`));
const checked = ({ jws, keys, stored: storedHashes }: PublicProof) =>
  verifyProof(jws, { crypto: testCrypto, shopKeys: keys, storedHashes });
const pdfOf = (proof: ProofWhole, query = '') => clerk.get(`/api/proofs/${proof.id}/pdf${query}`);

/** Changes one bit of one stored event, past every guard of the database. */
const flip = (walk: TabletWalk, seq: number): Promise<unknown> =>
  stored(
    server,
    `begin; alter table walk_events disable trigger insert_only;
     update walk_events set bytes = set_byte(bytes, 40, get_byte(bytes, 40) # 1) where walk_id = '${walk.id}' and seq = ${seq};
     alter table walk_events enable trigger insert_only; commit`,
  );

describe('a proof of the server', () => {
  it('verifies for anybody with its link, without a name in it', async () => {
    const { walk, proof } = await proved();
    const seen = await seenByAnybody(proof);
    const check = await checked(seen);
    expect(check.problems).toEqual([]);
    expect(check).toMatchObject({ eventsChecked: walk.log.signed.length, readingsJudgedAgain: 60, shopSigned: true });
    expect(check.counts?.measured).toEqual({ inside: 56, count: 56 });
    expect(check.side.names).toEqual({});
  });

  it('is printed with all its readings and names, in the language and on the paper asked for', async () => {
    const { proof } = await proved('es');
    const reply = await pdfOf(proof, '?size=letter&language=es');
    expect(reply.headers.get('content-type')).toBe('application/pdf');
    const page = await judgePdf(reply.bytes);
    expect(page).toMatchObject({ pages: 1, complaints: '', qrCodes: [proof.publicUrl] });
    expect(page.pageSize).toContain('letter');
    expect(page.words).toContain('56 de 56 lecturas finales en ventana');
    expect(page.words).toContain('technician, mecánico');
    expect(Buffer.from(reply.bytes).equals(Buffer.from((await pdfOf(proof, '?size=letter&language=es')).bytes))).toBe(
      true,
    );
  });

  it('carries a file that verifies without the server', async () => {
    const { proof } = await proved();
    const [file] = (await judgePdf((await pdfOf(proof)).bytes)).attachments;
    const saved = readSavedProof(file?.text ?? '');
    const check = await verifyProof(saved?.sealed ?? '', { crypto: testCrypto, shopKeys: saved?.keys ?? [] });
    expect(check).toMatchObject({ problems: [], shopSigned: true });
    expect(Object.values(check.side.names).sort()).toEqual(['colleague', 'supervisor', 'technician']);
  });

  it('names the stored event of which one bit was changed after the issue, on the page and on paper (fault 21)', async () => {
    const { walk, proof } = await proved();
    await flip(walk, 91);
    const check = await checked(await seenByAnybody(proof));
    expect(check.problems).toEqual([{ code: 'storedOtherwise', seq: 91 }]);
    expect((await judgePdf((await pdfOf(proof)).bytes)).words).toContain('BROKEN at event 91');
  });

  it('names the event where the stored document itself was changed', async () => {
    const { proof } = await proved();
    const [jws = '', ...rest] = proof.jws.split('~');
    const [header, payload = '', signature] = jws.split('.');
    const text = Buffer.from(payload, 'base64url').toString();
    const changed = text.replace('\\"value\\":\\"104\\"', '\\"value\\":\\"94\\"');
    expect(changed).not.toBe(text);
    const sealed = [`${header}.${Buffer.from(changed).toString('base64url')}.${signature}`, ...rest].join('~');
    await stored(server, `alter table proofs disable trigger all`);
    await stored(server, 'update proofs set jws = $1 where id = $2', [sealed, proof.id]);
    await stored(server, `alter table proofs enable trigger all`);
    const check = await checked(await seenByAnybody(proof));
    const [first] = check.problems;
    expect(first).toMatchObject({ code: 'chain', why: 'wrongHash' });
    expect(check.shopSigned).toBe(false);
    const seq = first && 'seq' in first ? first.seq : -1;
    expect((await judgePdf((await pdfOf(proof)).bytes)).words).toContain(`BROKEN at event ${seq}`);
  });

  it('that cannot be read at all is refused with a code, not drawn', async () => {
    const { proof } = await proved();
    await stored(server, `alter table proofs disable trigger all`);
    await stored(server, `update proofs set jws = 'x' where id = $1`, [proof.id]);
    await stored(server, `alter table proofs enable trigger all`);
    const reply = await pdfOf(proof);
    expect([reply.status, reply.body.error?.code]).toEqual([409, 'proof.documentBroken']);
  });

  it('is stamped once it was revoked', async () => {
    const { proof } = await proved();
    bodyOf(await clerk.send('POST', `/api/proofs/${proof.id}/revoke`, { reason: 'wrong engine on the job' }));
    const page = await judgePdf((await pdfOf(proof)).bytes);
    expect(flat(page.text)).toContain('REVOKED: wrong engine on the job');
  });
});
