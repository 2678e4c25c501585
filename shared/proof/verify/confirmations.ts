import { canonicalJson } from '../../record/canonicalJson';
import type { PublicJwk, RecordCrypto } from '../../record/crypto';
import { verifyDetached } from '../../record/signature';
import type { WalkEvent } from '../../walk/events';
import type { WalkState } from '../../walk/state';
import type { ProofConfirmation, ProofRecord } from '../proofDocument';
import type { ProofProblem } from './problem';

/** What an event that carries a sealed PIN says about it (decision 6). */
function sealOf(event: WalkEvent): { renews: number | undefined } | null {
  const data = event.type === 'wrench.taken' ? event.data.override : event.data;
  if (!data || !('seal' in data) || data.seal === undefined || data.seal === '') return null;
  return { renews: 'renews' in data ? data.renews : undefined };
}

async function isGenuine(
  confirmation: ProofConfirmation,
  shop: Map<string, PublicJwk>,
  crypto: RecordCrypto,
): Promise<boolean> {
  const { jws, ...said } = confirmation;
  return (await verifyDetached(canonicalJson(said), jws, shop, crypto)).ok;
}

/** The last word counts: a later *not mine* takes back what was accepted (P3). */
async function problemOf(
  event: WalkEvent,
  record: ProofRecord,
  shop: Map<string, PublicJwk>,
  crypto: RecordCrypto,
): Promise<ProofProblem | null> {
  const { seq } = event;
  const hash = record.events[seq]?.hash;
  const said = record.confirmations.filter((one) => one.hash === hash);
  const last = said.at(-1);
  if (!last) return { code: 'confirmationMissing', seq };
  for (const one of said) {
    const about = one.seq === seq && one.person === event.by;
    if (!about || !(await isGenuine(one, shop, crypto))) return { code: 'confirmationForged', seq };
  }
  return last.result === 'accepted' ? null : { code: 'confirmationRefused', seq };
}

/** A signature that no longer stands (sent back, made anew) needs no PIN any more. */
const stillCounts = (state: WalkState, { type, seq }: WalkEvent): boolean =>
  (type !== 'walk.signed' && type !== 'walk.countersigned') ||
  state.signatures.some((sign) => sign.seq === seq && sign.stands);

/** Whether the shop confirmed the PIN behind every signature and decision; one made anew stands for the one before. */
export async function confirmationProblems(
  state: WalkState,
  events: readonly WalkEvent[],
  record: ProofRecord,
  { shop, crypto }: { shop: Map<string, PublicJwk>; crypto: RecordCrypto },
): Promise<ProofProblem[]> {
  const sealed = events.flatMap((event) => {
    const seal = sealOf(event);
    return seal ? [{ event, renews: seal.renews }] : [];
  });
  const renewed = new Set(sealed.map(({ renews }) => renews));
  const problems: ProofProblem[] = [];
  for (const { event } of sealed) {
    const counts = !renewed.has(event.seq) && stillCounts(state, event);
    const problem = counts ? await problemOf(event, record, shop, crypto) : null;
    if (problem) problems.push(problem);
  }
  return problems;
}
