import { holeById, slotKey, stageOf, walkPasses } from '../../walk/slots';
import type { SlotRef, WalkEvent } from '../../walk/events';
import type { WalkState } from '../../walk/state';
import type { ProofRecord } from '../proofDocument';
import type { Noun, ProofPlace } from '../sheet';

/** What a sheet is made from: the events, the state they lead to, and the record they came in. */
export interface SheetSource {
  state: WalkState;
  events: readonly WalkEvent[];
  record: ProofRecord;
}

/** How the fastener of a hole is called. */
export function nounOf(state: WalkState, hole: string | null): Noun {
  const type = hole === null ? undefined : holeById(state.procedure, hole)?.fastener;
  return state.procedure.fasteners.find((fastener) => fastener.id === type)?.kind ?? 'bolt';
}

/** Where: hole, pass counted from 1, and the round where the pass is repeated. */
export function placeOf(state: WalkState, hole: string | null, slot: Omit<SlotRef, 'hole'> | null): ProofPlace {
  const found = slot && stageOf(state, slot);
  return {
    hole,
    label: hole === null ? null : (holeById(state.procedure, hole)?.label ?? hole),
    noun: nounOf(state, hole),
    pass: found ? found.passIndex + 1 : null,
    round: slot && found?.pass.repeat ? slot.round : null,
  };
}

/** The event of a sequence number; the chain has no gap, so its place is its number. */
export const eventAt = (source: SheetSource, seq: number): WalkEvent | undefined =>
  source.events.find((event) => event.seq === seq);

/** Tag of a wrench by id; the id where it was never taken. */
export const tagOf = (state: WalkState, wrench: string): string => state.wrenches[wrench]?.wrench.tag ?? wrench;

/** The round whose readings are final: the last that was opened (R12). */
export const lastRound = (state: WalkState, pass: string): number => state.rounds[pass] ?? 1;

const labelParts = (label: string): (string | number)[] =>
  (label.match(/\d+|\D+/g) ?? []).map((part) => (/^\d/.test(part) ? Number(part) : part));

/** Labels as a person counts them: 2 before 10, S2 before S10, bare numbers before letters. */
export function compareLabels(a: string, b: string): number {
  const [partsA, partsB] = [labelParts(a), labelParts(b)];
  for (const [index, partA] of partsA.entries()) {
    const partB = partsB[index];
    if (partB === undefined) return 1;
    if (partA === partB) continue;
    if (typeof partA !== typeof partB) return typeof partA === 'number' ? -1 : 1;
    return partA < partB ? -1 : 1;
  }
  return partsA.length < partsB.length ? -1 : 0;
}

/** Holes that take part in any pass, by label. */
export function holesOf(state: WalkState): string[] {
  const taking = new Set(walkPasses(state).flatMap((pass) => pass.order));
  return state.procedure.holes
    .filter((hole) => taking.has(hole.id))
    .sort((a, b) => compareLabels(a.label, b.label))
    .map((hole) => hole.id);
}

/** What stands at a slot, or undefined. */
export const outcomeAt = (state: WalkState, slot: SlotRef) => state.holes[slot.hole]?.slots[slotKey(slot)];
