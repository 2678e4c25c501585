import type { Choice, EventBody, Purpose, ReadingEntry, WalkEvent, WalkEventData } from '@shared/walk/events';
import type { WalkCommand } from '@shared/walk/commands';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { Role } from '@shared/people/roles';
import type { Refusal } from '@shared/walk/refusal';
import { decide } from '@shared/walk/decide';
import { evolve } from '@shared/walk/evolve';
import { instructionOf, type Instruction, type Now } from '@shared/walk/instruction';
import { initialWalk, type WalkState } from '@shared/walk/state';

const WINDOW = {
  p1: { target: '20', low: '19', high: '21', unit: 'N.m' },
  p2: { target: '40', low: '38', high: '42', unit: 'N.m' },
  p3: { target: '90', low: '85', high: '95', unit: 'deg' },
} as const;

/** Four bolts, 20 N·m, 40 N·m, +90°, single-use from the turn. Invented values. */
export const aHead = (change: Partial<ProcedureDocument> = {}): ProcedureDocument => ({
  schema: 1,
  code: 'TEST-4',
  title: 'Test head',
  engine: 'Invented',
  component: 'cylinderHead',
  source: { title: 'Invented manual', page: '12', date: '2026-01-01' },
  toleranceIsShops: false,
  map: { sides: {}, bores: [] },
  groups: [{ id: 'A', name: 'all' }],
  holes: ['1', '2', '3', '4'].map((label, index) => ({
    id: `h${label}`,
    label,
    x: index * 100,
    y: 0,
    group: 'A',
    fastener: 'bolt',
  })),
  fasteners: [
    {
      id: 'bolt',
      name: 'Head bolt',
      kind: 'bolt',
      thread: 'M11 × 1.5',
      hand: 'right',
      reuse: { kind: 'singleUse' },
      lubricant: null,
    },
  ],
  parts: [{ id: 'gasket', name: 'Gasket', count: 1, renewedOnRestart: true }],
  passes: [
    pass('p1', { id: 's', kind: 'torque', windows: { A: WINDOW.p1 } }),
    pass('p2', { id: 's', kind: 'torque', windows: { A: WINDOW.p2 } }),
    pass('p3', {
      id: 's',
      kind: 'turn',
      windows: { A: WINDOW.p3 },
      endTorque: { use: 'wanted', windows: { A: { target: '80', low: '60', high: '100', unit: 'N.m' } } },
    }),
  ],
  steps: [{ id: 'hole', place: { at: 'beforeHole' }, kind: 'do', text: 'Blow out' }],
  ...change,
});

/** One pass over the four bolts in the order of their labels. */
export const pass = (
  id: string,
  ...stages: ProcedureDocument['passes'][number]['stages']
): ProcedureDocument['passes'][number] => ({
  id,
  name: id,
  order: ['h1', 'h2', 'h3', 'h4'],
  stages,
  rework: { allows: 'oneFastener', cite: { page: '12' } },
});

/** A torque-angle wrench that suits everything in `aHead`. */
export const aWrench = (change: Partial<WrenchSnapshot> = {}): WrenchSnapshot => ({
  id: 'w3',
  tag: 'W-03',
  serial: 'T20-112',
  kind: 'torqueAngle',
  drive: '1/2 in',
  range: { low: '10', high: '200', unit: 'N.m' },
  unit: 'N.m',
  resolution: { torque: '0.1', angle: '1' },
  accuracy: { cw: '3', ccw: '4' },
  turnAccuracy: '2',
  due: { date: '2027-01-01', cycles: null },
  cycles: 0,
  state: 'inService',
  certificate: 'K-1',
  ...change,
});

const confirmed = { unit: true, peakHold: true, direction: true, zero: true, dueDate: true };

type Entry = Partial<ReadingEntry> & { torque?: string };

/** A walk in memory: commands go through `decide`, events through `evolve`; time moves five seconds a command. */
export class Walk {
  state: WalkState;
  readonly events: WalkEvent[] = [];
  boot = 'boot-1';
  by = 'tech';
  roles: Role[] = ['technician'];
  private seconds = 0;

  constructor(readonly procedure: ProcedureDocument = aHead()) {
    this.state = initialWalk(procedure, 'hash');
  }

  get now(): Now {
    return {
      at: new Date(Date.UTC(2026, 4, 1, 8, 0, this.seconds)).toISOString(),
      mono: this.seconds * 1000,
      boot: this.boot,
    };
  }

  get instruction(): Instruction {
    return instructionOf(this.state, this.now);
  }

  pass(minutes: number): this {
    this.seconds += minutes * 60;
    return this;
  }

  command<T extends WalkCommand['type']>(type: T, data: unknown): WalkCommand {
    this.seconds += 5;
    const { by, roles } = this;
    return { type, data, ...this.now, by, roles, tablet: 'tablet-1', known: 1 } as WalkCommand;
  }

  /** Tries a command; a refusal changes nothing. */
  tries(type: WalkCommand['type'], data: unknown, tablet = 'tablet-1'): Refusal | null {
    const command = { ...this.command(type, data), tablet };
    const result = decide(this.state, command);
    if (!result.ok) return result.error;
    this.apply(result.value, command);
    return null;
  }

  private apply(body: EventBody, { at, mono, boot, by, known, tablet }: WalkCommand): void {
    const event = { ...body, seq: this.state.seq + 1, branch: 0, at, mono, boot, by, known, tablet };
    this.events.push(event);
    this.state = evolve(this.state, event);
  }

  /** Does a command that must be allowed. */
  does<T extends WalkCommand['type']>(
    type: T,
    data: T extends keyof WalkEventData ? Partial<WalkEventData[T]> : never,
    tablet?: string,
  ): this {
    const refused = this.tries(type, data, tablet);
    if (refused) throw new Error(`${type} refused: ${JSON.stringify(refused)}`);
    return this;
  }

