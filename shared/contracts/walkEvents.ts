import { z } from 'zod';
import { err, ok, type Result } from '../kernel/result';
import type { WalkEventData, WalkEventType } from '../walk/events';
import {
  count,
  decimal,
  deviationId,
  digest,
  key,
  limits,
  measured,
  rowId,
  said,
  seq,
  slotFields,
  source,
  verdict,
  wrenchSnapshot,
} from './walkEventParts';

const hole = key.nullable();
const renews = seq.optional();
const order = rowId.optional();
const pauseCause = z.enum([
  'asked',
  'hidden',
  'killed',
  'battery',
  'calledAway',
  'handedOver',
  'noPartLeft',
  'shopOrder',
]);
const hands = { pulls: rowId, records: rowId };
const slot = z.strictObject(slotFields);
const answer = { answer: z.enum(['yes', 'no']), value: measured.optional(), inLimits: z.boolean().optional() };
const partFields = { partNumber: said(60), batch: said(60), count };
const signature = z.strictObject({
  meaning: z.enum(['tightenedAsRecorded', 'recordedAsTold', 'checkedRecord', 'checkedRecordAndJoint']),
  seal: digest,
  renews,
});

const reading = {
  ...slotFields,
  source,
  wrench: rowId.nullable(),
  value: measured,
  shows: z.enum(['thisPull', 'total']).optional(),
  endTorque: measured.optional(),
  pulls: count,
  click: z.enum(['moving', 'still', 'twice']).optional(),
  moved: z.boolean().optional(),
  retype: z.boolean().optional(),
  insteadOf: key.optional(),
  changedFrom: said(40).optional(),
  slip: z
    .strictObject({
      kind: z.enum(['timesTen', 'tenth', 'otherUnit', 'sameAsBefore']),
      answer: z.enum(['asTyped', 'corrected']),
      first: said(40).optional(),
    })
    .optional(),
  received: seq.optional(),
  pulledAt: z.iso.datetime().optional(),
};

const lifecycle = {
  'walk.opened': z.strictObject({
    job: rowId,
    joint: rowId,
    purpose: z.enum(['finalAssembly', 'trialFit', 'torquePlate', 'stripDown', 'recheck']),
    procedure: z.strictObject({ code: said(40), revision: z.number().int().min(1).max(100_000), hash: digest }),
    ...hands,
    policy: z.strictObject({
      judgement: z.enum(['simple', 'guarded']),
      countersign: z.enum(['required', 'notRequired']),
      shopOfOne: z.boolean(),
    }),
    rules: z.literal(1),
    earlier: z.strictObject({ readingsTaken: z.boolean(), usedHoles: z.array(key).max(400) }),
  }),
  'walk.paused': z.strictObject({ cause: pauseCause }),
  'walk.resumed': z.strictObject({
    cause: pauseCause,
    begun: z.enum(['notBegun', 'begun', 'cannotTell']),
    way: z.enum(['asInstructed', 'ownTotal', 'stripe', 'restart', 'replace', 'restartJoint']),
    at: z.strictObject({ pass: key, hole: key, stage: key }).nullable(),
  }),
  'walk.signed': signature,
  'walk.countersigned': signature,
  'walk.sentBack': z.strictObject({
    items: z
      .array(
        z.strictObject({
          hole,
          action: z.enum(['answer', 'look', 'restart', 'replace', 'restartJoint']),
          note: said(),
        }),
      )
      .max(400),
    seal: digest,
  }),
  'walk.released': z.strictObject({ to: z.enum(['shop', 'tablet']), order }),
  'walk.takenOver': z.strictObject({ tablet: rowId, forced: z.boolean() }),
  'walk.voided': z.strictObject({ reason: said(), seal: digest.optional(), order }),
  'walk.stopped': z.strictObject({ order: rowId, why: z.enum(['withdrawn', 'stop', 'goOn']), reason: said() }),
  'hands.changed': z.strictObject(hands),
};

