import type { HoleId, CheckKind } from '../procedure/procedure';
import type { Quantity } from '../quantity/quantity';
import type { Window } from '../quantity/window';
import type { Verdict } from '../judge/verdict';
import type { WrenchSnapshot } from '../crib/wrench';

/*
 * Names and shapes in this file are for ever: stored chains hold them. A change needs a new envelope version and an
 * upcast (upcasts.ts), never an edit.
 */

/** How a reading was learnt (product words, "source"). */
export type Source = 'streamed' | 'keyed' | 'typed' | 'clicked' | 'gauged' | 'marked' | 'paper' | 'simulated';

/** Why a walk is carried out (W1). */
export type Purpose = 'finalAssembly' | 'trialFit' | 'torquePlate' | 'stripDown' | 'recheck';

/** What a slip question was about and how it was answered (W6). */
export interface SlipAnswer {
  kind: 'timesTen' | 'tenth' | 'otherUnit' | 'sameAsBefore';
  answer: 'asTyped' | 'corrected';
  /** The figure as first typed, where the answer changed it. */
  first?: string;
}

/** Shop policy that binds this walk, frozen at opening (J7). */
export interface WalkPolicy {
  judgement: 'simple' | 'guarded';
  countersign: 'required' | 'notRequired';
  /** P2: a shop of one may accept, skip and issue by the person who pulled. */
  shopOfOne: boolean;
}

/** What an earlier walk on the same joint left behind (W1). */
export interface EarlierWork {
  /** Some earlier walk took a reading and the joint was not stripped down since: begin with R6. */
  readingsTaken: boolean;
  /** Holes whose fastener counts as used from an earlier walk. */
  usedHoles: HoleId[];
}

/** `walk.opened`: job, joint, purpose, revision, who pulls, who records (W1). */
export interface WalkOpened {
  job: string;
  joint: string;
  purpose: Purpose;
  procedure: { code: string; revision: number; hash: string };
  pulls: string;
  records: string;
  policy: WalkPolicy;
  rules: 1;
  earlier: EarlierWork;
}

/** Why a walk stood still. */
export type PauseCause =
  'asked' | 'hidden' | 'killed' | 'battery' | 'calledAway' | 'handedOver' | 'noPartLeft' | 'shopOrder';
/** `walk.paused`. */
export interface WalkPaused {
  cause: PauseCause;
}

/** How an interrupted stage goes on (W9). */
export type ResumeWay = 'asInstructed' | 'ownTotal' | 'stripe' | 'restart' | 'replace' | 'restartJoint';
/** `walk.resumed`: what the technician found when he looked at the work (W9). */
export interface WalkResumed {
  cause: PauseCause;
  begun: 'notBegun' | 'begun' | 'cannotTell';
  way: ResumeWay;
  /** The instruction that was on the screen, so that the record names what was looked at. */
  at: { pass: string; hole: HoleId; stage: string } | null;
}

/** Meanings a signature may state (W12). */
export type Meaning = 'tightenedAsRecorded' | 'recordedAsTold' | 'checkedRecord' | 'checkedRecordAndJoint';
/** SHA-256 (hex) of the sealed PIN that travels beside the batch (decision 6). */
export type Seal = string;
/** `walk.signed` and `walk.countersigned`. */
export interface WalkSigned {
  meaning: Meaning;
  seal: Seal;
  /** Sequence number of a signature of the same meaning whose PIN was refused or disowned (decision 6). */
  renews?: number;
}

/** What a countersigner asks for at one hole (R11). Never re-opens a stage. */
export type SendBackAction = 'answer' | 'look' | 'restart' | 'replace' | 'restartJoint';
/** `walk.sentBack`. */
export interface WalkSentBack {
  items: { hole: HoleId | null; action: SendBackAction; note: string }[];
  seal: Seal;
}
/** `walk.released`: the writer passes to the shop (decision 4). */
export interface WalkReleased {
  to: 'shop' | 'tablet';
  order?: string;
}
/** `walk.takenOver`: another tablet becomes the writer (W11). `forced`: every hole from the last known instruction is looked at. */
export interface WalkTakenOver {
  tablet: string;
  forced: boolean;
}
/** `walk.voided` (W13). */
export interface WalkVoided {
  reason: string;
  seal?: Seal;
  order?: string;
}
/** `walk.stopped`: the office stopped the walk (order), or let it go on. */
export interface WalkStopped {
  order: string;
  why: 'withdrawn' | 'stop' | 'goOn';
  reason: string;
}
/** `hands.changed`: who pulls and who records from here on (W11). */
export interface HandsChanged {
  pulls: string;
  records: string;
}

