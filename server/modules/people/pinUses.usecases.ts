import type { PinUse } from '@shared/contracts/people.contract';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import { conflict, notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { lockWalk } from '../sync/chain.repository';
import { writeConfirmation } from '../sync/confirmSeal';
import { refreshWalk } from '../sync/refreshWalk';
import { confirmationsOfWalk } from '../sync/seals.repository';
import { answerPinUse, findPinUse, pinUsesOf } from './pinUses.repository';

const DAYS = 30;

type Found = NonNullable<Awaited<ReturnType<typeof findPinUse>>>;

const toPinUse = ({ use, jobNumber, tabletName }: Found): PinUse => ({
  id: use.id,
  walk: use.walkId,
  branch: use.branch,
  seq: use.seq,
  meaning: use.meaning,
  at: use.at.toISOString(),
  tablet: use.tablet,
  tabletName: tabletName ?? '',
  jobNumber,
  answer: use.answer,
  answeredAt: use.answeredAt?.toISOString() ?? null,
});

/** One's own PIN uses of the last days (P3). */
export const listPinUses = async (deps: Deps, tx: ShopTx, caller: OfficeCaller): Promise<PinUse[]> => {
  const since = new Date(deps.clock.now().getTime() - DAYS * 24 * 3_600_000);
  return (await pinUsesOf(tx, caller.person.id, since)).map(toPinUse);
};

/** A seal that is disowned counts as refused from then on, and blocks issue until it is renewed (P3, decision 6). */
const refuseSeal = async (deps: Deps, tx: ShopTx, { use }: Found): Promise<void> => {
  await lockWalk(tx, use.walkId);
  const said = (await confirmationsOfWalk(tx, use.walkId)).filter(
    ({ branch, seq }) => branch === use.branch && seq === use.seq,
  );
  const last = said.at(-1);
  // A takeover by force has no seal in the chain: the disowning itself stands in the audit trail.
  if (!last) return;
  const { walkId: walk, branch, seq, hash, personId: person, meaning } = last;
  const facts = { walk, branch, seq, hash, person, meaning, result: 'refused' as const, reason: 'pin.disowned' };
  await writeConfirmation(deps, tx, { ...facts, nth: last.nth + 1 });
  await refreshWalk(deps, tx, walk, deps.clock.now());
};

/** *Mine* or *not mine*, once. */
export const answerOwnPinUse = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  answer: 'mine' | 'notMine',
): Promise<PinUse> => {
  const found = await findPinUse(tx, caller.person.id, id);
  if (!found) throw notFound('pinUse.unknown', 'There is no such use of your PIN.');
  if (found.use.answer) throw conflict('pinUse.answered', 'You answered this before.');
  const at = deps.clock.now();
  await answerPinUse(tx, id, answer, at);
  await writeAudit(deps, tx, { person: caller.person.id, action: `pin.${answer}`, subject: id });
  if (answer === 'notMine') await refuseSeal(deps, tx, found);
  return toPinUse({ ...found, use: { ...found.use, answer, answeredAt: at } });
};
