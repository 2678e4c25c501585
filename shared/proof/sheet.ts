import type { FastenerType, GroupId, HoleId, Stage } from '../procedure/procedure';
import type { Quantity } from '../quantity/quantity';
import type { Verdict } from '../judge/verdict';
import type { Window } from '../quantity/window';
import type { Deviation, DeviationKind } from '../walk/deviation';
import type { Choice, Meaning, Purpose, ReadingTaken, Source, WalkPolicy } from '../walk/events';
import type { Phrase } from './phrase';

/** Version of what `sheetOf` makes; an older sheet is still shown as it was signed, but no longer made again. */
export const SHEET_VERSION = 1;

/** How a fastener is called beside its label. */
export type Noun = FastenerType['kind'];

/** A stage of a pass, in one round: one column of readings. */
export interface ProofColumn {
  id: string;
  /** Number of the pass, from 1, and of the round where the pass is repeated. */
  pass: number;
  round: number | null;
  kind: Stage['kind'];
  /** Windows by group; one entry for all groups where they agree. */
  windows: { groups: GroupId[]; window: Window }[];
  endWindows: { groups: GroupId[]; window: Window }[];
  hasEnd: boolean;
  hasPulls: boolean;
  /** Source and wrench tag of every reading in the column, or null where they differ. */
  source: Source | null;
  wrench: string | null;
  /** Counts towards the final readings: the last round of a pass. */
  isFinal: boolean;
}

/** What stands at one hole and stage. */
export interface ProofCell {
  seq: number;
  value: Quantity | null;
  verdict: Verdict | null;
  status: 'done' | 'accepted';
  sources: Source[];
  wrench: string | null;
  pulls: number;
  end: { value: Quantity; verdict: Verdict | null } | null;
  moved: boolean | null;
  click: ReadingTaken['click'] | null;
  mark: 'asMarked' | 'moved' | null;
  outOfOrder: boolean;
}

/** One hole with what stands at each column, in the order of the columns; null where the pass leaves the hole out. */
export interface ProofRow {
  hole: HoleId;
  label: string;
  noun: Noun;
  group: GroupId;
  /** 1 for the first fastener in the hole, 2 after one replacement. */
  fastenerNo: number;
  cells: (ProofCell | null)[];
}

/** What the first sentence counts. `clicked` and `marks` are kept apart: they measured nothing. */
export interface ProofCounts {
  fasteners: { done: number; total: number };
  passes: number;
  measured: { inside: number; count: number };
  clicked: { inside: number; count: number };
  marks: { inside: number; count: number };
  accepted: number;
  /** Every reading ever taken, those that no longer stand too. */
  readings: number;
}

/** A wrench as it was used (D2). */
export interface ProofWrench {
  tag: string;
  serial: string;
  drive: string;
  certificate: string | null;
  due: { date: string | null; cycles: number | null };
  inDate: boolean;
  how: 'scanned' | 'picked';
  allowedBy: string | null;
  adapters: string[];
  readings: number;
  out: 'dropped' | 'overloaded' | null;
}

/** New parts with their batch (W2). `fitted` counts the fasteners of this type that went in; null for other parts. */
export interface ProofPart {
  part: string;
  name: string;
  partNumber: string;
  batch: string;
  count: number;
  fitted: number | null;
}

/** Where something happened. */
export interface ProofPlace {
  hole: HoleId | null;
  label: string | null;
  noun: Noun;
  pass: number | null;
  round: number | null;
}

/** One decision about a deviation. */
export interface ProofSettling {
  choice: Choice;
  said: Phrase;
  by: string;
  at: string;
  seq: number;
  stands: boolean;
}

/** Something off, in words, with every decision about it (D1). */
export interface ProofDeviation {
  id: string;
  seq: number;
  at: string;
  kind: DeviationKind;
  status: Deviation['status'];
  place: ProofPlace;
  found: Phrase;
  settlings: ProofSettling[];
}

/** A line about one place: something voided, changed, turned down, entered later, or no longer standing. */
export interface ProofLine {
  seq: number;
  at: string;
  place: ProofPlace;
  said: Phrase;
}

/** A signature with its delay (D2). `received` is when the shop's server had it, `confirmed` when its PIN was checked. */
export interface ProofSignature {
  by: string;
  role: 'signer' | 'countersigner';
  meaning: Meaning;
  at: string;
  seq: number;
  /** Name of the tablet; null where it was signed at the office. */
  tablet: string | null;
  received: string | null;
  confirmed: string | null;
}

/** A head on the map of the proof: turn in degrees since the tick. */
export interface ProofHead {
  hole: HoleId;
  outcome: 'in' | 'accepted' | 'other';
  passTurn: number | null;
  earlierTurn: number;
  ccw: boolean;
  fastenerNo: number;
}

/** Everything the page prints, made from the signed events alone; no name, no language (decision 7). */
export interface ProofSheet {
  version: number;
  purpose: Purpose;
  policy: WalkPolicy;
  claim: Phrase[];
  counts: ProofCounts;
  walked: { from: string; to: string };
  columns: ProofColumn[];
  rows: ProofRow[];
  heads: ProofHead[];
  wrenches: ProofWrench[];
  parts: ProofPart[];
  preparation: Phrase[];
  deviations: ProofDeviation[];
  changes: ProofLine[];
  earlier: ProofLine[];
  late: ProofLine[];
  notes: { seq: number; at: string; by: string; text: string }[];
  photos: number;
  signatures: ProofSignature[];
  /** People of the record in the order in which they first appear: numbers stand for withheld names. */
  people: { person: string; role: 'technician' | 'supervisor' }[];
  events: number;
  /** Hash of the last event. */
  fingerprint: string;
}