/** `step.done`: a step of the procedure, for a hole where it is one of holes (W2). */
export interface StepDone {
  step: string;
  hole: HoleId | null;
  answer: 'yes' | 'no';
  value?: Quantity;
  /** Computed where the step has a window. */
  inLimits?: boolean;
  /** Another lubricant than the fastener type names: a deviation. */
  otherLubricant?: string;
  photo?: string;
}
/** `step.corrected`: both values are kept (R10). */
export interface StepCorrected {
  corrects: number;
  reason: string;
  answer: 'yes' | 'no';
  value?: Quantity;
  inLimits?: boolean;
}

/** `part.taken`: new parts at the stand. `part` is a fastener type or a part need of the procedure. */
export interface PartTaken {
  part: string;
  partNumber: string;
  batch: string;
  count: number;
}
/** `part.corrected` (R10). */
export interface PartCorrected {
  corrects: number;
  reason: string;
  partNumber: string;
  batch: string;
  count: number;
}

/** Adapter fitted to the wrench (K1): length and angle, so that every judgement can be repeated. */
export interface AdapterUse {
  id: string;
  tag: string;
  extensionMm: string;
  angleDeg: string;
}
/** What was confirmed on the wrench before its first pull (W3). */
export interface WrenchConfirmed {
  unit: boolean;
  peakHold: boolean;
  direction: boolean;
  zero: boolean;
  dueDate: boolean;
}
/** `wrench.taken` (W3): snapshot of what was known of it, so that the judgement can be repeated for ever (J7). */
export interface WrenchTaken {
  wrench: WrenchSnapshot;
  how: 'scanned' | 'picked';
  confirmed: WrenchConfirmed;
  /** One choice per wrench for turns (W5). */
  turnShows: 'thisPull' | 'total' | null;
  /** Setting wrenches: the torque it is set to (W7). */
  setting?: Quantity;
  adapter?: AdapterUse;
  override?: { reason: string; by: string; seal: Seal; renews?: number };
}
/** `wrench.reported`: dropped or overloaded; quarantined at once, the walk goes on with another (K4). */
export interface WrenchReported {
  wrench: string;
  what: 'dropped' | 'overloaded' | 'reachedLimit';
}

/** Where in the walk something happens. `round` from 1 in a repeated pass, else 1. */
export interface SlotRef {
  pass: string;
  hole: HoleId;
  stage: string;
  round: number;
}

/** `turn.begun`: streamed wrench, at first torque. */
export type TurnBegun = SlotRef;
/** `stage.done`: run down, loosen, mark by eye: no value. `moved` in a check by eye. */
export interface StageDone extends SlotRef {
  check?: CheckKind;
  result?: 'asMarked' | 'moved';
}

/** `reading.received`: one finished value a wrench sends, at once. */
export interface ReadingReceived {
  wrench: string;
  source: 'streamed' | 'keyed' | 'simulated';
  value: Quantity;
  endTorque?: Quantity;
  curve?: string;
}
/** `reading.rejected`: a received value turned down before it was taken, with a reason (R10). */
export interface ReadingRejected {
  received: number;
  reason: string;
}

