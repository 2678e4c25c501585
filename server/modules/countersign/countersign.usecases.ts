import type { OfficeWalk } from '@shared/contracts/walks.contract';
import { hasRight } from '@shared/people/roles';
import type { EventBody, Meaning, WalkSentBack } from '@shared/walk/events';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import type { AppError } from '../../http/errors';
import { forbidden } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { findPerson } from '../people/people.repository';
import { pinError } from '../pins/pins.errors';
import { checkPin } from '../pins/pins.usecases';
import { lockWalk } from '../sync/chain.repository';
import { officeSeal, writeOfficeEvent } from '../sync/officeEvent';
import { standingWalk, type StandingWalk } from '../sync/refreshWalk';
import { headMoved, notReleased, walkUnknown } from '../sync/sync.errors';
import { officeWalk } from '../walks/officeWalks.usecases';

/** What somebody of the office writes into a walk: whose, over which head, with which PIN. */
interface Signing {
  walk: string;
  head: string;
  pin: string;
}

/** Loads a walk under its lock. Throws 404 `walk.unknown`. */
export const lockedWalk = async (deps: Deps, tx: ShopTx, walk: string): Promise<StandingWalk> => {
  await lockWalk(tx, walk);
  const standing = await standingWalk(deps, tx, walk);
  if (!standing) throw walkUnknown();
  return standing;
};

/** Compares the caller's own PIN; gives the refusal to be returned, so that a wrong one is counted. */
export const ownPinRefusal = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  pin: string,
): Promise<AppError | null> => {
  const refusal = await checkPin(deps, tx, { person: caller.person.id, pin, place: 'office' });
  return refusal ? pinError(refusal) : null;
};

/** Only a walk whose tablet has released it is the office's to write, and only over the head that was looked at (fault 25). */
const demandOffice = (standing: StandingWalk, head: string): void => {
  if (standing.row.headHash !== head) throw headMoved(standing.row.headHash);
  if (standing.state.writer !== 'shop') throw notReleased();
};

/** Checks the PIN, seals it and writes the event with the seal's hash. */
const signInto = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: Signing,
  meaning: string,
  body: (seal: string, standing: StandingWalk) => EventBody,
): Promise<OfficeWalk | AppError> => {
  const standing = await lockedWalk(deps, tx, request.walk);
  demandOffice(standing, request.head);
  const refusal = await ownPinRefusal(deps, tx, caller, request.pin);
  if (refusal) return refusal;
  const by = caller.person.id;
  const pinVersion = (await findPerson(tx, by))?.pinVersion ?? 0;
  const seal = await officeSeal(deps, tx, standing, { person: by, pin: request.pin, pinVersion, meaning });
  const event = body(seal, standing);
  await writeOfficeEvent(deps, tx, { standing, by, body: event });
  await writeAudit(deps, tx, { person: by, action: event.type, subject: request.walk });
  return officeWalk(tx, request.walk);
};

/** The countersignature that stands and whose PIN was refused or disowned: the next one renews it (decision 6). */
const refusedCountersign = ({ state, seals }: StandingWalk): number | undefined =>
  state.signatures.find(({ seq, role, stands }) => role === 'countersigner' && stands && seals.refused.includes(seq))
    ?.seq;

/** Countersigns a released walk (W12), or does so again where the PIN of the first time does not count. */
export const countersignWalk = (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: Signing & { meaning: Meaning },
): Promise<OfficeWalk | AppError> =>
  signInto(deps, tx, caller, request, request.meaning, (seal, standing) => {
    const renews = refusedCountersign(standing);
    const data = { meaning: request.meaning, seal, ...(renews === undefined ? {} : { renews }) };
    return { type: 'walk.countersigned', data };
  });

/** Sends a released walk back, hole by hole (R11). A tablet then takes it over again. */
export const sendBackWalk = (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: Signing & { items: WalkSentBack['items'] },
): Promise<OfficeWalk | AppError> =>
  signInto(deps, tx, caller, request, 'walk.sentBack', (seal) => ({
    type: 'walk.sentBack',
    data: { items: request.items, seal },
  }));

/** Voids a released walk (W13): everything is kept. */
export const voidWalk = (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: Signing & { reason: string },
): Promise<OfficeWalk | AppError> =>
  signInto(deps, tx, caller, request, 'walk.voided', (seal) => ({
    type: 'walk.voided',
    data: { reason: request.reason, seal },
  }));

/** P1: whoever took readings in a walk decides nothing in it, but in a shop of one (P2). */
export const demandOtherHands = (caller: OfficeCaller, { state }: StandingWalk): void => {
  const by = caller.person.id;
  const own = state.everHands.includes(by) || state.hands.pulls === by || state.hands.records === by;
  if (own && !state.opened?.policy.shopOfOne) {
    throw forbidden('ownReadings', 'You took readings in this walk yourself: somebody else has to decide.');
  }
};

/** Throws 403 unless the caller's roles give the right. */
export const demandRight = (caller: OfficeCaller, right: 'accept' | 'skipWait' | 'voidWalk'): void => {
  if (!hasRight(caller.person.roles, right)) {
    throw forbidden('right.missing', 'Your roles do not allow this.', { right });
  }
};
