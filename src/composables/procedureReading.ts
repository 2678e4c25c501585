import type { HeadState } from '@shared/geometry/heads';
import type { Pass, ProcedureDocument, Stage, Step } from '@shared/procedure/procedure';
import type { Window } from '@shared/quantity/window';
import { labelOf } from '@shared/walk/slots';

/** Windows of a stage, groups that share one together. */
export interface StageWindow {
  groups: string[];
  window: Window;
}

const same = (a: Window, b: Window): boolean =>
  a.target === b.target && a.low === b.low && a.high === b.high && a.unit === b.unit;

function gathered(windows: Record<string, Window>): StageWindow[] {
  const found: StageWindow[] = [];
  for (const [group, window] of Object.entries(windows)) {
    const known = found.find((one) => same(one.window, window));
    if (known) known.groups.push(group);
    else found.push({ groups: [group], window });
  }
  return found;
}

/** What a stage aims at: empty where it takes no figure. */
export const windowsOfStage = (stage: Stage): StageWindow[] =>
  'windows' in stage && stage.windows ? gathered(stage.windows) : [];

/** Limits of the end torque of a turn, where the procedure gives any. */
export const endWindowsOf = (stage: Stage): StageWindow[] =>
  stage.kind === 'turn' && stage.endTorque.windows ? gathered(stage.endTorque.windows) : [];

/** The order of a pass as labels, `1 2 3 …`. */
export const orderOf = (procedure: ProcedureDocument, pass: Pass): string[] =>
  pass.order.map((hole) => labelOf(procedure, hole));

/** The steps of one place; those of holes name their groups. */
export function stepsAt(procedure: ProcedureDocument, at: Step['place']['at'], pass?: string): Step[] {
  return procedure.steps.filter(
    ({ place }) => place.at === at && (!('pass' in place) || pass === undefined || place.pass === pass),
  );
}

/** The map of a joint nobody has touched: bare heads with their groups' ticks. */
export const bareHeads = (procedure: ProcedureDocument): Record<string, HeadState> =>
  Object.fromEntries(
    procedure.holes.map(({ id, group }) => [
      id,
      { fill: 'bare', hasTick: true, stripeDeg: null, passDeg: null, earlierDeg: 0, now: false, group },
    ]),
  );