/** How the figure of a turn is to be understood. */
export type Shows = 'thisPull' | 'total';
/** What the technician entered for one stage at one hole. */
export interface ReadingEntry extends SlotRef {
  source: Source;
  wrench: string | null;
  value: Quantity;
  shows?: Shows;
  endTorque?: Quantity;
  pulls: number;
  /** The wrench clicked: while moving, without moving, twice (W7). */
  click?: 'moving' | 'still' | 'twice';
  /** Repeat pass: did the fastener move (R12). */
  moved?: boolean;
  /** Typing again after a void: the bolt is not pulled (R10). */
  retype?: boolean;
  /** R5: the hole that was asked for, when a different one was tightened. */
  insteadOf?: HoleId;
  /** A digit of a typed value was deleted after an out-of-window verdict (W5). */
  changedFrom?: string;
  slip?: SlipAnswer;
  received?: number;
  /** Paper sheet: when it was really pulled. */
  pulledAt?: string;
}
/** `reading.taken`: the entry and what the rules made of it, so that the judgement can be repeated (J7). */
export interface ReadingTaken extends ReadingEntry {
  window: Window | null;
  /** What stands at this hole and stage after this reading: turns add (R1, R5). */
  total: Quantity;
  verdict: Verdict;
  endVerdict?: Verdict;
}
/** `reading.voided`: a typing error; the instruction becomes *do not pull, type again* (R10). */
export interface ReadingVoided {
  reading: number;
  reason: string;
  /** A keyed or streamed reading is voided only by a supervisor's own decision. */
  seal?: Seal;
  renews?: number;
}
/** `reading.elsewhere`: a physical fact of a branch that was not chosen (W11). */
export interface ReadingElsewhere extends ReadingEntry {
  branch: number;
  seq: number;
}

/** Deviations that a person reports. */
export type ReportedKind =
  | 'differentUnknown'
  | 'strippedThread'
  | 'brokenFastener'
  | 'doesNotRunIn'
  | 'noPartLeft'
  | 'clickedTwice'
  | 'wrenchDropped'
  | 'other';
/** `deviation.noted`. */
export interface DeviationNoted {
  kind: ReportedKind;
  hole: HoleId | null;
  note: string;
}

/** What may be decided about a deviation (R1–R12). */
export type Choice =
  | 'pullAgain'
  | 'goOn'
  | 'restart'
  | 'replace'
  | 'restartJoint'
  | 'accept'
  | 'hold'
  | 'asItIs'
  | 'repeatStep'
  | 'otherFastener'
  | 'awaitPart'
  | 'quarterTurnBack'
  | 'looked'
  | 'answered';
/** `deviation.settled`: the later one stands until loosening has begun (R2). */
export interface DeviationSettled {
  deviation: string;
  choice: Choice;
  reason: string;
  /** Person who decides; differs from the recorder for accept. */
  seal?: Seal;
  renews?: number;
  order?: string;
}
/** `hold.set`: no supervisor here (R9). */
export interface HoldSet {
  deviation: string;
  note: string;
}
/** `hold.cleared`: withdrawn (settling clears by itself). */
export interface HoldCleared {
  deviation: string;
}

/** `fastener.loosened`: rework (R2) or a round of the joint restart (R6). */
export interface FastenerLoosened {
  hole: HoleId;
  round: number;
}
/** `fastener.removed`: taken out; thread, washer and hole looked at. */
export interface FastenerRemoved {
  hole: HoleId;
  looked: { thread: boolean; washer: boolean; hole: boolean };
}
/** `fastener.fitted`: the same or a new part, run in by hand. */
export interface FastenerFitted {
  hole: HoleId;
  part: 'same' | 'new';
  partTaken?: number;
  ranIn: boolean;
}
/** `thread.repaired` (R7). */
export interface ThreadRepaired {
  hole: HoleId;
  how: string;
  photo: string;
}
/** `wait.skipped` (W8): a supervisor's own decision. */
export interface WaitSkipped {
  pass: string;
  reason: string;
  seal?: Seal;
  renews?: number;
  order?: string;
}
/** `note.added`. */
export interface NoteAdded {
  text: string;
  hole: HoleId | null;
  deviation?: string;
}
/** `photo.added`: the blob is addressed by its SHA-256 and sent after the events. */
export interface PhotoAdded {
  blob: string;
  hole: HoleId | null;
  deviation?: string;
  caption: string;
}
