import type { HeadFlag } from '@shared/geometry/headMarks';
import type { HeadFill, HeadState } from '@shared/geometry/heads';
import { formatDecimal } from '@shared/quantity/format';
import { marginTo } from '@shared/quantity/window';
import type { Deviation } from '@shared/walk/deviation';
import type { HoleView, WalkView } from '@shared/walk/view';
import type { ReadingRecord, WalkState } from '@shared/walk/state';
import type { Pass, Stage } from '@shared/procedure/procedure';
import { windowOf } from '@shared/walk/slots';

/** What the screen adds to what the walk says: the hole asked for, and the figure that is typed and not saved. */
export interface HeadsNow {
  hole: string | null;
  stage?: Stage | null;
  /** Turn of this pass at the hole if the figure is recorded. */
  pendingDeg?: number | null;
  words: { fresh: string; ordinal: (n: number) => string };
}

const isEnd = (deviation: Deviation): boolean => deviation.kind.startsWith('endTorque');

/** How far a reading is past its window, as the pennant shows it: `+9°`, `−4`. Empty where it is not past it. */
export function marginText(state: WalkState, deviation: Deviation): string {
  const record = state.readings.find((reading) => reading.seq === deviation.reading);
  const value = isEnd(deviation) ? record?.data.endTorque : record?.data.total;
  const window = isEnd(deviation) ? endWindow(state, record) : record?.data.window;
  if (!value || !window) return '';
  const { value: margin, unit } = marginTo(value, window);
  if (margin === '0') return '';
  const text = formatDecimal(margin, 'en');
  return `${margin.startsWith('-') ? '' : '+'}${text}${unit === 'deg' ? '°' : ''}`;
}

function endWindow(state: WalkState, record: ReadingRecord | undefined) {
  const stage = state.procedure.passes
    .find((pass) => pass.id === record?.data.pass)
    ?.stages.find(({ id }) => id === record?.data.stage);
  const group = state.procedure.holes.find((hole) => hole.id === record?.data.hole)?.group ?? '';
  return stage?.kind === 'turn' ? stage.endTorque.windows?.[group] : undefined;
}

const overKinds = new Set<Deviation['kind']>(['over', 'endTorqueOver']);
const underKinds = new Set<Deviation['kind']>(['under', 'endTorqueUnder']);

function fillOf(hole: HoleView): HeadFill {
  if (hole.interrupted) return 'unknown';
  switch (hole.outcome) {
    case 'out':
      return 'none';
    case 'todo':
      return hole.seated ? 'todo' : 'bare';
    case 'held':
    case 'off':
      if (hole.off && overKinds.has(hole.off.kind)) return 'over';
      return hole.off && underKinds.has(hole.off.kind) ? 'under' : 'lookAgain';
    default:
      return hole.outcome;
  }
}

function acceptedAt(view: WalkView, hole: string): Deviation | undefined {
  return view.deviations
    .filter((deviation) => deviation.hole === hole && deviation.settlings.at(-1)?.choice === 'accept')
    .at(-1);
}

function flagOf(state: WalkState, view: WalkView, hole: HoleView, fill: HeadFill): HeadFlag | undefined {
  const deviation = hole.off ?? (fill === 'accepted' ? acceptedAt(view, hole.id) : undefined);
  if (!deviation) return undefined;
  const text = marginText(state, deviation);
  if (overKinds.has(deviation.kind)) return { kind: 'over', text };
  if (underKinds.has(deviation.kind)) return { kind: 'under', text };
  return { kind: 'lookAgain', text: '' };
}

/** The place a hole really had in this pass: holes by the order of their first standing reading. */
function placeInPass(state: WalkState, pass: Pass | undefined, hole: string): number {
  const taken = state.readings.filter(
    (record) => record.status === 'stands' && record.countsFor !== null && record.countsFor.pass === pass?.id,
  );
  return [...new Set(taken.map((record) => record.data.hole))].indexOf(hole) + 1;
}

function tagOf(state: WalkState, hole: HoleView, pass: Pass | undefined, words: HeadsNow['words']): string | undefined {
  if (hole.fastenerNo === 2) return words.fresh;
  if (hole.fastenerNo > 2) return words.ordinal(hole.fastenerNo);
  const place = hole.outOfOrder ? placeInPass(state, pass, hole.id) : 0;
  return place > 0 ? words.ordinal(place) : undefined;
}

function headOf(state: WalkState, view: WalkView, hole: HoleView, now: HeadsNow): HeadState {
  const pass = view.passNow === null ? undefined : view.passes[view.passNow]?.pass;
  const isNow = hole.id === now.hole;
  const fill = fillOf(hole);
  const flag = flagOf(state, view, hole, fill);
  const tag = tagOf(state, hole, pass, now.words);
  const window = isNow && now.stage ? windowOf(state.procedure, now.stage, hole.id) : null;
  const turned = hole.passTurn !== 0;
  const pending = isNow && now.pendingDeg != null && Number.isFinite(now.pendingDeg) ? now.pendingDeg : null;
  return {
    fill,
    hasTick: true,
    stripeDeg: hole.seated ? hole.earlierTurn + hole.passTurn : null,
    passDeg: turned ? hole.passTurn : null,
    earlierDeg: hole.earlierTurn,
    ...(pending === null ? {} : { pendingDeg: pending }),
    ...(hole.direction === 'ccw' ? { ccw: true } : {}),
    pegs: window?.unit === 'deg' ? { lowDeg: Number(window.low), highDeg: Number(window.high) } : null,
    now: isNow,
    ...(flag ? { flag } : {}),
    ...(tag === undefined ? {} : { tag }),
    group: hole.group,
    ...(hole.behind ? { behind: hole.behind } : {}),
  };
}

/** What every head of the map shows, from the walk and from the figure on the screen. Pure. */
export function headStates(state: WalkState, view: WalkView, now: HeadsNow): Record<string, HeadState> {
  return Object.fromEntries(Object.values(view.holes).map((hole) => [hole.id, headOf(state, view, hole, now)]));
}
