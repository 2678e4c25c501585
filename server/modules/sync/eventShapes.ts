import { z } from 'zod';
import { id, quantity, sha256 } from '@shared/contracts/common.contract';
import type { WalkEventType } from '@shared/walk/events';

/*
 * What the data of each event must look like before the rules see it: they are written for data that has its shape, and
 * what comes over the wire may be anything. Values the rules compute are not looked at here: they are decided again and
 * compared (decision 1).
 */

const name = z.string().min(1).max(80);
const note = z.string().max(2000);
const hole = z.string().min(1).max(40);
const anyHole = hole.nullable();
const person = id;
const seq = z.number().int().min(0);
const seal = sha256;
const renews = seq.optional();
const order = name.optional();
const slot = { pass: name, hole, stage: name, round: z.number().int().min(1).max(1000) };

const entry = z.looseObject({
  ...slot,
  source: z.enum(['streamed', 'keyed', 'typed', 'clicked', 'gauged', 'marked', 'paper', 'simulated']),
  wrench: name.nullable(),
  value: quantity,
  shows: z.enum(['thisPull', 'total']).optional(),
  endTorque: quantity.optional(),
  pulls: z.number().int().min(0).max(1000),
  click: z.enum(['moving', 'still', 'twice']).optional(),
  moved: z.boolean().optional(),
  retype: z.boolean().optional(),
  insteadOf: hole.optional(),
  changedFrom: z.string().max(40).optional(),
  slip: z
    .looseObject({
      kind: z.enum(['timesTen', 'tenth', 'otherUnit', 'sameAsBefore']),
      answer: z.enum(['asTyped', 'corrected']),
      first: z.string().max(40).optional(),
    })
    .optional(),
  received: seq.optional(),
  pulledAt: z.string().max(40).optional(),
});

const decimalOrNull = z.string().max(20).nullable();
const wrench = z.looseObject({
  id: name,
  tag: name,
  serial: z.string().max(80),
  kind: z.enum(['setting', 'dial', 'torque', 'torqueAngle', 'angleGauge', 'multiplier']),
  drive: z.string().max(40),
  range: z.looseObject({ low: z.string().max(20), high: z.string().max(20), unit: name }).nullable(),
  unit: name,
  resolution: z.looseObject({ torque: decimalOrNull, angle: decimalOrNull }),
  accuracy: z.looseObject({ cw: decimalOrNull, ccw: decimalOrNull }),
  turnAccuracy: decimalOrNull,
  due: z.looseObject({ date: z.string().max(40).nullable(), cycles: z.number().nullable() }),
  cycles: z.number(),
  state: z.enum(['inService', 'quarantined', 'away', 'retired']),
  certificate: z.string().max(120).nullable(),
});

const signed = z.looseObject({ meaning: name, seal, renews });
const pauseCause = z.enum([
  ...(['asked', 'hidden', 'killed', 'battery', 'calledAway', 'handedOver', 'noPartLeft', 'shopOrder'] as const),
]);
const choice = z.enum([
  ...(['pullAgain', 'goOn', 'restart', 'replace', 'restartJoint', 'accept', 'hold', 'asItIs'] as const),
  ...(['repeatStep', 'otherFastener', 'awaitPart', 'quarterTurnBack', 'looked', 'answered'] as const),
]);
const reported = z.enum([
  ...(['differentUnknown', 'strippedThread', 'brokenFastener', 'doesNotRunIn', 'noPartLeft'] as const),
  ...(['clickedTwice', 'wrenchDropped', 'other'] as const),
]);
const part = { partNumber: z.string().max(80), batch: z.string().max(80), count: z.number().int().min(0).max(100_000) };
const answer = { answer: z.enum(['yes', 'no']), value: quantity.optional() };

