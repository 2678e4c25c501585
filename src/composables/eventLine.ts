import type { Verdict } from '@shared/judge/verdict';
import type { Quantity } from '@shared/quantity/quantity';
import type { WalkEvent } from '@shared/walk/events';
import { labelOf, walkPasses } from '@shared/walk/slots';
import type { WalkState } from '@shared/walk/state';

/** One event as a line: what happened is said by its type, the rest are the particulars it carries. */
export interface EventLine {
  seq: number;
  type: WalkEvent['type'];
  at: string;
  by: string;
  tablet: string;
  label: string | null;
  pass: number | null;
  value: Quantity | null;
  verdict: Verdict | null;
  /** What somebody wrote: a reason, a note, a batch. */
  text: string;
}

type Loose = Record<string, unknown>;

const isQuantity = (value: unknown): value is Quantity =>
  typeof value === 'object' && value !== null && 'unit' in value;
const textOf = (data: Loose): string =>
  ['reason', 'note', 'text', 'caption', 'how', 'batch']
    .map((name) => data[name])
    .filter((value): value is string => typeof value === 'string' && value !== '')
    .join(' · ');

function moreOf(event: WalkEvent, state: WalkState): string {
  switch (event.type) {
    case 'step.done':
      return state.procedure.steps.find(({ id }) => id === event.data.step)?.text ?? event.data.step;
    case 'wrench.taken':
      return event.data.wrench.tag;
    case 'part.taken': {
      const { fasteners, parts } = state.procedure;
      const name = [...fasteners, ...parts].find(({ id }) => id === event.data.part)?.name ?? event.data.part;
      return `${event.data.count} × ${name}, ${event.data.batch}`;
    }
    case 'walk.sentBack':
      return event.data.items.map(({ note }) => note).join(' · ');
    default:
      return textOf(event.data as unknown as Loose);
  }
}

/** A line for every event, in the order of the chain. */
export function eventLines(events: readonly WalkEvent[], state: WalkState): EventLine[] {
  const passes = walkPasses(state).map(({ id }) => id);
  return events.map((event) => {
    const data = event.data as unknown as Loose;
    const pass = typeof data.pass === 'string' ? passes.indexOf(data.pass) + 1 : 0;
    return {
      seq: event.seq,
      type: event.type,
      at: event.at,
      by: event.by,
      tablet: event.tablet,
      label: typeof data.hole === 'string' ? labelOf(state.procedure, data.hole) : null,
      pass: pass > 0 ? pass : null,
      value: isQuantity(data.total) ? data.total : isQuantity(data.value) ? data.value : null,
      verdict: event.type === 'reading.taken' ? event.data.verdict : null,
      text: moreOf(event, state),
    };
  });
}
