import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ProofWhole } from '@shared/contracts/proofs.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { ProofDocument } from '@shared/proof/proofDocument';
import { withShop } from '../../server/tenancy/withShop';
import { signedIn, type Reply } from './support/calls';
import { stored, storedHashes } from './support/stored';
import { enrolledTablet, walked, type TestTablet } from './support/testTablet';
import { documentHash, makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

/*
 * Fault 22: the procedure gets a new revision, with other windows, while a tablet walks the old one without a network.
 */

let server: TestServer;
let shop: TestShop;
let tablet: TestTablet;

beforeAll(async () => {
  server = await startTestServer();
});
beforeEach(async () => {
  shop = await makeTestShop(server.deps);
  tablet = await enrolledTablet(server, shop);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const bodyOf = <T>(reply: Reply, status = 200): T => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(status);
  return reply.body as unknown as T;
};

/** The same head, every first torque 10 N·m higher: nothing walked by the old revision is inside any more. */
const stiffer = ({ passes, ...document }: ProcedureDocument): ProcedureDocument => ({
  ...document,
  passes: passes.map((pass) =>
    pass.id === 'p1'
      ? {
          ...pass,
          stages: [
            { id: 's1', kind: 'torque', windows: { A: { target: '40', low: '38.5', high: '41.5', unit: 'N.m' } } },
          ],
        }
      : pass,
  ),
});

/** Revision 5 is approved; revision 4 stays as it was and is superseded. */
const supersede = async (): Promise<ProcedureDocument> => {
  const document = stiffer(shop.procedure.document);
  await withShop(server.deps.client, shop.id, async (tx) => {
    await tx.db.execute(`update procedure_revisions set state = 'superseded' where revision = 4`);
  });
  await stored(
    server,
    `insert into procedure_revisions (shop_id, procedure_id, revision, hash, document, state, written_by, approved_by)
     values ($1, $2, 5, $3, $4, 'approved', $5, $5)`,
    [shop.id, shop.procedure.id, documentHash(document), document, shop.people.supervisor.id],
  );
  return document;
};

const revisionOf = async (walk: string) => {
  const rows = await stored(server, 'select revision, procedure_hash as hash from walks where id = $1', [walk]);
  return rows[0];
};

describe('a revision that came while a walk was under way (fault 22)', () => {
  it('changes nothing for the walk: its events are judged by the revision they began with, and the proof names it', async () => {
    const walk = await walked(tablet);
    await supersede();
    const receipt = bodyOf<Receipt>(await walk.send());
    expect(receipt).toMatchObject({ next: walk.log.signed.length, quarantined: [] });
    const { hash } = shop.procedure;
    expect(await revisionOf(walk.id)).toEqual({ revision: 4, hash });
    const verdicts = await stored(
      server,
      `select distinct body->'data'->>'verdict' as verdict from walk_events where walk_id = $1 and type = 'reading.taken'`,
      [walk.id],
    );
    expect(verdicts).toEqual([{ verdict: 'in' }]);

    const clerk = await signedIn(server, shop.people.clerk);
    const proof = bodyOf<ProofWhole>(await clerk.send('POST', `/api/walks/${walk.id}/proof`, {}), 201);
    const payload = Buffer.from(proof.jws.split('~')[0]?.split('.')[1] ?? '', 'base64url').toString('utf8');
    const { procedure } = JSON.parse(payload) as ProofDocument;
    expect(procedure).toMatchObject({ revision: 4, hash });
    expect(documentHash(procedure.document)).toBe(hash);
  });

  it('is told on the record where a walk began with the old one after all', async () => {
    await supersede();
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 10 });
    expect(bodyOf<Receipt>(await walk.send())).toMatchObject({ next: 10, quarantined: [] });
    const [opened] = await stored<{ flags: string[] }>(
      server,
      `select flags from walk_events where walk_id = $1 and type = 'walk.opened'`,
      [walk.id],
    );
    expect(opened?.flags).toContain('procedureNotCurrent');
  });

  it('comes to the tablet beside the old one, which stays for walks that began with it', async () => {
    const document = await supersede();
    const reply = await tablet.get(`/api/tablet/catalogue?since=${tablet.known}`);
    const { procedures } = bodyOf<{ procedures: { revision: number; hash: string; state: string }[] }>(reply);
    expect(procedures.map(({ revision, hash, state }) => [revision, hash, state])).toEqual([
      [4, shop.procedure.hash, 'superseded'],
      [5, documentHash(document), 'approved'],
    ]);
  });

  it('cannot be claimed by its number with the content of another', async () => {
    await supersede();
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 5 }, { revision: 5 });
    const receipt = bodyOf<Receipt>(await walk.send());
    expect(receipt.quarantined[0]?.code).toBe('event.procedureUnknown');
    expect(await storedHashes(server, walk.id)).toEqual([]);
  });
});
