import { z } from 'zod';
import type { Confirmation } from '@shared/contracts/confirmation.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import { signDetached } from '@shared/record/signature';
import { sha256Hex, type Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { checkPin, openSeal } from '../pins/pins.usecases';
import type { Place } from './chain.repository';
import type { BatchEvent } from './parseBatch';
import type { EventSeal } from './sealOf';
import { insertConfirmation, insertPinUse, type ConfirmationRecord } from './seals.repository';

const sealed = z.looseObject({
  pin: z.string().max(20),
  person: z.string(),
  walk: z.string(),
  seq: z.number(),
  prev: z.string(),
  meaning: z.string(),
  pinVersion: z.number().int().min(0),
});

/** Opens the PIN sealed for an event and compares it: why it does not count, or null. A wrong one is counted. */
export const judgeSeal = async (
  deps: Deps,
  tx: ShopTx,
  { envelope }: BatchEvent,
  carried: EventSeal,
  jwe: string,
): Promise<string | null> => {
  if (sha256Hex(jwe) !== carried.seal) return 'seal.otherEvent';
  const opened = await openSeal(deps, tx, jwe, sealed);
  if (!opened) return 'seal.unreadable';
  const meant =
    opened.person === carried.person &&
    opened.walk === envelope.walk &&
    opened.seq === envelope.seq &&
    opened.prev === envelope.prev &&
    opened.meaning === carried.meaning;
  if (!meant) return 'seal.otherEvent';
  const { pin, person, pinVersion: version } = opened;
  const place = envelope.tablet;
  const refusal = await checkPin(deps, tx, { pin, person, place, version, mayHaveLeft: true });
  return refusal?.code ?? null;
};

/** A stored confirmation as it travels. */
export const toConfirmation = (row: ConfirmationRecord): Confirmation => ({
  walk: row.walkId,
  branch: row.branch,
  seq: row.seq,
  hash: row.hash,
  person: row.personId,
  meaning: row.meaning,
  result: row.result,
  reason: row.reason,
  at: row.at.toISOString(),
  jws: row.jws,
});

/** Signs and stores what the shop says about a sealed PIN. */
export const writeConfirmation = async (
  deps: Deps,
  tx: ShopTx,
  said: Omit<Confirmation, 'jws' | 'at'> & { nth: number },
): Promise<Confirmation> => {
  const at = deps.clock.now();
  const { nth, ...facts } = said;
  const { signer } = await deps.keyring(tx);
  const signed = { ...facts, at: at.toISOString() };
  const jws = await signDetached(canonicalJson(signed), signer);
  const { walk: walkId, branch, seq, hash, person: personId, meaning, result, reason } = facts;
  await insertConfirmation(tx, { walkId, branch, seq, nth, hash, personId, meaning, result, reason, at, jws });
  return { ...signed, jws };
};

/** Acts besides one's own signing: each use of a PIN for them is listed to its owner (P3). */
const isListed = (type: string): boolean => type !== 'walk.signed';

/**
 * Says for good what came of the PIN sealed for an event (decision 6); the seal itself is not kept. A wrong PIN is no
 * reason to refuse the event: it stays, and whoever it was renews it.
 */
export const confirmSeal = async (
  deps: Deps,
  tx: ShopTx,
  event: BatchEvent,
  place: Place,
  carried: EventSeal,
  reason: string | null,
): Promise<void> => {
  const { envelope, signed } = event;
  const { person, meaning } = carried;
  const result = reason === null ? ('accepted' as const) : ('refused' as const);
  const said = { walk: envelope.walk, ...place, hash: signed.hash, person, meaning, result, reason };
  await writeConfirmation(deps, tx, { ...said, nth: 0 });
  if (reason !== null || !isListed(envelope.type)) return;
  await insertPinUse(tx, {
    id: deps.ids.uuid(),
    personId: person,
    walkId: envelope.walk,
    ...place,
    meaning,
    at: new Date(envelope.at),
    tablet: envelope.tablet,
  });
};
