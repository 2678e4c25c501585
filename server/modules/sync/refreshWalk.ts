import type { WalkState } from '@shared/walk/state';
import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { missingBlobsOf } from '../blobs/blobs.repository';
import {
  findWalk,
  inheritanceOf,
  latestChoice,
  quarantineOfWalk,
  saveEarlier,
  updateWalk,
  type WalkRecord,
} from '../walks/walks.repository';
import { appendLedger } from './appendLedger';
import { isForked, pathTo } from './branches';
import { branchesOf, sealableEvents, type Branch } from './chain.repository';
import { eventOfRow, stateAt } from './foldChain';
import { confirmationsOfWalk } from './seals.repository';
import { sealStatus, type SealStatus } from './sealStatus';
import { isFinished, walkSummary } from './walkSummary';

/** A walk as it stands: its line, branches, state and seals. */
export interface StandingWalk {
  row: WalkRecord;
  branches: Branch[];
  state: WalkState;
  seals: SealStatus;
}

/** How the sealed PINs of the branch that stands are answered. */
const sealsOf = async (tx: ShopTx, row: WalkRecord, branches: Branch[], state: WalkState): Promise<SealStatus> => {
  const path = pathTo(branches, { branch: row.branch, seq: state.seq });
  const onPath = (branch: number, seq: number) => path.some((one) => one.branch === branch && seq <= one.upTo);
  const rows = (await sealableEvents(tx, row.id)).filter(({ branch, seq }) => onPath(branch, seq));
  const events = rows.map((stored) => ({ event: eventOfRow(stored), hash: stored.hash }));
  return sealStatus(state, events, await confirmationsOfWalk(tx, row.id));
};

/** Loads a walk as it stands, or null. */
export const standingWalk = async (deps: Deps, tx: ShopTx, walk: string): Promise<StandingWalk | null> => {
  const row = await findWalk(tx, walk);
  if (!row) return null;
  const branches = await branchesOf(tx, walk);
  const head = branches.find(({ branch }) => branch === row.branch);
  if (!head) return null;
  const place = { branch: row.branch, seq: head.next - 1, hash: head.head };
  const state = await stateAt(deps, tx, walk, branches, place);
  return { row, branches, state, seals: await sealsOf(tx, row, branches, state) };
};

/** What the next walk on a joint inherits (W1): everything since it was last stripped down. */
const refreshEarlier = async (tx: ShopTx, joint: string): Promise<void> => {
  let readingsTaken = false;
  let usedHoles: string[] = [];
  for (const walk of await inheritanceOf(tx, joint)) {
    const stripped = walk.purpose === 'stripDown' && walk.state === 'finished';
    readingsTaken = stripped ? false : readingsTaken || (walk.purpose !== 'stripDown' && walk.readingsTaken);
    usedHoles = stripped ? [] : [...new Set([...usedHoles, ...walk.usedHoles])];
  }
  await saveEarlier(tx, joint, { readingsTaken, usedHoles });
};

/**
 * Makes a walk's line again from its chain, its branches and what waits beside it, and writes the ledger when it is now
 * finished with every PIN accepted. Called last in a transaction: from here on the shop's catalogue counter is locked.
 */
export const refreshWalk = async (
  deps: Deps,
  tx: ShopTx,
  walk: string,
  changedAt: Date,
): Promise<StandingWalk | null> => {
  const standing = await standingWalk(deps, tx, walk);
  if (!standing) return null;
  const { row, branches, state, seals } = standing;
  const head = branches.find(({ branch }) => branch === row.branch);
  const choice = await latestChoice(tx, walk);
  const waiting = (await quarantineOfWalk(tx, walk)).filter(({ settling }) => settling === null);
  const change = {
    ...walkSummary(state),
    nextSeq: head?.next ?? row.nextSeq,
    headHash: head?.head ?? row.headHash,
    forked: isForked(branches, row.branch, choice?.heads ?? {}),
    quarantined: waiting.length,
    refusedSeals: seals.refused.length,
    missingBlobs: (await missingBlobsOf(tx, walk)).length,
    changedAt,
  };
  await updateWalk(tx, walk, change);
  await refreshEarlier(tx, row.jointId);
  const settled = seals.pending.length === 0 && seals.refused.length === 0;
  if (isFinished(state) && settled) {
    await appendLedger(deps, tx, { id: walk, branch: row.branch, headHash: change.headHash });
  }
  return { ...standing, row: { ...row, ...change } };
};