const shapes: Record<WalkEventType, z.ZodType> = {
  'walk.opened': z.looseObject({
    job: name,
    joint: name,
    purpose: z.enum(['finalAssembly', 'trialFit', 'torquePlate', 'stripDown', 'recheck']),
    procedure: z.looseObject({ code: name, revision: z.number().int().min(1), hash: sha256 }),
    pulls: person,
    records: person,
    policy: z.looseObject({
      judgement: z.enum(['simple', 'guarded']),
      countersign: z.enum(['required', 'notRequired']),
      shopOfOne: z.boolean(),
    }),
    rules: z.literal(1),
    earlier: z.looseObject({ readingsTaken: z.boolean(), usedHoles: z.array(hole).max(1000) }),
  }),
  'walk.paused': z.looseObject({ cause: pauseCause }),
  'walk.resumed': z.looseObject({
    cause: pauseCause,
    begun: z.enum(['notBegun', 'begun', 'cannotTell']),
    way: z.enum(['asInstructed', 'ownTotal', 'stripe', 'restart', 'replace', 'restartJoint']),
    at: z.looseObject({ pass: name, hole, stage: name }).nullable(),
  }),
  'walk.signed': signed,
  'walk.countersigned': signed,
  'walk.released': z.looseObject({ to: z.enum(['shop', 'tablet']), order }),
  'walk.takenOver': z.looseObject({ tablet: name, forced: z.boolean() }),
  'walk.sentBack': z.looseObject({
    items: z
      .array(
        z.looseObject({
          hole: anyHole,
          action: z.enum(['answer', 'look', 'restart', 'replace', 'restartJoint']),
          note,
        }),
      )
      .max(1000),
    seal,
  }),
  'walk.voided': z.looseObject({ reason: note, seal: seal.optional(), order }),
  'walk.stopped': z.looseObject({ order: name, why: z.enum(['withdrawn', 'stop', 'goOn']), reason: note }),
  'hands.changed': z.looseObject({ pulls: person, records: person }),
  'step.done': z.looseObject({
    step: name,
    hole: anyHole,
    ...answer,
    otherLubricant: z.string().max(200).optional(),
    photo: sha256.optional(),
  }),
  'step.corrected': z.looseObject({ corrects: seq, reason: note, ...answer }),
  'part.taken': z.looseObject({ part: name, ...part }),
  'part.corrected': z.looseObject({ corrects: seq, reason: note, ...part }),
  'wrench.taken': z.looseObject({
    wrench,
    how: z.enum(['scanned', 'picked']),
    confirmed: z.looseObject({
      unit: z.boolean(),
      peakHold: z.boolean(),
      direction: z.boolean(),
      zero: z.boolean(),
      dueDate: z.boolean(),
    }),
    turnShows: z.enum(['thisPull', 'total']).nullable(),
    setting: quantity.optional(),
    adapter: z.looseObject({ id: name, tag: name, extensionMm: z.string(), angleDeg: z.string() }).optional(),
    override: z.looseObject({ reason: note, by: person, seal, renews }).optional(),
  }),
  'wrench.reported': z.looseObject({ wrench: name, what: z.enum(['dropped', 'overloaded', 'reachedLimit']) }),
  'turn.begun': z.looseObject(slot),
  'stage.done': z.looseObject({
    ...slot,
    check: z.enum(['firstMovement', 'breakLoose', 'markAndReturn', 'witnessMark']).optional(),
    result: z.enum(['asMarked', 'moved']).optional(),
  }),
  'reading.received': z.looseObject({
    wrench: name,
    source: z.enum(['streamed', 'keyed', 'simulated']),
    value: quantity,
    endTorque: quantity.optional(),
    curve: sha256.optional(),
  }),
  'reading.rejected': z.looseObject({ received: seq, reason: note }),
  'reading.taken': entry,
  'reading.voided': z.looseObject({ reading: seq, reason: note }),
  'reading.elsewhere': entry.extend({ branch: seq, seq }),
  'deviation.noted': z.looseObject({ kind: reported, hole: anyHole, note }),
  'deviation.settled': z.looseObject({ deviation: name, choice, reason: note, seal: seal.optional(), renews, order }),
  'hold.set': z.looseObject({ deviation: name, note }),
  'hold.cleared': z.looseObject({ deviation: name }),
  'fastener.loosened': z.looseObject({ hole, round: z.number().int().min(1) }),
  'fastener.removed': z.looseObject({
    hole,
    looked: z.looseObject({ thread: z.boolean(), washer: z.boolean(), hole: z.boolean() }),
  }),
  'fastener.fitted': z.looseObject({
    hole,
    part: z.enum(['same', 'new']),
    partTaken: seq.optional(),
    ranIn: z.boolean(),
  }),
  'thread.repaired': z.looseObject({ hole, how: note, photo: sha256 }),
  'wait.skipped': z.looseObject({ pass: name, reason: note, seal: seal.optional(), renews, order }),
  'note.added': z.looseObject({ text: z.string().max(4000), hole: anyHole, deviation: name.optional() }),
  'photo.added': z.looseObject({ blob: sha256, hole: anyHole, deviation: name.optional(), caption: note }),
};

/** The first field of an event's data that does not have its shape, or null. */
export const misshapenField = (type: WalkEventType, data: unknown): string | null => {
  const parsed = shapes[type].safeParse(data);
  return parsed.success ? null : `data.${parsed.error.issues[0]?.path.join('.') ?? ''}`;
};
