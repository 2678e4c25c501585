import { add, compare, decimalToRational, rational, type Rational } from '@shared/quantity/rational';
import type { HoleId, Pass, ProcedureDocument, Stage } from '@shared/procedure/procedure';
import type { FastenerFitted, Purpose, ReadingTaken, SlotRef, WalkEvent, WalkResumed } from '@shared/walk/events';
import type { WalkState } from '@shared/walk/state';
import { expect } from 'vitest';

/*
 * What is physically true of the fasteners, told from the events alone and kept beside the reducer: which stages each
 * fastener got since it was last let go, and how far it was turned. The rules are then held against it.
 */

interface Given {
  seq: number;
  /** Degrees of a turn, added up; null for anything else. */
  turned: Rational | null;
}

interface Fastener {
  given: Map<string, Given[]>;
  /** Got a stage from which a single-use fastener counts as used. */
  used: boolean;
  present: boolean;
}

interface Place {
  pass: Pass;
  stage: Stage;
  slot: SlotRef;
}

const keyOf = ({ pass, stage, round }: Pick<SlotRef, 'pass' | 'stage' | 'round'>): string =>
  `${pass}/${stage}/${round}`;

/** Every place of the walk in the order in which it is visited, with the rounds opened so far. */
function placesOf(procedure: ProcedureDocument, rounds: Readonly<Record<string, number>>): Place[] {
  return procedure.passes.flatMap((pass) =>
    Array.from({ length: pass.repeat ? (rounds[pass.id] ?? 1) : 1 }, (_, index) =>
      pass.order.flatMap((hole) =>
        pass.stages.map((stage) => ({ pass, stage, slot: { pass: pass.id, hole, stage: stage.id, round: index + 1 } })),
      ),
    ).flat(),
  );
}

const firstUsedPlace = (procedure: ProcedureDocument, hole: HoleId): string | null => {
  const type = procedure.fasteners.find(({ id }) => id === procedure.holes.find((one) => one.id === hole)?.fastener);
  if (!type || type.reuse.kind === 'reusable') return null;
  if (type.reuse.usedFrom) return type.reuse.usedFrom;
  const places = placesOf(procedure, {}).filter(({ slot }) => slot.hole === hole);
  const first =
    places.find(({ stage }) => stage.kind === 'turn') ?? places.find(({ stage }) => stage.kind === 'torque');
  return first ? `${first.pass.id}/${first.stage.id}` : null;
};

/** Watches one walk of a whole procedure event by event. */
export class WalkOracle {
  private readonly fasteners = new Map<HoleId, Fastener>();
  private readonly readings = new Map<number, { data: ReadingTaken; hole: HoleId; key: string | null }>();
  private seen: number[] = [];
  /** Pulled, and the figure voided: not to be pulled before it is typed again or the fastener let go (R10). */
  private untyped: { hole: HoleId; key: string } | null = null;
  /** Begun and interrupted: only its own total or the stripe can say what it got (W9). */
  private readonly unfinished = new Map<HoleId, string>();

  constructor(
    private readonly procedure: ProcedureDocument,
    private readonly purpose: Purpose = 'finalAssembly',
    usedHoles: readonly HoleId[] = [],
  ) {
    for (const { id } of procedure.holes)
      this.fasteners.set(id, { given: new Map(), used: usedHoles.includes(id), present: true });
  }

  private fastener(hole: HoleId): Fastener {
    const found = this.fasteners.get(hole);
    if (!found) throw new Error(`no hole ${hole}`);
    return found;
  }

  /** Holds one step of the walk against what is physically true. */
  watch(before: WalkState, event: WalkEvent, after: WalkState): void {
    switch (event.type) {
      case 'reading.taken':
        this.readingTaken(before, event.seq, event.data, after);
        break;
      case 'reading.voided':
        this.readingVoided(event.data.reading);
        break;
      case 'deviation.noted':
        // "I cannot see it any more": settled by letting the fastener go.
        if (event.data.kind === 'differentUnknown' && this.untyped?.hole === event.data.hole) this.untyped = null;
        break;
      case 'stage.done':
        this.inOrder(before, event.data);
        this.give(event.data.hole, keyOf(event.data), { seq: event.seq, turned: null });
        break;
      case 'walk.resumed':
        this.resumed(before, event.data);
        break;
      case 'fastener.loosened':
        this.loosened(before, event.data.hole);
        break;
      case 'fastener.removed':
        expect(this.fastener(event.data.hole).present).toBe(true);
        this.fastener(event.data.hole).present = false;
        break;
      case 'fastener.fitted':
        this.fitted(event.data);
        break;
      default:
        break;
    }
    this.nothingLost(before, event, after);
  }

