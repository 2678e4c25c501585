import { canonicalJson } from '../record/canonicalJson';
import { hashText } from '../record/chain';
import type { PublicJwk, RecordCrypto } from '../record/crypto';
import { verifyDetached } from '../record/signature';
import type { WalkEvent } from '../walk/events';
import { initialWalk, type WalkState } from '../walk/state';
import { eventOfEnvelope } from '../walk/upcasts';
import type { ProofDocument } from './proofDocument';
import { openProof, type OpenedProof } from './sealProof';
import { SHEET_VERSION, type ProofCounts, type ProofSheet } from './sheet';
import { sheetOf } from './sheetOf';
import { revealSide, type SideSheet } from './sideSheet';
import { chainOfProof } from './verify/chainOfProof';
import { confirmationProblems } from './verify/confirmations';
import { decideAgain } from './verify/decisions';
import { keysByThumbprint, proofKeys } from './verify/keys';
import type { ProofProblem } from './verify/problem';
import { readDocument } from './verify/readDocument';

/** What the verifier works with. `shopKeys` are those the shop publishes, past ones too. */
export interface VerifyTools {
  crypto: RecordCrypto;
  shopKeys: readonly PublicJwk[];
  /** Hashes of the events as the shop stores them today, where somebody asked: a difference is named. */
  storedHashes?: readonly string[] | null;
  /** Told as the work goes on, `done` of `total` from 0 to 1; what it gives back is waited for. */
  progress?: (step: 'chain' | 'rules', share: number) => void | Promise<void>;
}

/** What the check found. With no problem, everything the document says follows from what was signed. */
export interface ProofCheck {
  document: ProofDocument | null;
  side: SideSheet;
  /** The shop's signature over the whole document holds. */
  shopSigned: boolean;
  /** Events whose hash, link and signature hold, and of how many. */
  eventsChecked: number;
  eventsInAll: number;
  /** Readings judged again with the same outcome, and how many there are. */
  readingsJudgedAgain: number;
  readingsInAll: number;
  /** Counted anew from the events; null where they cannot be read to the end. */
  counts: ProofCounts | null;
  /** The sheet was made by another version of the program, and was not made again. */
  sheetOfOtherVersion: boolean;
  problems: ProofProblem[];
}

const nothing: ProofCheck = {
  document: null,
  side: { names: {} },
  shopSigned: false,
  eventsChecked: 0,
  eventsInAll: 0,
  readingsJudgedAgain: 0,
  readingsInAll: 0,
  counts: null,
  sheetOfOtherVersion: false,
  problems: [],
};

const countReadings = (document: ProofDocument): number =>
  document.record.events.filter(({ text }) => text.includes('"type":"reading.taken"')).length;

/** Every part of the sheet that the events do not give, by name. */
function sheetProblems(stated: ProofSheet, made: ProofSheet): ProofProblem[] {
  const parts = [...new Set([...Object.keys(stated), ...Object.keys(made)])] as (keyof ProofSheet)[];
  return parts
    .filter((part) => canonicalJson(stated[part] ?? null) !== canonicalJson(made[part] ?? null))
    .map((part) => ({ code: 'sheet', part }));
}

function madeSheet(document: ProofDocument, state: WalkState, events: readonly WalkEvent[]): ProofSheet | null {
  try {
    return sheetOf({ state, events, record: document.record });
  } catch {
    // The rules threw before: the document was made up. The caller names it.
    return null;
  }
}

function storedProblems(document: ProofDocument, stored: readonly string[] | null | undefined): ProofProblem[] {
  if (!stored) return [];
  const seq = document.record.events.findIndex(({ hash }, index) => stored[index] !== hash);
  return seq < 0 ? [] : [{ code: 'storedOtherwise', seq }];
}

async function procedureProblems(document: ProofDocument, crypto: RecordCrypto, events: readonly WalkEvent[]) {
  const hash = await hashText(canonicalJson(document.procedure.document), crypto);
  const [opened] = events;
  const problems: ProofProblem[] = hash === document.procedure.hash ? [] : [{ code: 'procedureHash' }];
  if (opened?.type === 'walk.opened' && opened.data.procedure.revision !== document.procedure.revision)
    problems.push({ code: 'revision' });
  return { hash, problems };
}