const preparation = {
  'step.done': z.strictObject({
    step: key,
    hole,
    ...answer,
    otherLubricant: said(120).optional(),
    photo: digest.optional(),
  }),
  'step.corrected': z.strictObject({ corrects: seq, reason: said(), ...answer }),
  'part.taken': z.strictObject({ part: key, ...partFields }),
  'part.corrected': z.strictObject({ corrects: seq, reason: said(), ...partFields }),
  'wrench.taken': z.strictObject({
    wrench: wrenchSnapshot,
    how: z.enum(['scanned', 'picked']),
    confirmed: z.strictObject({
      unit: z.boolean(),
      peakHold: z.boolean(),
      direction: z.boolean(),
      zero: z.boolean(),
      dueDate: z.boolean(),
    }),
    turnShows: z.enum(['thisPull', 'total']).nullable(),
    setting: measured.optional(),
    adapter: z.strictObject({ id: rowId, tag: said(40), extensionMm: decimal, angleDeg: decimal }).optional(),
    override: z.strictObject({ reason: said(), by: rowId, seal: digest, renews }).optional(),
  }),
  'wrench.reported': z.strictObject({ wrench: rowId, what: z.enum(['dropped', 'overloaded', 'reachedLimit']) }),
  'wait.skipped': z.strictObject({ pass: key, reason: said(), seal: digest.optional(), renews, order }),
  'note.added': z.strictObject({ text: said(4_000), hole, deviation: deviationId.optional() }),
  'photo.added': z.strictObject({ blob: digest, hole, deviation: deviationId.optional(), caption: said() }),
};

const readings = {
  'turn.begun': slot,
  'stage.done': z.strictObject({
    ...slotFields,
    check: z.enum(['firstMovement', 'breakLoose', 'markAndReturn', 'witnessMark']).optional(),
    result: z.enum(['asMarked', 'moved']).optional(),
  }),
  'reading.received': z.strictObject({
    wrench: rowId,
    source: z.enum(['streamed', 'keyed', 'simulated']),
    value: measured,
    endTorque: measured.optional(),
    curve: digest.optional(),
  }),
  'reading.rejected': z.strictObject({ received: seq, reason: said() }),
  'reading.taken': z.strictObject({
    ...reading,
    window: limits.nullable(),
    total: measured,
    verdict,
    endVerdict: verdict.optional(),
  }),
  'reading.voided': z.strictObject({ reading: seq, reason: said(), seal: digest.optional(), renews }),
  'reading.elsewhere': z.strictObject({ ...reading, branch: z.number().int().min(0).max(1_000), seq }),
};

const rework = {
  'deviation.noted': z.strictObject({
    kind: z.enum([
      'differentUnknown',
      'strippedThread',
      'brokenFastener',
      'doesNotRunIn',
      'noPartLeft',
      'clickedTwice',
      'wrenchDropped',
      'other',
    ]),
    hole,
    note: said(),
  }),
  'deviation.settled': z.strictObject({
    deviation: deviationId,
    choice: z.enum([
      'pullAgain',
      'goOn',
      'restart',
      'replace',
      'restartJoint',
      'accept',
      'hold',
      'asItIs',
      'repeatStep',
      'otherFastener',
      'awaitPart',
      'quarterTurnBack',
      'looked',
      'answered',
    ]),
    reason: said(),
    seal: digest.optional(),
    renews,
    order,
  }),
  'hold.set': z.strictObject({ deviation: deviationId, note: said() }),
  'hold.cleared': z.strictObject({ deviation: deviationId }),
  'fastener.loosened': z.strictObject({ hole: key, round: slotFields.round }),
  'fastener.removed': z.strictObject({
    hole: key,
    looked: z.strictObject({ thread: z.boolean(), washer: z.boolean(), hole: z.boolean() }),
  }),
  'fastener.fitted': z.strictObject({
    hole: key,
    part: z.enum(['same', 'new']),
    partTaken: seq.optional(),
    ranIn: z.boolean(),
  }),
  'thread.repaired': z.strictObject({ hole: key, how: said(), photo: digest }),
};

/** The shape of every event's data: strict, so that nothing unknown is signed into a chain, and bounded in length. */
export const walkEventSchemas: { readonly [T in WalkEventType]: z.ZodType<WalkEventData[T]> } = {
  ...lifecycle,
  ...preparation,
  ...readings,
  ...rework,
};

/** What is wrong with an event's data: `path` names the first member that is not as it should be (empty: the whole). */
export interface BadEventData {
  code: 'badShape';
  path: string;
}

/**
 * Reads the data of an event before the rules see it: `decide` relies on its shape and never asks. The answer is what
 * was given, not a changed copy, because its text is signed.
 */
export function parseWalkEventData<T extends WalkEventType>(
  type: T,
  data: unknown,
): Result<WalkEventData[T], BadEventData> {
  const parsed = walkEventSchemas[type].safeParse(data);
  if (parsed.success) return ok(data as WalkEventData[T]);
  const issue = parsed.error.issues[0];
  const unknown = issue?.code === 'unrecognized_keys' ? issue.keys.slice(0, 1) : [];
  return err({ code: 'badShape', path: [...(issue?.path ?? []), ...unknown].join('.') });
}
