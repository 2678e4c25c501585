import type { FastenerType, Hole, HoleId, Pass, ProcedureDocument, Stage } from '../procedure/procedure';
import type { Window } from '../quantity/window';
import type { Purpose, SlotRef } from './events';
import type { WalkState } from './state';

/** Key of a stage of a pass in one round: what `HoleState.slots` is keyed by. */
export const slotKey = (slot: Pick<SlotRef, 'pass' | 'stage' | 'round'>): string =>
  `${slot.pass}/${slot.stage}/${slot.round}`;

/** Whether two references mean the same place of the walk. */
export const sameSlot = (a: SlotRef, b: SlotRef): boolean => a.hole === b.hole && slotKey(a) === slotKey(b);

const manualSilent = { allows: 'oneFastener', cite: 'manualSilent' } as const;

/** The order in which the joint is loosened: the procedure's own, else the last pass's reversed (R6). */
export function looseningOrder(procedure: ProcedureDocument): HoleId[] {
  if (procedure.loosening) return procedure.loosening;
  const listed = procedure.passes.flatMap((pass) => [...pass.order]);
  return [...new Set(listed.reverse())];
}

function recheckPasses(procedure: ProcedureDocument): Pass[] {
  const checks = procedure.passes
    .map((pass) => ({ ...pass, stages: pass.stages.filter((stage) => stage.kind === 'check') }))
    .filter((pass) => pass.stages.length > 0)
    .map(({ repeat: _repeat, waitMinutes: _wait, finishWithinMinutes: _finish, ...pass }) => pass);
  if (checks.length > 0) return checks;
  const order = [...new Set(procedure.passes.flatMap((pass) => pass.order))];
  return [
    {
      id: 'marks',
      name: 'marks',
      order,
      stages: [{ id: 'mark', kind: 'check', check: 'witnessMark' }],
      rework: manualSilent,
    },
  ];
}

const stripDownPasses = (procedure: ProcedureDocument): Pass[] => [
  {
    id: 'strip',
    name: 'strip',
    order: looseningOrder(procedure),
    stages: [{ id: 'breakLoose', kind: 'check', check: 'breakLoose' }],
    rework: manualSilent,
  },
];

/**
 * The passes a walk of this purpose goes through (W1): a recheck takes only check stages (the witness marks by eye where
 * the revision has none), a strip-down the break-loose torques in loosening order, all others the whole procedure.
 */
export function passesFor(procedure: ProcedureDocument, purpose: Purpose): Pass[] {
  if (purpose === 'recheck') return recheckPasses(procedure);
  if (purpose === 'stripDown') return stripDownPasses(procedure);
  return procedure.passes;
}

const cachedPasses = new WeakMap<ProcedureDocument, Partial<Record<Purpose, Pass[]>>>();

/** The passes of this walk; worked out once per procedure and purpose. */
export function walkPasses(state: WalkState): Pass[] {
  const purpose = state.opened?.purpose ?? 'finalAssembly';
  const byPurpose = cachedPasses.get(state.procedure) ?? {};
  const passes = byPurpose[purpose] ?? passesFor(state.procedure, purpose);
  cachedPasses.set(state.procedure, { ...byPurpose, [purpose]: passes });
  return passes;
}

/** Hole by id, or undefined. */
export const holeById = (procedure: ProcedureDocument, id: HoleId): Hole | undefined =>
  procedure.holes.find((hole) => hole.id === id);

/** Label of a hole as painted on the map; the id where the hole is unknown. */
export const labelOf = (procedure: ProcedureDocument, id: HoleId): string => holeById(procedure, id)?.label ?? id;

/** The fastener type of a hole; throws where the procedure is broken (checked at approval). */
export function fastenerOf(procedure: ProcedureDocument, id: HoleId): FastenerType {
  const hole = holeById(procedure, id);
  const type = procedure.fasteners.find((fastener) => fastener.id === hole?.fastener);
  if (!type) throw new Error(`procedure ${procedure.code}: hole ${id} has no fastener type`);
  return type;
}

