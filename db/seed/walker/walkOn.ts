import type { HoleId } from '@shared/procedure/procedure';
import type { Unit } from '@shared/quantity/unit';
import type { Choice, ReadingEntry, Source } from '@shared/walk/events';
import type { Deviation } from '@shared/walk/deviation';
import { instructionOf, type Instruction, type PullInstruction } from '@shared/walk/instruction';
import type { Offers } from '@shared/walk/offers';
import { isoToMs } from '@shared/kernel/time';
import { seededRandom, type Random } from './random';
import { readingFor } from './reading';
import { nextDraft, readingDraft, type Manner } from './technician';
import type { Draft, WalkBook } from './walkBook';

/** A place of the walk by pass and hole; without a stage the first one of the pass there. */
export interface Where {
  pass: string;
  hole: HoleId;
  stage?: string;
}

/** Something that goes wrong once, the first time its place comes up. */
export type Slip = { at: Where } & (
  | { kind: 'value'; value: string; unit?: Unit }
  | { kind: 'typedWrong'; value: string; reason: string }
  | { kind: 'differentHole'; hole: HoleId }
);

/** How far to walk and what happens on the way. */
export interface WalkPlan {
  /** Stops before this instruction is followed; absent = to the very end. */
  until?: (instruction: Instruction, book: WalkBook) => boolean;
  slips?: readonly Slip[];
  /** Chooses about a deviation; undefined = the mildest that is offered. */
  settle?: (deviation: Deviation, offers: Offers) => Choice | undefined;
  /** How figures of measuring wrenches reach the tablet; absent = torques typed, turns keyed by the wrench. */
  source?: Source | ((pull: PullInstruction) => Source);
  random?: Random;
  /** More instructions than this are a circle: an ideal technician comes to an end. */
  most?: number;
}

/** True at the pull of this place. */
export const isAt =
  (where: Where) =>
  (instruction: Instruction): boolean =>
    instruction.kind === 'pull' &&
    instruction.slot.pass === where.pass &&
    instruction.slot.hole === where.hole &&
    (where.stage === undefined || instruction.slot.stage === where.stage);

/** True at an instruction of one kind: `sign` for the review, `release` once all have signed. */
export const atKind =
  (kind: Instruction['kind']) =>
  (instruction: Instruction): boolean =>
    instruction.kind === kind;

const typedTorques = (pull: PullInstruction): Source => (pull.stage.kind === 'turn' ? 'keyed' : 'typed');

const withValue = (entry: ReadingEntry, value: string, unit?: Unit): ReadingEntry => ({
  ...entry,
  value: { value, unit: unit ?? entry.value.unit },
});

/** The drafts of one slip at the pull on the screen. */
function* slipDrafts(book: WalkBook, slip: Slip, pull: PullInstruction, manner: Manner): Generator<Draft, void> {
  const wrench = pull.wrench === null ? undefined : book.state.wrenches[pull.wrench];
  const proper = readingFor(pull, wrench, manner.source(pull), manner.random);
  switch (slip.kind) {
    case 'value':
      yield readingDraft(book, withValue(proper, slip.value, slip.unit), pull);
      return;
    case 'typedWrong': {
      const typed = { ...withValue(proper, slip.value), source: 'typed' as const };
      yield readingDraft(book, typed, pull);
      const reading = book.state.seq;
      const by = book.state.hands.records;
      yield { type: 'reading.voided', by, after: 12, data: { reading, reason: slip.reason } };
      return;
    }
    case 'differentHole':
      yield readingDraft(book, { ...proper, hole: slip.hole, insteadOf: pull.slot.hole }, pull);
  }
}

/** The draft of a value that a wrench sends, kept at once before it is taken (R10); null where none is sent. */
function receivedDraft(draft: Draft): Draft | null {
  if (draft.type !== 'reading.taken' || draft.data.retype) return null;
  const { source, wrench, value, endTorque } = draft.data;
  const sent = source === 'keyed' || source === 'streamed' || source === 'simulated';
  if (!sent || wrench === null) return null;
  return {
    type: 'reading.received',
    by: draft.by,
    after: (draft.after ?? 1) - 1,
    data: { wrench, source, value, ...(endTorque ? { endTorque } : {}) },
  };
}

function* withReceived(book: WalkBook, draft: Draft): Generator<Draft, void> {
  const sent = receivedDraft(draft);
  if (sent) yield sent;
  if (sent && draft.type === 'reading.taken')
    yield { ...draft, after: 1, data: { ...draft.data, received: book.state.seq } };
  else yield draft;
}

/**
 * An ideal technician: reads the instruction and does what it says, until the plan's end. Each draft has to be issued on
 * the book before the next is asked for. Throws when he goes round in circles.
 */
export function* walkDrafts(book: WalkBook, plan: WalkPlan = {}): Generator<Draft, void> {
  const { source = typedTorques } = plan;
  const manner: Manner = {
    random: plan.random ?? seededRandom(1),
    source: typeof source === 'function' ? source : () => source,
    settle: plan.settle ?? (() => undefined),
  };
  const slips = [...(plan.slips ?? [])];
  for (let count = 0; count < (plan.most ?? 3000); count += 1) {
    const instruction = instructionOf(book.state, book.now());
    if (plan.until?.(instruction, book)) return;
    if (instruction.kind === 'wait') {
      book.pass(isoToMs(instruction.until) - isoToMs(book.now().at) + 1000);
      continue;
    }
    const due = slips.findIndex(({ at }) => isAt(at)(instruction));
    const slip = due < 0 || instruction.kind !== 'pull' ? undefined : slips.splice(due, 1)[0];
    if (slip && instruction.kind === 'pull') {
      for (const draft of slipDrafts(book, slip, instruction, manner)) yield* withReceived(book, draft);
      continue;
    }
    const draft = nextDraft(book, instruction, manner);
    if (!draft) return;
    yield* withReceived(book, draft);
  }
  throw new Error(`the walk of ${book.setting.procedure.code} goes round in circles`);
}

/** Walks on without signatures: for rules, not for records. Every refusal throws. */
export function walkPlain(book: WalkBook, plan: WalkPlan = {}): void {
  for (const draft of walkDrafts(book, plan)) book.issue(draft);
}
