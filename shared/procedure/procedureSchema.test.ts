import { describe, expect, it } from 'vitest';
import type { ProcedureDocument } from './procedure';
import type { ProcedureProblemCode } from './procedureProblem';
import { parseProcedure } from './procedureSchema';

const torque = (target = '30', low = '28', high = '32', unit = 'N.m') => ({ target, low, high, unit });
const turn = { target: '90', low: '85', high: '95', unit: 'deg' };

const base = (): ProcedureDocument =>
  ({
    schema: 1,
    code: 'TEST-1',
    title: 'A joint',
    engine: 'Ossery D6',
    component: 'Joint',
    source: { title: 'Manual', page: '1', date: '2026-03-03' },
    toleranceIsShops: false,
    map: { sides: { top: 'intake side' }, bores: [{ x: 5, y: 0, r: 3, label: 'cyl 1' }] },
    groups: [
      { id: 'A', name: 'inner' },
      { id: 'B', name: 'outer' },
    ],
    holes: [
      { id: 'h1', label: '1', x: 0, y: 0, group: 'A', fastener: 'bolt' },
      { id: 'h2', label: '2', x: 10, y: 0, group: 'B', fastener: 'bolt' },
    ],
    fasteners: [
      {
        id: 'bolt',
        name: 'Bolt',
        kind: 'bolt',
        thread: 'M10 × 1.5',
        hand: 'right',
        reuse: { kind: 'singleUse', usedFrom: 'p2/s1' },
        lubricant: null,
      },
    ],
    parts: [{ id: 'gasket', name: 'Gasket', count: 1, renewedOnRestart: true }],
    passes: [
      {
        id: 'p1',
        name: '30 N·m',
        order: ['h1', 'h2'],
        rework: { allows: 'oneFastener', cite: { page: '1' } },
        stages: [{ id: 's1', kind: 'torque', windows: { A: torque(), B: torque() } }],
      },
      {
        id: 'p2',
        name: 'turn',
        order: ['h2', 'h1'],
        rework: { allows: 'joint', cite: 'manualSilent' },
        stages: [{ id: 's1', kind: 'turn', windows: { A: turn, B: turn }, endTorque: { use: 'unused' } }],
      },
    ],
    steps: [{ id: 'clean', place: { at: 'beforeJoint' }, kind: 'do', text: 'Clean' }],
    loosening: ['h2', 'h1'],
  }) as ProcedureDocument;

type Change = (document: ReturnType<typeof loose>) => void;
/** The same document without its type: mistakes are what this test is about. */
const loose = () => structuredClone(base()) as unknown as LooseDocument;
interface LooseDocument {
  [member: string]: unknown;
  holes: Record<string, unknown>[];
  groups: Record<string, unknown>[];
  fasteners: { reuse: unknown; [member: string]: unknown }[];
  parts: Record<string, unknown>[];
  passes: { order: string[]; stages: LooseStage[]; [member: string]: unknown }[];
  steps: Record<string, unknown>[];
}
interface LooseStage {
  windows: Record<string, unknown>;
  [member: string]: unknown;
}

const problemsOf = (change: Change) => {
  const document = loose();
  change(document);
  const parsed = parseProcedure(document);
  return parsed.ok ? [] : parsed.error;
};

const at = <T>(list: T[], index: number): T => {
  const found = list[index];
  if (found === undefined) throw new Error(`nothing at ${index}`);
  return found;
};
const stage = (document: LooseDocument, pass: number): LooseStage => at(at(document.passes, pass).stages, 0);

it('accepts a sound document and gives it back unchanged', () => {
  expect(parseProcedure(base())).toEqual({ ok: true, value: base() });
});

