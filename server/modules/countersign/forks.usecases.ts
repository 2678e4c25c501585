import type { OfficeWalk } from '@shared/contracts/walks.contract';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import type { AppError } from '../../http/errors';
import { conflict, notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { headsOf } from '../sync/branches';
import { refreshWalk } from '../sync/refreshWalk';
import { officeWalk } from '../walks/officeWalks.usecases';
import { insertChoice, insertSettling, latestChoice, quarantineOfWalk, updateWalk } from '../walks/walks.repository';
import { demandOtherHands, lockedWalk, ownPinRefusal } from './countersign.usecases';

/** Says which branch of a walk stands; what the others hold stays stored (decision 5). */
export const chooseBranch = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: { walk: string; pin: string; branch: number; reason: string },
): Promise<OfficeWalk | AppError> => {
  const standing = await lockedWalk(deps, tx, request.walk);
  demandOtherHands(caller, standing);
  const known = standing.branches.some(({ branch }) => branch === request.branch);
  if (!known || standing.branches.length < 2) throw conflict('walk.notForked', 'This walk has no such branch.');
  const refusal = await ownPinRefusal(deps, tx, caller, request.pin);
  if (refusal) return refusal;
  const at = deps.clock.now();
  const nth = ((await latestChoice(tx, request.walk))?.nth ?? -1) + 1;
  const { walk: walkId, branch, reason } = request;
  await insertChoice(tx, {
    walkId,
    nth,
    branch,
    heads: headsOf(standing.branches),
    byPerson: caller.person.id,
    reason,
    at,
  });
  await updateWalk(tx, walkId, { branch });
  await writeAudit(deps, tx, {
    person: caller.person.id,
    action: 'walk.branchChosen',
    subject: walkId,
    details: { branch, reason },
  });
  await refreshWalk(deps, tx, walkId, at);
  return officeWalk(tx, walkId);
};

/** Marks a refused event as looked at; it stays stored, and everything that follows it is settled with it. */
export const settleQuarantine = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: { walk: string; hash: string; reason: string },
): Promise<OfficeWalk> => {
  await lockedWalk(deps, tx, request.walk);
  const waiting = (await quarantineOfWalk(tx, request.walk)).map(({ event }) => event);
  const first = waiting.find(({ hash }) => hash === request.hash);
  if (!first) throw notFound('quarantine.unknown', 'There is no such refused event.');
  const at = deps.clock.now();
  let settled = [first];
  for (let next = settled; next.length > 0; settled = [...settled, ...next]) {
    const before = new Set(next.map(({ hash }) => hash));
    next = waiting.filter(({ prev }) => before.has(prev));
  }
  for (const { hash } of settled) {
    await insertSettling(tx, { hash, byPerson: caller.person.id, reason: request.reason, at });
  }
  await writeAudit(deps, tx, {
    person: caller.person.id,
    action: 'walk.quarantineSettled',
    subject: request.walk,
    details: { hash: request.hash, reason: request.reason },
  });
  await refreshWalk(deps, tx, request.walk, at);
  return officeWalk(tx, request.walk);
};
