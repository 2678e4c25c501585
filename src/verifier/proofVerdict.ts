import type { PublicProof } from '@shared/contracts/proofs.contract';
import type { ProofCheck } from '@shared/proof/verifyProof';
import { problemSeq, worstProblem, type ProofProblem } from '@shared/proof/verify/problem';
import type { PageKey } from './tell';

/** Where the proof on the page came from, and what is known of it besides its text. */
export type ProofOrigin =
  { kind: 'link'; answer: PublicProof; askedAt: string } | { kind: 'file'; name: string; keysAsked: boolean };

/** Something found by the page itself: the document names another link than the one it was fetched by. */
export type PageProblem = ProofProblem | { code: 'otherLink' };

/** The one sentence on top: its sign, its words, and the event it names. */
export interface ProofVerdict {
  tone: 'holds' | 'doubt' | 'off';
  key: PageKey;
  problem: PageProblem | null;
  seq: number | null;
}

const holds = (key: PageKey): ProofVerdict => ({ tone: 'holds', key, problem: null, seq: null });

/** Everything that does not hold; a document fetched by one link that names another was put in its place. */
export function problemsOf(check: ProofCheck, origin: ProofOrigin, token: string | null): PageProblem[] {
  const { document, problems } = check;
  if (origin.kind !== 'link' || token === null || !document) return problems;
  return document.publicUrl.endsWith(`/p/${token}`) ? problems : [...problems, { code: 'otherLink' }];
}

/** What holds today, in one sentence (D3): a broken record is told before anything the shop says about it. */
export function verdictOf(problems: readonly PageProblem[], origin: ProofOrigin): ProofVerdict {
  const own = problems.filter((one) => one.code !== 'otherLink');
  const problem = worstProblem(own) ?? problems[0] ?? null;
  if (problem) {
    const seq = problem.code === 'otherLink' ? null : problemSeq(problem);
    return { tone: 'off', key: seq === null ? 'today.broken' : 'today.brokenAt', problem, seq };
  }
  if (origin.kind === 'file')
    return origin.keysAsked ? holds('today.file') : { ...holds('today.fileUnknownShop'), tone: 'doubt' };
  const { state } = origin.answer;
  const tone = state === 'issued' ? 'holds' : state === 'revoked' ? 'off' : 'doubt';
  return { ...holds(`today.${state}`), tone };
}

/** How the readings stand, in one sentence each: measured, clicked, looked at. Nothing where the record breaks off. */
export function judgedSentences(check: ProofCheck): [PageKey, Record<string, number>][] {
  const { counts, readingsJudgedAgain: judged, readingsInAll } = check;
  if (!counts) return readingsInAll > 0 ? [['judged.some', { judged, n: readingsInAll }]] : [];
  const { measured, clicked, marks } = counts;
  const sentences: [PageKey, Record<string, number>][] = [];
  if (measured.count > 0) {
    const params = { n: measured.count, inside: measured.inside, judged };
    sentences.push([judged === measured.count ? 'judged.all' : 'judged.more', params]);
  }
  if (counts.accepted > 0) sentences.push(['judged.accepted', { n: counts.accepted }]);
  if (clicked.count > 0) sentences.push(['judged.clicked', { n: clicked.count, inside: clicked.inside }]);
  if (marks.count > 0) sentences.push(['judged.marks', { n: marks.count, inside: marks.inside }]);
  return sentences;
}

const CHAIN_WORDS = new Set(['wrongHash', 'wrongSignature', 'unknownKey', 'wrongPrev', 'wrongSeq']);

/** A problem in words: the key, and what to fill in. */
export function problemWords(problem: PageProblem): [PageKey, Record<string, string | number>] {
  switch (problem.code) {
    case 'chain':
      return CHAIN_WORDS.has(problem.why)
        ? [`problem.chain.${problem.why as 'wrongHash'}`, {}]
        : ['problem.chain.other', { why: [problem.why, problem.field].filter(Boolean).join(' ') }];
    case 'document':
      return ['problem.document', { why: [problem.why, problem.field].filter(Boolean).join(' ') }];
    case 'shopSignature':
    case 'refused':
      return [`problem.${problem.code}`, { why: problem.why }];
    case 'sideForeign':
      return ['problem.sideForeign', { n: problem.count }];
    case 'tabletKey':
      return ['problem.tabletKey', { tablet: problem.tablet }];
    case 'unknownEvent':
      return ['problem.unknownEvent', { type: problem.type }];
    case 'decidedOtherwise':
    case 'judgedOtherwise':
      return [`problem.${problem.code}`, { field: problem.field }];
    case 'sheet':
      return ['problem.sheet', { part: problem.part }];
    default:
      return [`problem.${problem.code}`, {}];
  }
}