describe('contradictions, each by its own code', () => {
  it.each<[ProcedureProblemCode, string, Change]>([
    ['holeRepeats', 'passes.0.order.1', (d) => (at(d.passes, 0).order = ['h1', 'h1'])],
    ['holeUnknown', 'passes.0.order.1', (d) => (at(d.passes, 0).order = ['h1', 'h9'])],
    ['holeInNoPass', 'holes.1', (d) => d.passes.forEach((pass) => (pass.order = ['h1']))],
    ['looseningIncomplete', 'loosening', (d) => (d.loosening = ['h1'])],
    ['holeRepeats', 'loosening.2', (d) => (d.loosening = ['h1', 'h2', 'h1'])],
    ['labelRepeats', 'holes.1', (d) => (at(d.holes, 1).label = '1')],
    ['idRepeats', 'holes.1', (d) => (at(d.holes, 1).id = 'h1')],
    ['holesOnOneSpot', 'holes.1', (d) => (at(d.holes, 1).x = 0)],
    ['groupUnknown', 'holes.1.group', (d) => (at(d.holes, 1).group = 'Z')],
    ['fastenerUnknown', 'holes.1.fastener', (d) => (at(d.holes, 1).fastener = 'stud')],
    ['windowMissing', 'passes.0.stages.0.windows', (d) => delete stage(d, 0).windows.B],
    ['groupUnknown', 'passes.0.stages.0.windows.Z', (d) => (stage(d, 0).windows.Z = torque())],
    ['windowWrongUnit', 'passes.0.stages.0.windows.A', (d) => (stage(d, 0).windows.A = turn)],
    ['windowWrongUnit', 'passes.1.stages.0.windows.A', (d) => (stage(d, 1).windows.A = torque())],
    ['windowLimitsCross', 'passes.0.stages.0.windows.A', (d) => (stage(d, 0).windows.A = torque('30', '32', '28'))],
    ['windowNoWidth', 'passes.0.stages.0.windows.A', (d) => (stage(d, 0).windows.A = torque('30', '30.0', '30'))],
    ['windowTargetOutside', 'passes.0.stages.0.windows.A', (d) => (stage(d, 0).windows.A = torque('33'))],
    ['windowNotPositive', 'passes.0.stages.0.windows.A', (d) => (stage(d, 0).windows.A = torque('30', '0'))],
    ['endTorqueUnused', 'passes.1.stages.0.endTorque.windows', (d) => (stage(d, 1).endTorque = { use: 'unused', windows: { A: torque() } })],
    ['monitorLimitsCross', 'passes.1.stages.0.monitor.A', (d) => (stage(d, 1).monitor = { A: { low: '140', high: '105', unit: 'N.m' } })],
    ['windowWrongUnit', 'passes.1.stages.0.monitor.A', (d) => (stage(d, 1).monitor = { A: { low: '1', high: '2', unit: 'mm' } })],
    ['repeatNotTorque', 'passes.1', (d) => (at(d.passes, 1).repeat = { mostRounds: 5 })],
    ['usedFromUnknown', 'fasteners.0.reuse.usedFrom', (d) => (at(d.fasteners, 0).reuse = { kind: 'singleUse', usedFrom: 'p9/s1' })],
    ['usedFromNotTaken', 'fasteners.0.reuse.usedFrom', (d) => (at(d.passes, 1).order = ['h1'])],
    ['passUnknown', 'steps.0.place.pass', (d) => (at(d.steps, 0).place = { at: 'afterPass', pass: 'p9' })],
    ['groupUnknown', 'steps.0.place.groups', (d) => (at(d.steps, 0).place = { at: 'beforeHole', groups: ['Z'] })],
    ['measureWithoutWindow', 'steps.0', (d) => (at(d.steps, 0).kind = 'measure')],
    ['idRepeats', 'fasteners.1', (d) => (at(d.parts, 0).id = 'bolt')],
    ['idRepeats', 'passes.1', (d) => (at(d.passes, 1).id = 'p1')],
  ])('%s at %s', (code, path, change) => {
    expect(problemsOf(change)).toContainEqual(expect.objectContaining({ code, path }));
  }); // prettier-ignore

  it('knows rounds and checks by torque after a turn (R12)', () => {
    const afterTurn = (more: object) => (document: LooseDocument) => {
      document.passes.push({ ...at(document.passes, 0), id: 'p3', ...more });
    };
    expect(problemsOf(afterTurn({ repeat: { mostRounds: 5 } }))).toEqual([
      { code: 'repeatAfterTurn', path: 'passes.2', about: 'p3' },
    ]);
    const check = { stages: [{ id: 'c1', kind: 'check', check: 'firstMovement' }] };
    expect(problemsOf(afterTurn(check))).toEqual([]);
    const silent = { ...check, rework: { allows: 'joint', cite: 'manualSilent' } };
    expect(problemsOf(afterTurn(silent))).toEqual([{ code: 'checkAfterTurn', path: 'passes.2.stages.0', about: 'c1' }]);
    const byEye = { ...silent, stages: [{ id: 'c1', kind: 'check', check: 'witnessMark' }] };
    expect(problemsOf(afterTurn(byEye))).toEqual([]);
  });
});

describe('shape', () => {
  it.each<[string, Change]>([
    ['schema', (d) => (d.schema = 2)],
    ['more', (d) => (d.more = 1)],
    ['code', (d) => (d.code = 'head d6')],
    ['title', (d) => (d.title = '')],
    ['title', (d) => (d.title = 'a\u0000')],
    ['title', (d) => (d.title = '\ud800')],
    ['holes.0.x', (d) => (at(d.holes, 0).x = Number.NaN)],
    ['holes.0.id', (d) => (at(d.holes, 0).id = 'h1@x')],
    ['passes.0.id', (d) => (at(d.passes, 0).id = 'p/1')],
    ['passes.0.order', (d) => (at(d.passes, 0).order = [])],
    ['passes.0.rework', (d) => delete at(d.passes, 0).rework],
    ['passes.0.repeat.mostRounds', (d) => (at(d.passes, 0).repeat = { mostRounds: 0 })],
    ['passes.0.stages.0.windows.A.low', (d) => (stage(d, 0).windows.A = torque('30', '2O'))],
    ['passes.0.stages.0.kind', (d) => (stage(d, 0).kind = 'hammer')],
    ['holes', (d) => (d.holes = Array.from({ length: 401 }, (_, i) => ({ ...at(d.holes, 0), id: `h${i}`, label: `${i}`, x: i })))],
  ])('%s', (path, change) => {
    const problems = problemsOf(change);
    expect(problems.length).toBeGreaterThan(0);
    expect(problems.every(({ code }) => code === 'badShape')).toBe(true);
    expect(problems.some((problem) => problem.path === path || path === 'more')).toBe(true);
  }); // prettier-ignore

  it.each([null, 3, 'x', [], {}])('refuses %j', (value) => {
    expect(parseProcedure(value)).toMatchObject({ ok: false });
  });
});
