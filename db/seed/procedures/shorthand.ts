import type { Pass, Step } from '@shared/procedure/procedure';
import type { Unit } from '@shared/quantity/unit';
import type { Window } from '@shared/quantity/window';

/** A window in one line: target, low, high. */
export const windowOf = (target: string, low: string, high: string, unit: Unit): Window => ({
  target,
  low,
  high,
  unit,
});

/** The page that allows one fastener to be taken again (R6). */
export const oneFastener = (page: string): Pass['rework'] => ({ allows: 'oneFastener', cite: { page } });

/** Steps that each hole asks for before its fastener goes in (W2): oil the bolt, never the hole. */
export const holeSteps = (lubricate: string | null): Step[] => [
  {
    id: 'blown',
    place: { at: 'beforeHole' },
    kind: 'do',
    text: 'Hole blown out under a rag, dry to the bottom',
    caution: 'eyes',
  },
  { id: 'chased', place: { at: 'beforeHole' }, kind: 'do', text: 'Thread cleaned with a chaser, not a tap' },
  ...(lubricate === null
    ? []
    : [{ id: 'oiled', place: { at: 'beforeHole' }, kind: 'do', text: lubricate } satisfies Step]),
  { id: 'runsIn', place: { at: 'beforeHole' }, kind: 'do', text: 'Runs in by hand to the seat' },
];

/** Every source of the demo says that it is made up: nobody shall tighten an engine by these figures. */
export const inventedManual = (engine: string, page: string) => ({
  title: `${engine} workshop manual (invented for the demo)`,
  page,
  date: '2026-03-03',
});