type Found = Pick<ProofCheck, 'eventsChecked' | 'readingsJudgedAgain' | 'counts' | 'sheetOfOtherVersion' | 'problems'>;

async function checkRecord(
  document: ProofDocument,
  shop: Map<string, PublicJwk>,
  { crypto, progress, storedHashes }: VerifyTools,
): Promise<Found> {
  const { record } = document;
  const { keys, problems: keyProblems } = await proofKeys(record, shop, crypto);
  const chain = await chainOfProof(record.events, keys, crypto, (done, total) => progress?.('chain', done / total));
  const problems = [...keyProblems, ...chain.problems, ...storedProblems(document, storedHashes)];
  const foreign = chain.envelopes.find((envelope) => envelope.shop !== document.shop.id);
  if (foreign) problems.push({ code: 'otherShop', seq: foreign.seq });
  const events: WalkEvent[] = [];
  for (const envelope of chain.envelopes) {
    const event = eventOfEnvelope(envelope);
    if (!event) {
      problems.push({ code: 'unknownEvent', seq: envelope.seq, type: envelope.type });
      break;
    }
    events.push(event);
  }
  const procedure = await procedureProblems(document, crypto, events);
  const initial = initialWalk(document.procedure.document, procedure.hash);
  const again = await decideAgain(initial, events, record.roles, (done, total) => progress?.('rules', done / total));
  problems.push(...procedure.problems, ...again.problems);
  problems.push(...(await confirmationProblems(again.state, events, record, { shop, crypto })));
  const whole = events.length === record.events.length && again.checked === events.length;
  const sheet = whole ? madeSheet(document, again.state, events) : null;
  if (whole && !sheet) problems.push({ code: 'notFinished' });
  const sheetOfOtherVersion = document.sheet.version !== SHEET_VERSION;
  if (sheet && !sheetOfOtherVersion) problems.push(...sheetProblems(document.sheet, sheet));
  const { length: eventsChecked } = chain.envelopes;
  return {
    eventsChecked,
    readingsJudgedAgain: again.readings,
    counts: sheet?.counts ?? null,
    sheetOfOtherVersion,
    problems,
  };
}

async function signatureProblems(opened: OpenedProof, shop: Map<string, PublicJwk>, crypto: RecordCrypto) {
  const signed = await verifyDetached(opened.text, opened.sig, shop, crypto);
  const problems: ProofProblem[] = signed.ok ? [] : [{ code: 'shopSignature', why: signed.error.code }];
  return problems;
}

/**
 * Checks a sealed proof from the outside in: the shop's signature over the document, the side sheet's digests, the
 * chain of events and the signatures on each, every event decided and every reading judged again, the shop's word on
 * each sealed PIN, and that the printed sheet is what the events give. Names exactly what does not hold. Never throws
 * on bad input: a document of somebody else's making only gives problems.
 */
export async function verifyProof(sealed: string, tools: VerifyTools): Promise<ProofCheck> {
  const opened = openProof(sealed);
  if (!opened) return { ...nothing, problems: [{ code: 'notAProof' }] };
  const shop = await keysByThumbprint(tools.shopKeys, tools.crypto);
  const signature = await signatureProblems(opened, shop, tools.crypto);
  const read = readDocument(opened.text);
  if (!read.ok) {
    const { code: why, ...more } = read.error;
    return { ...nothing, problems: [...signature, { code: 'document', why, ...more }] };
  }
  const document = read.value;
  const { side, foreign } = await revealSide(opened.disclosures, document.side, tools.crypto);
  const sideProblems: ProofProblem[] = foreign > 0 ? [{ code: 'sideForeign', count: foreign }] : [];
  const found = await checkRecord(document, shop, tools);
  return {
    ...found,
    document,
    side,
    shopSigned: signature.length === 0,
    eventsInAll: document.record.events.length,
    readingsInAll: countReadings(document),
    problems: [...found.problems, ...sideProblems, ...signature],
  };
}