/** Pass and stage of a slot, or null where the walk has none such. */
export function stageOf(
  state: WalkState,
  slot: Pick<SlotRef, 'pass' | 'stage'>,
): { pass: Pass; stage: Stage; passIndex: number } | null {
  const passes = walkPasses(state);
  const passIndex = passes.findIndex((pass) => pass.id === slot.pass);
  const pass = passes[passIndex];
  const stage = pass?.stages.find((candidate) => candidate.id === slot.stage);
  return pass && stage ? { pass, stage, passIndex } : null;
}

/** The window of a stage at a hole: its group's; null for stages that have none. */
export function windowOf(procedure: ProcedureDocument, stage: Stage, hole: HoleId): Window | null {
  const group = holeById(procedure, hole)?.group;
  if (group === undefined || !('windows' in stage) || !stage.windows) return null;
  return stage.windows[group] ?? null;
}

/** Direction seen facing the head: tightening follows the hand of the thread, loosening goes against it (W4). */
export function directionOf(procedure: ProcedureDocument, stage: Stage, hole: HoleId): 'cw' | 'ccw' {
  const rightHand = fastenerOf(procedure, hole).hand === 'right';
  const loosens = stage.kind === 'loosen' || (stage.kind === 'check' && stage.check === 'breakLoose');
  return rightHand === loosens ? 'ccw' : 'cw';
}

/** All slots of one hole in the order in which it goes through them, with the rounds opened so far. */
export function slotsOfHole(state: WalkState, hole: HoleId): SlotRef[] {
  return walkPasses(state)
    .filter((pass) => pass.order.includes(hole))
    .flatMap((pass) => {
      const rounds = pass.repeat ? (state.rounds[pass.id] ?? 1) : 1;
      return Array.from({ length: rounds }, (_, index) =>
        pass.stages.map((stage) => ({ pass: pass.id, hole, stage: stage.id, round: index + 1 })),
      ).flat();
    });
}

/** Whether a stage takes a figure (a reading) or is only done. */
export function takesReading(stage: Stage): boolean {
  return stage.kind === 'torque' || stage.kind === 'turn' || (stage.kind === 'check' && stage.check !== 'witnessMark');
}

/** The stage from which a single-use or limited fastener counts as used (R3), as `pass/stage`; null = never. */
export function usedFrom(state: WalkState, hole: HoleId): string | null {
  const { procedure } = state;
  const { reuse } = fastenerOf(procedure, hole);
  if (reuse.kind === 'reusable') return null;
  if (reuse.usedFrom) return reuse.usedFrom;
  const stages = procedure.passes
    .filter((pass) => pass.order.includes(hole))
    .flatMap((pass) => pass.stages.map((stage) => ({ pass, stage })));
  const first =
    stages.find(({ stage }) => stage.kind === 'turn') ?? stages.find(({ stage }) => stage.kind === 'torque');
  return first ? `${first.pass.id}/${first.stage.id}` : null;
}

/** Whether the fastener may not be tightened once more: single-use and used, or used as often as its type allows (R3). */
export function isSpent(state: WalkState, hole: HoleId): boolean {
  const { reuse } = fastenerOf(state.procedure, hole);
  const found = state.holes[hole];
  if (!found || reuse.kind === 'reusable' || state.opened?.purpose !== 'finalAssembly') return false;
  return reuse.kind === 'singleUse' ? found.used : found.uses >= reuse.most;
}

/** Whether a paint stripe shows how far this very fastener has turned (W9). */
export const isStriped = (state: WalkState, hole: HoleId): boolean =>
  state.striped[hole] !== undefined && state.striped[hole] === state.holes[hole]?.attempt;

/** Whether taking this slot (or one after it) makes the fastener used (R3). */
export function makesUsed(state: WalkState, slot: SlotRef): boolean {
  const from = usedFrom(state, slot.hole);
  if (from === null) return false;
  const keys = slotsOfHole(state, slot.hole).map((ref) => `${ref.pass}/${ref.stage}`);
  const here = keys.indexOf(`${slot.pass}/${slot.stage}`);
  const limit = keys.indexOf(from);
  return limit >= 0 && here >= limit;
}
