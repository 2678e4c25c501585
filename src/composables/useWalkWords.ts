import { useI18n } from 'vue-i18n';
import type { FastenerType, HoleId, Pass, ProcedureDocument, Stage } from '@shared/procedure/procedure';
import type { Window } from '@shared/quantity/window';
import { holeById, labelOf } from '@shared/walk/slots';
import { useShownUnits, type ShownUnits } from './useShownUnits';
import { useWalkAccess } from './walkAccess';

/** The walk's own things in words: fasteners, stages, passes, wrenches, people. */
export interface WalkWords {
  /** "bolt 7", "el tornillo 7": inside a sentence. */
  bolt: (hole: HoleId) => string;
  /** "Bolt 7", "Tornillo 7": at the beginning of a line. */
  Bolt: (hole: HoleId) => string;
  /** "a new bolt", "un tornillo nuevo". */
  newBolt: (hole: HoleId) => string;
  noun: (hole: HoleId | null) => string;
  /** "bolts", "tuercas". */
  plural: (hole: HoleId | null) => string;
  /** "turn 90°", "30 N·m", "A 120, B 95 N·m". */
  stage: (stage: Stage) => string;
  /** The stage at one hole. */
  stageAt: (stage: Stage, hole: HoleId) => string;
  /** "turn 90°", or "60 N·m, turn 60°" where the stages follow one another at a hole. */
  pass: (pass: Pass) => string;
  wrench: (id: string | null) => string;
  person: (id: string) => string;
}

const kindsOf = (windows: Record<string, Window>): [string, Window][] => {
  const entries = Object.entries(windows);
  const same = entries.every(([, window]) => window.target === entries[0]?.[1].target);
  return same ? entries.slice(0, 1) : entries;
};

const windowsOf = (stage: Stage): Record<string, Window> => ('windows' in stage ? (stage.windows ?? {}) : {});

type Translate = ReturnType<typeof useI18n>['t'];

/** "90°", "A 120, B 95 N·m". */
function targetWords(windows: Record<string, Window>, units: ShownUnits): string {
  const kinds = kindsOf(windows).map(([group, window]) => ({ group, window: units.window(window) }));
  const last = kinds.at(-1);
  if (!last) return '';
  const quantity = units.quantity({ value: last.window.target, unit: last.window.unit }, last.window.unit);
  if (kinds.length === 1) return quantity;
  const figures = kinds.slice(0, -1).map(({ group, window }) => `${group} ${window.target}`);
  return [...figures, `${last.group} ${quantity}`].join(', ');
}

function stageWords(stage: Stage, windows: Record<string, Window>, t: Translate, units: ShownUnits): string {
  switch (stage.kind) {
    case 'torque':
      return targetWords(windows, units);
    case 'turn':
      return t('walk.stage.turn', { target: targetWords(windows, units) });
    case 'loosen':
      return t(`walk.stage.loosen.${stage.turn}`);
    case 'check':
      return t(`walk.stage.check.${stage.check}`);
    case 'runDown':
      return t('walk.stage.runDown');
  }
}

function kindAt(procedure: ProcedureDocument, hole: HoleId | null): FastenerType['kind'] {
  const id = (hole === null ? procedure.holes[0] : holeById(procedure, hole))?.fastener;
  return procedure.fasteners.find((type) => type.id === id)?.kind ?? 'bolt';
}

/** Names as screens say them. */
export function useWalkWords(): WalkWords {
  const walk = useWalkAccess();
  const { t } = useI18n();
  const units = useShownUnits();
  const named = (hole: HoleId, form: 'the' | 'title'): string =>
    t(`walk.noun.${kindAt(walk.state.procedure, hole)}.${form}`, { label: labelOf(walk.state.procedure, hole) });
  const noun = (hole: HoleId | null, form: 'fresh' | 'name' | 'many'): string =>
    t(`walk.noun.${kindAt(walk.state.procedure, hole)}.${form}`);
  const tagInCrib = (id: string): string => walk.wrenches.find((wrench) => wrench.id === id)?.snapshot.tag ?? id;
  return {
    bolt: (hole) => named(hole, 'the'),
    Bolt: (hole) => named(hole, 'title'),
    newBolt: (hole) => noun(hole, 'fresh'),
    noun: (hole) => noun(hole, 'name'),
    plural: (hole) => noun(hole, 'many'),
    stage: (stage) => stageWords(stage, windowsOf(stage), t, units),
    stageAt: (stage, hole) => {
      const group = holeById(walk.state.procedure, hole)?.group ?? '';
      const window = windowsOf(stage)[group];
      return stageWords(stage, window ? { [group]: window } : {}, t, units);
    },
    pass: (pass) =>
      pass.id === 'marks' || pass.id === 'strip'
        ? t(`walk.pass.${pass.id}`)
        : pass.stages.map((stage) => stageWords(stage, windowsOf(stage), t, units)).join(', '),
    wrench: (id) => (id === null ? '' : (walk.state.wrenches[id]?.wrench.tag ?? tagInCrib(id))),
    person: (id) => walk.people.find((person) => person.id === id)?.name ?? t('walk.unknownPerson'),
  };
}
