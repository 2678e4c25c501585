import { compareQuantities } from '../quantity/quantity';
import { unitKind, type UnitKind } from '../quantity/unit';
import { windowProblem, type Window, type WindowProblem } from '../quantity/window';
import type { FastenerType, GroupId, HoleId, Pass, ProcedureDocument, Stage, TurnStage } from './procedure';
import type { ProcedureProblem, ProcedureProblemCode } from './procedureProblem';

const windowCodes: Readonly<Record<WindowProblem, ProcedureProblemCode>> = {
  malformed: 'windowMalformed',
  notPositive: 'windowNotPositive',
  limitsCross: 'windowLimitsCross',
  noWidth: 'windowNoWidth',
  targetOutside: 'windowTargetOutside',
};

const problem = (code: ProcedureProblemCode, path: string, about?: string): ProcedureProblem =>
  about === undefined ? { code, path } : { code, path, about };

function repeats(values: readonly string[], code: ProcedureProblemCode, path: string): ProcedureProblem[] {
  return values.flatMap((value, index) =>
    values.indexOf(value) === index ? [] : [problem(code, `${path}.${index}`, value)],
  );
}

function windowProblems(window: Window, kind: UnitKind, path: string): ProcedureProblem[] {
  if (unitKind(window.unit) !== kind) return [problem('windowWrongUnit', path, window.unit)];
  const wrong = windowProblem(window);
  return wrong ? [problem(windowCodes[wrong], path)] : [];
}

const groupsOf = (document: ProcedureDocument, order: readonly HoleId[]): GroupId[] => [
  ...new Set(document.holes.filter((hole) => order.includes(hole.id)).map((hole) => hole.group)),
];

interface Windows {
  windows: Readonly<Record<GroupId, Window>>;
  kind: UnitKind;
  /** Every group whose holes take the stage needs one. */
  forAll: boolean;
  path: string;
}

function groupWindowProblems(document: ProcedureDocument, pass: Pass, given: Windows): ProcedureProblem[] {
  const known = document.groups.map((group) => group.id);
  const missing = given.forAll ? groupsOf(document, pass.order).filter((group) => !given.windows[group]) : [];
  return [
    ...missing.map((group) => problem('windowMissing', given.path, group)),
    ...Object.entries(given.windows).flatMap(([group, window]) =>
      known.includes(group)
        ? windowProblems(window, given.kind, `${given.path}.${group}`)
        : [problem('groupUnknown', `${given.path}.${group}`, group)],
    ),
  ];
}

function endTorqueProblems(
  document: ProcedureDocument,
  pass: Pass,
  stage: TurnStage,
  path: string,
): ProcedureProblem[] {
  const { use, windows } = stage.endTorque;
  const monitors = Object.entries(stage.monitor ?? {}).flatMap(([group, { low, high, unit }]) => {
    const at = `${path}.monitor.${group}`;
    if (!document.groups.some(({ id }) => id === group)) return [problem('groupUnknown', at, group)];
    if (unitKind(unit) !== 'torque') return [problem('windowWrongUnit', at, unit)];
    const rising = compareQuantities({ value: low, unit }, { value: high, unit }) < 0;
    return rising ? [] : [problem('monitorLimitsCross', at)];
  });
  if (!windows) return monitors;
  const at = `${path}.endTorque.windows`;
  const unused = use === 'unused' ? [problem('endTorqueUnused', at)] : [];
  const own = groupWindowProblems(document, pass, { windows, kind: 'torque', forAll: false, path: at });
  return [...monitors, ...unused, ...own];
}

function stageProblems(document: ProcedureDocument, pass: Pass, stage: Stage, path: string): ProcedureProblem[] {
  const given = { forAll: true, path: `${path}.windows` };
  switch (stage.kind) {
    case 'torque':
      return groupWindowProblems(document, pass, { ...given, windows: stage.windows, kind: 'torque' });
    case 'turn':
      return [
        ...groupWindowProblems(document, pass, { ...given, windows: stage.windows, kind: 'angle' }),
        ...endTorqueProblems(document, pass, stage, path),
      ];
    case 'check':
      return stage.windows
        ? groupWindowProblems(document, pass, { ...given, windows: stage.windows, kind: 'torque' })
        : [];
    default:
      return [];
  }
}

const turns = (pass: Pass, hole?: HoleId): boolean =>
  (hole === undefined || pass.order.includes(hole)) && pass.stages.some((stage) => stage.kind === 'turn');

/** R12: rounds until none turns are torque, and neither they nor a check by torque follow a turn. */
function afterTurnProblems(document: ProcedureDocument, pass: Pass, index: number): ProcedureProblem[] {
  const path = `passes.${index}`;
  const earlier = document.passes.slice(0, index);
  const turned = pass.order.some((hole) => earlier.some((before) => turns(before, hole)));
  const found: ProcedureProblem[] = [];
  if (pass.repeat && pass.stages.some((stage) => stage.kind !== 'torque'))
    found.push(problem('repeatNotTorque', path, pass.id));
  if (pass.repeat && (turned || turns(pass))) found.push(problem('repeatAfterTurn', path, pass.id));
  const silent = pass.rework.cite === 'manualSilent';
  pass.stages.forEach((stage, at) => {
    const byTorque = stage.kind === 'check' && stage.check !== 'witnessMark';
    const after = turned || pass.stages.slice(0, at).some((before) => before.kind === 'turn');
    if (byTorque && after && silent) found.push(problem('checkAfterTurn', `${path}.stages.${at}`, stage.id));
  });
  return found;
}

