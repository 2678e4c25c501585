import type { WalkChain } from '@shared/contracts/sync.contract';
import type { PublicJwk } from '@shared/record/crypto';
import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { branchesOf } from '../sync/chain.repository';
import { toConfirmation } from '../sync/confirmSeal';
import { chainTo } from '../sync/foldChain';
import { confirmationsOfWalk } from '../sync/seals.repository';
import { walkUnknown } from '../sync/sync.errors';
import { listTabletRows } from '../tablets/tablets.repository';
import { toStoredEvent, toWalkRow } from './walks.mapping';
import { findWalk, walksOfJoints } from './walks.repository';

/** Every public key that may have signed in a walk of this shop. */
export const keysOfShop = async (deps: Deps, tx: ShopTx): Promise<(PublicJwk & { kid: string })[]> => {
  const tablets = (await listTabletRows(tx)).map(({ publicJwk, kid }) => ({ ...publicJwk, kid }));
  return [...(await deps.keyring(tx)).signingKeys, ...tablets];
};

/** A walk whole, on the branch that stands or the one asked for. Throws 404 `walk.unknown`. */
export const walkChain = async (deps: Deps, tx: ShopTx, walk: string, asked?: number): Promise<WalkChain> => {
  const row = await findWalk(tx, walk);
  const branches = await branchesOf(tx, walk);
  const branch = asked ?? row?.branch;
  const head = branches.find((one) => one.branch === branch);
  if (!row || !head) throw walkUnknown();
  const rows = await chainTo(tx, walk, branches, { branch: head.branch, seq: head.next - 1 });
  const siblings = await walksOfJoints(tx, [row.jointId]);
  const signers = new Set(rows.map(({ sig }) => kidOf(sig)));
  return {
    walk: toWalkRow(row, siblings.get(row.jointId)),
    branch: head.branch,
    events: rows.map(toStoredEvent),
    confirmations: (await confirmationsOfWalk(tx, walk)).map(toConfirmation),
    keys: (await keysOfShop(deps, tx)).filter(({ kid }) => signers.has(kid)),
  };
};

const kidOf = (sig: string): string => {
  const header = Buffer.from(sig.split('.')[0] ?? '', 'base64url').toString('utf8');
  return /"kid":"([^"]*)"/.exec(header)?.[1] ?? '';
};