  /** Into an empty hole, and a used single-use fastener never again (R3). */
  private fitted({ hole, part }: FastenerFitted): void {
    const fastener = this.fastener(hole);
    expect(fastener.present).toBe(false);
    expect(fastener.given.size, 'nothing counts for what is only being fitted').toBe(0);
    fastener.present = true;
    if (part === 'new') fastener.used = false;
    else if (this.isSingleUse(hole) && this.purpose === 'finalAssembly') expect(fastener.used).toBe(false);
  }

  private isSingleUse(hole: HoleId): boolean {
    const id = this.procedure.holes.find((one) => one.id === hole)?.fastener;
    return this.procedure.fasteners.find((type) => type.id === id)?.reuse.kind === 'singleUse';
  }

  private give(hole: HoleId, key: string, given: Given): void {
    const all = this.fastener(hole).given;
    all.set(key, [...(all.get(key) ?? []), given]);
  }

  private resumed(before: WalkState, { begun, way, at }: WalkResumed): void {
    if (begun === 'notBegun' || !at || (way !== 'ownTotal' && way !== 'stripe')) return;
    this.unfinished.set(at.hole, keyOf({ ...at, round: before.rounds[at.pass] ?? 1 }));
  }

  /** A pull whose figure is not known yet never gets another on top. */
  private nothingUnknown(data: ReadingTaken): void {
    const key = keyOf(data);
    if (this.untyped) {
      expect(data.retype, 'typed again before anything is pulled').toBe(true);
      expect({ hole: data.hole, key }).toEqual(this.untyped);
    } else expect(data.retype ?? false).toBe(false);
    this.untyped = null;
    if (data.retype) return;
    const empty = [...this.fasteners].filter(([, { present }]) => !present).map(([id]) => id);
    expect(empty, 'nothing is tightened while a hole is empty').toEqual([]);
    if (this.unfinished.get(data.hole) !== key) return;
    expect(data.shows === 'total' || data.source === 'marked', 'what was begun is told whole').toBe(true);
    this.unfinished.delete(data.hole);
  }

  /** No place before this one is open: not at this hole (R2), nor at any other that is not held (no hole skipped). */
  private inOrder(before: WalkState, slot: SlotRef): void {
    const places = placesOf(this.procedure, before.rounds);
    const here = places.findIndex((place) => place.slot.hole === slot.hole && keyOf(place.slot) === keyOf(slot));
    expect(here, `${keyOf(slot)} at ${slot.hole} is a place of this walk`).toBeGreaterThanOrEqual(0);
    for (const { slot: earlier } of places.slice(0, here)) {
      const held = before.deviations.some(({ status, hole }) => status === 'held' && hole === earlier.hole);
      const given = this.fastener(earlier.hole).given.has(keyOf(earlier));
      expect(given || held, `${keyOf(earlier)} at ${earlier.hole} comes before ${keyOf(slot)} at ${slot.hole}`).toBe(
        true,
      );
    }
  }

  /** This hole had every earlier stage since it was last let go. */
  private earlierStagesGiven(before: WalkState, slot: SlotRef): void {
    const own = placesOf(this.procedure, before.rounds).filter((place) => place.slot.hole === slot.hole);
    const here = own.findIndex((place) => keyOf(place.slot) === keyOf(slot));
    for (const { slot: earlier } of own.slice(0, here)) {
      expect(this.fastener(slot.hole).given.has(keyOf(earlier)), `${keyOf(earlier)} before ${keyOf(slot)}`).toBe(true);
    }
  }

  private readingTaken(before: WalkState, seq: number, data: ReadingTaken, after: WalkState): void {
    const record = after.readings.find((reading) => reading.seq === seq);
    const slot = record?.countsFor ?? null;
    this.seen.push(seq);
    this.nothingUnknown(data);
    const about = after.deviations.filter((deviation) => deviation.reading === seq);
    this.markUsed(data);
    this.readings.set(seq, { data, hole: data.hole, key: slot && keyOf(slot) });
    if (!slot) {
      expect(about.some(({ kind }) => kind === 'earlierStageMissing' || kind === 'torqueAfterTurn')).toBe(true);
      return;
    }
    expect(slot.hole).toBe(data.hole);
    this.earlierStagesGiven(before, slot);
    const instructed = data.insteadOf === undefined;
    // Typed again is no pull: its place was asked for when it was pulled.
    if (instructed && !data.retype) this.inOrder(before, slot);
    if (!instructed) expect(about.some(({ kind }) => kind === 'outOfOrder')).toBe(true);
    const already = this.fastener(data.hole).given.get(keyOf(slot)) ?? [];
    if (already.length > 0 && instructed) {
      expect(before.holes[data.hole]?.slots[keyOf(slot)]?.status, 'pulled again only as an answer').toBe('partial');
    }
    this.addUp(slot, seq, data, already, after);
  }

