import type { Quantity } from '../quantity/quantity';
import type { Window } from '../quantity/window';

/** Identifier of a hole inside one procedure, e.g. `h5`. The label painted on the map is `Hole.label`. */
export type HoleId = string;
/** Letter of a group of holes that share a window, e.g. `A`. */
export type GroupId = string;

/** A position of the joint: where it stands on the map (millimetres, seen facing the heads) and what goes in it. */
export interface Hole {
  id: HoleId;
  label: string;
  x: number;
  y: number;
  group: GroupId;
  fastener: string;
}

/**
 * How often a fastener may be used (R3). `usedFrom` names the stage (`passId/stageId`) from which a single-use
 * fastener counts as used; absent = the first turn stage, or the first tightening stage where there is no turn.
 */
export type Reuse =
  | { kind: 'singleUse'; usedFrom?: string }
  | { kind: 'limited'; most: number; usedFrom?: string }
  | { kind: 'reusable' };

/** Lubricant as the engine maker asks for it and the places it goes to (W2). */
export interface Lubricant {
  what: string;
  where: ('thread' | 'underHead' | 'washer')[];
}

/** What goes into a hole. `kind` only names it on screens; `hand` decides which way is tightening. */
export interface FastenerType {
  id: string;
  name: string;
  kind: 'bolt' | 'stud' | 'nut' | 'capScrew';
  thread: string;
  propertyClass?: string;
  hand: 'right' | 'left';
  reuse: Reuse;
  lubricant: Lubricant | null;
  /** Drive the head needs, e.g. `1/2 in`; absent = any. */
  drive?: string;
}

/** A part that is fitted new besides the fasteners: gasket, seal (R6 counts it again at a joint restart). */
export interface PartNeed {
  id: string;
  name: string;
  count: number;
  /** A gasket or sealant: a joint restart needs a new one. */
  renewedOnRestart: boolean;
}

/** The four ways of checking a fastener that R12 knows. */
export type CheckKind = 'firstMovement' | 'breakLoose' | 'markAndReturn' | 'witnessMark';

/** Fields that every stage has. */
interface StageBase {
  id: string;
}

/** Tighten to a torque. `strict`: R4 (go on, noted) is not offered. */
export interface TorqueStage extends StageBase {
  kind: 'torque';
  windows: Record<GroupId, Window>;
  strict?: boolean;
}

/** Turn by an angle; end torque may be asked for (W5) and may have a window of its own. */
export interface TurnStage extends StageBase {
  kind: 'turn';
  windows: Record<GroupId, Window>;
  endTorque: { use: 'required' | 'wanted' | 'unused'; windows?: Record<GroupId, Window> };
  /** What the technician is told to expect on the torque display; only where the manual gives it (W5). */
  monitor?: Record<GroupId, { low: string; high: string; unit: Quantity['unit'] }>;
}

/** Loosen by hand tools; a value is recorded only where a window is given (break-loose torque). */
export interface LoosenStage extends StageBase {
  kind: 'loosen';
  turn: 'quarter' | 'free' | 'breakLoose';
}

/** Check without tightening (R12). `witnessMark` is by eye and takes no wrench. */
export interface CheckStage extends StageBase {
  kind: 'check';
  check: CheckKind;
  windows?: Record<GroupId, Window>;
}

/** Run down by hand, no wrench, no value. */
export interface RunDownStage extends StageBase {
  kind: 'runDown';
}

/** What is done at each hole of a pass. */
export type Stage = TorqueStage | TurnStage | LoosenStage | CheckStage | RunDownStage;

/** What the cited page allows when something is off in a pass (R6). */
export interface ReworkRule {
  allows: 'oneFastener' | 'joint';
  cite: { page: string } | 'manualSilent';
}

/** One trip round the joint. `order` is a permutation of the holes that take part in it. */
export interface Pass {
  id: string;
  name: string;
  order: HoleId[];
  stages: Stage[];
  rework: ReworkRule;
  /** Repeat rounds until none turns (R12); a torque pass only, never after a turn. */
  repeat?: { mostRounds: number };
  /** Settle for at least so many minutes after this pass before the next (W8). */
  waitMinutes?: number;
  /** This pass must end within so many minutes of its first reading (W8). */
  finishWithinMinutes?: number;
}

/** When a step is due. */
export type StepPlace =
  | { at: 'beforeJoint' }
  | { at: 'afterJoint' }
  | { at: 'beforePass' | 'afterPass'; pass: string }
  | { at: 'beforeHole'; groups?: GroupId[] };

/** Do, look, measure or photograph (W2). A `beforeHole` step is asked for each hole and again after rework (R2). */
export interface Step {
  id: string;
  place: StepPlace;
  kind: 'do' | 'look' | 'measure' | 'photograph';
  text: string;
  window?: Window;
  /** This step confirms paint stripes on the heads: from then on a turn may be measured from the stripe (W9). */
  paintsStripes?: boolean;
  /** Caution shown with it, a key of the cautions list. */
  caution?: string;
}

/** Words beside the map's edges. */
export interface MapSides {
  top?: string;
  right?: string;
  bottom?: string;
  left?: string;
}

/** What is drawn besides the holes, in the map's millimetres. */
export interface MapDrawing {
  sides: MapSides;
  bores: { x: number; y: number; r: number; label: string }[];
  outline?: 'rectangle' | 'round';
}

/** Where the values come from (A5): the manual the author held. */
export interface ManualSource {
  title: string;
  page: string;
  date: string;
}

/**
 * The whole of one approved revision. It never changes; its fingerprint is the SHA-256 of its canonical JSON and is
 * written into `walk.opened`, so that a walk stays bound to the revision it began with.
 */
export interface ProcedureDocument {
  schema: 1;
  code: string;
  title: string;
  engine: string;
  component: string;
  source: ManualSource;
  /** The windows' width is the shop's own choice, not the manual's (A2). */
  toleranceIsShops: boolean;
  map: MapDrawing;
  groups: { id: GroupId; name: string }[];
  holes: Hole[];
  fasteners: FastenerType[];
  parts: PartNeed[];
  passes: Pass[];
  steps: Step[];
  /** Order of loosening (R6); absent = the last pass's order reversed. */
  loosening?: HoleId[];
}