  as(by: string, ...roles: Role[]): this {
    this.by = by;
    this.roles = roles.length > 0 ? roles : ['technician'];
    return this;
  }

  opened(purpose: Purpose = 'finalAssembly', change: Partial<WalkEventData['walk.opened']> = {}): this {
    const { code } = this.procedure;
    return this.does('walk.opened', {
      job: 'j',
      joint: 'jj',
      purpose,
      procedure: { code, revision: 1, hash: 'hash' },
      pulls: 'tech',
      records: 'tech',
      policy: { judgement: 'simple', countersign: 'required', shopOfOne: false },
      rules: 1,
      earlier: { readingsTaken: false, usedHoles: [] },
      ...change,
    });
  }

  parts(part: string, count: number): this {
    return this.does('part.taken', { part, partNumber: 'PN', batch: 'B1', count });
  }

  /** Parts, steps and the wrench: ready for the first pull. */
  prepared(bolts = 4, wrench = aWrench()): this {
    if (this.procedure.parts.length > 0) this.parts('gasket', 1);
    if (bolts > 0) this.parts('bolt', bolts);
    this.stepsDone();
    return this.took(wrench);
  }

  stepsDone(): this {
    for (let { instruction } = this; instruction.kind === 'step'; { instruction } = this) {
      this.does('step.done', { step: instruction.step.id, hole: instruction.hole, answer: 'yes' });
    }
    return this;
  }

  took(wrench: WrenchSnapshot, change: Partial<WalkEventData['wrench.taken']> = {}): this {
    const turnShows = wrench.kind === 'torqueAngle' ? 'thisPull' : null;
    return this.does('wrench.taken', { wrench, how: 'scanned', confirmed, turnShows, ...change });
  }

  entry(value: string, more: Entry = {}): ReadingEntry {
    const { instruction } = this;
    if (instruction.kind !== 'pull') throw new Error(`no pull but ${instruction.kind}`);
    const turn = instruction.stage.kind === 'turn';
    const { torque, ...rest } = more;
    return {
      ...instruction.slot,
      source: instruction.mode === 'finishByStripe' ? 'marked' : 'typed',
      wrench: instruction.wrench,
      value: { value, unit: turn ? 'deg' : 'N.m' },
      pulls: 1,
      ...(turn ? { shows: instruction.mode.startsWith('finish') ? 'total' : 'thisPull' } : {}),
      ...(torque === undefined ? {} : { endTorque: { value: torque, unit: 'N.m' } }),
      ...(instruction.mode === 'retype' ? { retype: true } : {}),
      ...(instruction.pass.repeat ? { moved: false } : {}),
      ...rest,
    };
  }

  /** Takes a reading at the hole on the screen. */
  pulls(value: string, more: Entry = {}): this {
    return this.does('reading.taken', this.entry(value, more));
  }

  /** Walks on with good readings until `stop` says so, at most 400 pulls. */
  until(stop: (instruction: Instruction) => boolean): this {
    for (let turns = 0; turns < 400 && !stop(this.instruction); turns++) this.goodNext();
    return this;
  }

  private goodNext(): void {
    const { instruction } = this;
    if (instruction.kind === 'step') this.stepsDone();
    else if (instruction.kind === 'pull') {
      const aim = instruction.remaining ?? instruction.window;
      this.pulls(aim?.target ?? '10');
    } else if (instruction.kind === 'loosen')
      this.does('fastener.loosened', { hole: instruction.hole, round: instruction.round });
    else if (instruction.kind === 'remove')
      this.does('fastener.removed', { hole: instruction.hole, looked: { thread: true, washer: true, hole: true } });
    else if (instruction.kind === 'fit')
      this.does('fastener.fitted', {
        hole: instruction.hole,
        part: instruction.part === 'new' ? 'new' : 'same',
        ranIn: true,
      });
    else if (instruction.kind === 'parts')
      for (const { part, need, have } of instruction.missing) this.parts(part, need - have);
    else throw new Error(`stuck at ${instruction.kind}`);
  }

  /** To the hole of a pass. */
  to(passId: string, hole: string): this {
    return this.until(
      (now) => now.kind === 'pull' && now.slot.pass === passId && now.slot.hole === hole && now.mode === 'fresh',
    );
  }

  settles(choice: Choice, reason = '', more: { seal?: string } = {}): this {
    const { instruction } = this;
    const open =
      instruction.kind === 'settle'
        ? instruction.deviation
        : this.state.deviations.find(({ status }) => status === 'held');
    return this.does('deviation.settled', { deviation: open?.id ?? '', choice, reason, ...more });
  }

  /** Choices of the open deviation. */
  get offered(): Choice[] {
    return this.instruction.kind === 'settle' ? this.instruction.offers.offered : [];
  }

  /** Where the instruction points: `p2/h3`, or the kind. */
  get where(): string {
    const { instruction } = this;
    return 'slot' in instruction && instruction.slot
      ? `${instruction.slot.pass}/${instruction.slot.hole}`
      : instruction.kind;
  }

  kinds(status?: string): string[] {
    return this.state.deviations
      .filter((deviation) => status === undefined || deviation.status === status)
      .map(({ kind }) => kind);
  }

  total(passId: string, hole: string, round = 1): string | undefined {
    return this.state.holes[hole]?.slots[`${passId}/s/${round}`]?.total?.value;
  }
}

/** A walk that is opened and prepared. */
export const aWalk = (procedure?: ProcedureDocument): Walk => new Walk(procedure).opened().prepared();
