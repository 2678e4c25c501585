import type { ChainProblemCode } from '../../record/chain';
import type { SignatureProblem } from '../../record/signature';
import type { RefusalCode } from '../../walk/refusal';
import type { DocumentProblem } from './readDocument';

/**
 * Something that does not hold. `seq` is the number of the event it is about: the first figure anybody asks for.
 * `shopSignature` is the shop's signature over the whole; the others are about the record inside.
 */
export type ProofProblem =
  | { code: 'notAProof' }
  | { code: 'document'; why: DocumentProblem['code']; field?: string }
  | { code: 'shopSignature'; why: SignatureProblem['code'] }
  | { code: 'sideForeign'; count: number }
  | { code: 'tabletKey'; tablet: string }
  | { code: 'chain'; seq: number; why: ChainProblemCode; field?: string }
  | { code: 'unknownEvent'; seq: number; type: string }
  | { code: 'otherShop'; seq: number }
  | { code: 'otherTablet'; seq: number }
  | { code: 'storedOtherwise'; seq: number }
  | { code: 'procedureHash' }
  | { code: 'revision' }
  | { code: 'refused'; seq: number; why: RefusalCode }
  | { code: 'decidedOtherwise'; seq: number; field: string }
  | { code: 'judgedOtherwise'; seq: number; field: string }
  | { code: 'unreadable'; seq: number }
  | { code: 'confirmationMissing' | 'confirmationRefused' | 'confirmationForged'; seq: number }
  | { code: 'notFinished' }
  | { code: 'sheet'; part: string };

/** The number of the event a problem is about, or null where it is about the whole. */
export const problemSeq = (problem: ProofProblem): number | null => ('seq' in problem ? problem.seq : null);

/** Told after the shop's signature: with a wrong key of the shop they would all seem forged. */
const SECOND: ReadonlySet<ProofProblem['code']> = new Set([
  'confirmationMissing',
  'confirmationRefused',
  'confirmationForged',
]);

function rankOf(problem: ProofProblem): number {
  if (problem.code === 'chain') return problem.why === 'unknownKey' ? 2 : 0;
  if (SECOND.has(problem.code)) return 3;
  if (problem.code === 'shopSignature' || problem.code === 'document' || problem.code === 'notAProof') return 1;
  return problemSeq(problem) === null ? 4 : 0;
}

/** The problem that is told first: an event that does not hold by itself, then the shop's signature, then the rest. */
export function worstProblem(problems: readonly ProofProblem[]): ProofProblem | null {
  return [...problems].sort((a, b) => rankOf(a) - rankOf(b))[0] ?? null;
}