  private addUp(slot: SlotRef, seq: number, data: ReadingTaken, already: Given[], after: WalkState): void {
    const isTurn = data.value.unit === 'deg';
    const figure = decimalToRational(data.value.value.replace('-', ''));
    const sum = already.at(-1)?.turned ?? rational(0n);
    // A wrench zeroed for pulling again knows nothing of what stands; the stripe shows it all.
    const whole = already.length === 0 || data.source === 'marked';
    const replaces = data.shows === 'total' && data.insteadOf === undefined && whole;
    const turned = !isTurn ? null : replaces ? figure : add(sum, figure);
    this.give(data.hole, keyOf(slot), { seq, turned });
    if (turned === null) return;
    const total = after.holes[data.hole]?.slots[keyOf(slot)]?.total;
    expect(total?.unit).toBe('deg');
    expect(compare(decimalToRational(total?.value ?? '0'), turned), 'turns add up').toBe(0);
    expect(data.total).toEqual(total);
  }

  private markUsed(data: ReadingTaken): void {
    const from = firstUsedPlace(this.procedure, data.hole);
    const own = placesOf(this.procedure, {}).filter(({ slot }) => slot.hole === data.hole);
    const index = (key: string): number => own.findIndex(({ slot }) => `${slot.pass}/${slot.stage}` === key);
    if (from !== null && index(`${data.pass}/${data.stage}`) >= index(from)) this.fastener(data.hole).used = true;
  }

  private readingVoided(seq: number): void {
    const reading = this.readings.get(seq);
    if (reading) this.untyped = { hole: reading.hole, key: keyOf(reading.data) };
    if (!reading?.key) return;
    const given = this.fastener(reading.hole).given;
    const left = (given.get(reading.key) ?? []).filter((one) => one.seq !== seq);
    if (left.length > 0) given.set(reading.key, left);
    else given.delete(reading.key);
  }

  private loosened(before: WalkState, hole: HoleId): void {
    const rework = before.reworks[0];
    if (rework?.kind === 'hole' && rework.way === 'quarter') {
      const slot = before.deviations.find(({ id }) => id === rework.deviation)?.slot;
      if (slot) this.fastener(hole).given.delete(keyOf(slot));
      return;
    }
    if (rework?.kind === 'joint' && rework.round === 1) return;
    this.fastener(hole).given.clear();
    this.unfinished.delete(hole);
    if (this.untyped?.hole === hole) this.untyped = null;
    if (rework?.kind !== 'hole') return;
    // R12: the others may have relaxed, so a repeated pass begins again after its first round.
    for (const pass of this.procedure.passes.filter(({ repeat, order }) => repeat && order.includes(hole))) {
      for (const fastener of this.fasteners.values()) {
        for (const key of fastener.given.keys()) {
          if (key.startsWith(`${pass.id}/`) && !key.endsWith('/1')) fastener.given.delete(key);
        }
      }
    }
  }

  /** I: readings, deviations, decisions, steps' events: nothing that was recorded goes away. */
  private nothingLost(before: WalkState, event: WalkEvent, after: WalkState): void {
    expect(after.seq).toBe(event.seq);
    const taken = after.readings.filter(({ status }) => status !== 'elsewhere').map(({ seq }) => seq);
    expect(taken).toEqual(this.seen);
    for (const { seq, data } of after.readings) {
      const known = this.readings.get(seq);
      if (known) expect(data).toEqual(known.data);
    }
    const ids = new Set(after.deviations.map(({ id }) => id));
    expect(ids.size).toBe(after.deviations.length);
    for (const deviation of before.deviations) {
      const now = after.deviations.find(({ id }) => id === deviation.id);
      expect(now?.settlings.slice(0, deviation.settlings.length)).toEqual(deviation.settlings);
    }
    expect(after.signatures.length).toBeGreaterThanOrEqual(before.signatures.length);
  }

  /** At the end every place was given at the fastener that is in the hole. */
  finished(state: WalkState): void {
    for (const { slot } of placesOf(this.procedure, state.rounds)) {
      expect(this.fastener(slot.hole).given.has(keyOf(slot)), `${keyOf(slot)} at ${slot.hole}`).toBe(true);
      const outcome = state.holes[slot.hole]?.slots[keyOf(slot)];
      expect(['done', 'accepted']).toContain(outcome?.status);
    }
    expect(state.deviations.filter(({ status }) => status === 'open' || status === 'held')).toEqual([]);
    expect(state.reworks).toEqual([]);
  }
}

/** Freezes a state through and through: whoever would change it afterwards throws. */
export function deepFreeze<T>(value: T): T {
  if (typeof value !== 'object' || value === null || Object.isFrozen(value)) return value;
  Object.freeze(value);
  for (const member of Object.values(value)) deepFreeze(member);
  return value;
}
