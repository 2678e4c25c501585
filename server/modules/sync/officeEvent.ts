import { CompactEncrypt, importJWK } from 'jose';
import { canonicalJson } from '@shared/record/canonicalJson';
import { sealEvent } from '@shared/record/chain';
import { OFFICE, type Envelope } from '@shared/record/envelope';
import type { EventBody } from '@shared/walk/events';
import { sha256Hex, type Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { catalogueCursor } from '../shops/shops.repository';
import { appendEvents } from './appendEvents';
import type { Target } from './branches';
import type { Place } from './chain.repository';
import { writeConfirmation } from './confirmSeal';
import { parseBatch, type BatchEvent } from './parseBatch';
import { refreshWalk, type StandingWalk } from './refreshWalk';
import { sealOf } from './sealOf';
import { insertPinUse } from './seals.repository';
import { ruleRefused } from './sync.errors';

/** Something the shop writes into a walk for a person of the office. */
export interface OfficeAct {
  standing: StandingWalk;
  by: string;
  body: EventBody;
  /** Where it goes if not on at the head: a forced takeover begins a branch. */
  target?: Target;
}

const headOf = ({ row }: StandingWalk): Place & { hash: string } => ({
  branch: row.branch,
  seq: row.nextSeq - 1,
  hash: row.headHash,
});

/** Where the next event of the office stands: what a seal made for it has to name. */
export const nextPlace = ({ row }: StandingWalk): { seq: number; prev: string } => ({
  seq: row.nextSeq,
  prev: row.headHash,
});

/**
 * Seals a PIN that was checked already, so that the office's events carry the same proof as a tablet's: the hash of the
 * seal stands in the event, the seal itself goes nowhere.
 */
export const officeSeal = async (
  deps: Deps,
  tx: ShopTx,
  standing: StandingWalk,
  by: { person: string; pin: string; pinVersion: number; meaning: string },
): Promise<string> => {
  const { sealingKey } = await deps.keyring(tx);
  const { kid, ...jwk } = sealingKey;
  const payload = canonicalJson({ ...by, walk: standing.row.id, ...nextPlace(standing) });
  const jwe = await new CompactEncrypt(new TextEncoder().encode(payload))
    .setProtectedHeader({ alg: 'ECDH-ES', enc: 'A256GCM', kid })
    .encrypt(await importJWK(jwk, 'ECDH-ES'));
  return sha256Hex(jwe);
};

const envelopeOf = async (deps: Deps, tx: ShopTx, act: OfficeAct): Promise<Envelope> => {
  const { row } = act.standing;
  const { type, data } = act.body;
  return {
    v: 1,
    shop: tx.shop,
    walk: row.id,
    branch: act.target?.kind === 'open' ? act.target.branch.branch : row.branch,
    ...nextPlace(act.standing),
    at: deps.clock.now().toISOString(),
    mono: deps.clock.mono(),
    boot: deps.clock.boot,
    known: await catalogueCursor(tx),
    by: act.by,
    tablet: OFFICE,
    type,
    data,
  };
};

const confirmChecked = async (deps: Deps, tx: ShopTx, event: BatchEvent, branch: number): Promise<void> => {
  const carried = sealOf(event.event);
  if (!carried) return;
  const { walk, seq, at } = event.envelope;
  const { person, meaning } = carried;
  const said = { walk, branch, seq, hash: event.signed.hash, person, meaning, reason: null };
  await writeConfirmation(deps, tx, { ...said, result: 'accepted', nth: 0 });
  const use = { id: deps.ids.uuid(), personId: person, walkId: walk, branch, seq, meaning };
  await insertPinUse(tx, { ...use, at: new Date(at), tablet: OFFICE });
};

/**
 * Writes an event of the office at the head of the branch that stands, signed by the shop (decision 4), and says that its
 * PIN was accepted. Throws 409 with the rule's own code when the rules refuse it: an office that is asked can ask again,
 * so nothing goes into quarantine. The caller holds the walk's lock.
 */
export const writeOfficeEvent = async (deps: Deps, tx: ShopTx, act: OfficeAct): Promise<StandingWalk> => {
  const { signer } = await deps.keyring(tx);
  const signed = await sealEvent(await envelopeOf(deps, tx, act), signer, deps.crypto);
  const walk = act.standing.row.id;
  const [event] = parseBatch([signed], { shop: tx.shop, walk });
  if (!event) throw new Error('the office wrote no event');
  const { branches } = act.standing;
  const fresh = { walk, tablet: OFFICE, events: [event], branches, parent: headOf(act.standing) };
  const appended = await appendEvents(deps, tx, act.target ? { ...fresh, target: act.target } : fresh);
  const [refused] = appended.refused;
  if (refused) throw ruleRefused({ code: refused.code, params: refused.details });
  await confirmChecked(deps, tx, event, appended.branch);
  const refreshed = await refreshWalk(deps, tx, walk, deps.clock.now());
  if (!refreshed) throw new Error('a walk vanished while the office wrote in it');
  return refreshed;
};