function passProblems(document: ProcedureDocument, pass: Pass, index: number): ProcedureProblem[] {
  const path = `passes.${index}`;
  return [
    ...orderProblems(document, pass.order, `${path}.order`),
    ...repeats(
      pass.stages.map(({ id }) => id),
      'idRepeats',
      `${path}.stages`,
    ),
    ...pass.stages.flatMap((stage, at) => stageProblems(document, pass, stage, `${path}.stages.${at}`)),
    ...afterTurnProblems(document, pass, index),
  ];
}

function orderProblems(document: ProcedureDocument, order: readonly HoleId[], path: string): ProcedureProblem[] {
  const known = new Set(document.holes.map((hole) => hole.id));
  const unknown = order.flatMap((hole, at) => (known.has(hole) ? [] : [problem('holeUnknown', `${path}.${at}`, hole)]));
  return [...unknown, ...repeats(order, 'holeRepeats', path)];
}

function looseningProblems(document: ProcedureDocument): ProcedureProblem[] {
  const { loosening, holes } = document;
  if (!loosening) return [];
  const missing = holes.filter((hole) => !loosening.includes(hole.id));
  return [
    ...orderProblems(document, loosening, 'loosening'),
    ...missing.map((hole) => problem('looseningIncomplete', 'loosening', hole.label)),
  ];
}

function holeProblems(document: ProcedureDocument): ProcedureProblem[] {
  const { holes, groups, fasteners, passes } = document;
  return holes.flatMap((hole, index) => {
    const path = `holes.${index}`;
    const twin = holes.slice(0, index).find((other) => other.x === hole.x && other.y === hole.y);
    return [
      ...(groups.some(({ id }) => id === hole.group) ? [] : [problem('groupUnknown', `${path}.group`, hole.group)]),
      ...(fasteners.some(({ id }) => id === hole.fastener)
        ? []
        : [problem('fastenerUnknown', `${path}.fastener`, hole.fastener)]),
      ...(twin ? [problem('holesOnOneSpot', path, hole.label)] : []),
      ...(passes.some((pass) => pass.order.includes(hole.id)) ? [] : [problem('holeInNoPass', path, hole.label)]),
    ];
  });
}

function usedFromProblems(document: ProcedureDocument, type: FastenerType, index: number): ProcedureProblem[] {
  const usedFrom = type.reuse.kind === 'reusable' ? undefined : type.reuse.usedFrom;
  if (usedFrom === undefined) return [];
  const path = `fasteners.${index}.reuse.usedFrom`;
  const pass = document.passes.find(({ id, stages }) => stages.some((stage) => `${id}/${stage.id}` === usedFrom));
  if (!pass) return [problem('usedFromUnknown', path, usedFrom)];
  const missed = document.holes.find((hole) => hole.fastener === type.id && !pass.order.includes(hole.id));
  return missed ? [problem('usedFromNotTaken', path, missed.label)] : [];
}

function stepProblems(document: ProcedureDocument): ProcedureProblem[] {
  return document.steps.flatMap((step, index) => {
    const path = `steps.${index}`;
    const { place } = step;
    const pass = 'pass' in place ? place.pass : undefined;
    const groups = place.at === 'beforeHole' ? (place.groups ?? []) : [];
    return [
      ...(pass === undefined || document.passes.some(({ id }) => id === pass)
        ? []
        : [problem('passUnknown', `${path}.place.pass`, pass)]),
      ...groups
        .filter((group) => !document.groups.some(({ id }) => id === group))
        .map((group) => problem('groupUnknown', `${path}.place.groups`, group)),
      ...(step.kind === 'measure' && !step.window ? [problem('measureWithoutWindow', path, step.id)] : []),
      ...(step.window ? windowProblems(step.window, unitKind(step.window.unit), `${path}.window`) : []),
    ];
  });
}

function idProblems(document: ProcedureDocument): ProcedureProblem[] {
  const ids = (list: readonly { id: string }[]): string[] => list.map(({ id }) => id);
  return [
    ...repeats(ids(document.holes), 'idRepeats', 'holes'),
    ...repeats(
      document.holes.map(({ label }) => label),
      'labelRepeats',
      'holes',
    ),
    ...repeats(ids(document.groups), 'idRepeats', 'groups'),
    ...repeats([...ids(document.fasteners), ...ids(document.parts)], 'idRepeats', 'fasteners'),
    ...repeats(ids(document.passes), 'idRepeats', 'passes'),
    ...repeats(ids(document.steps), 'idRepeats', 'steps'),
  ];
}

/**
 * Everything in a well-shaped document that contradicts itself (A1, A4, R3, R12): an order that is no permutation, a
 * group without a window, a window that is none, an id or label twice … Empty = the walk's rules can rely on it.
 */
export function procedureProblems(document: ProcedureDocument): ProcedureProblem[] {
  return [
    ...idProblems(document),
    ...holeProblems(document),
    ...document.passes.flatMap((pass, index) => passProblems(document, pass, index)),
    ...looseningProblems(document),
    ...document.fasteners.flatMap((type, index) => usedFromProblems(document, type, index)),
    ...stepProblems(document),
  ];
}
