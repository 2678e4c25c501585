import type { HeadState } from '../geometry/heads';
import type { MapSpec } from '../geometry/layout';
import { formatDecimal } from '../quantity/format';
import { marginTo } from '../quantity/window';
import type { ProofDocument } from './proofDocument';
import type { ProofDeviation, ProofHead } from './sheet';

/** The joint as its author drew it, for the layout of the map (A1). */
export function proofMapSpec({ procedure }: ProofDocument): MapSpec {
  const { map, holes } = procedure.document;
  return {
    holes: holes.map(({ id, label, x, y, group }) => ({ id, label, x, y, group })),
    sides: map.sides,
    bores: map.bores,
    ...(map.outline ? { outline: map.outline } : {}),
  };
}

/** How far past its limit it was: `+9°`, `−6°`; nothing where it has no value. */
function marginText({ found }: ProofDeviation): string {
  const { value, window } = found.params ?? {};
  if (typeof value !== 'object' || typeof window !== 'object') return '';
  if (!('quantity' in value) || !('window' in window) || value.quantity.unit !== window.window.unit) return '';
  const margin = marginTo(value.quantity, { ...window.window, target: window.window.low });
  const figure = formatDecimal(margin.value, 'en') + (margin.unit === 'deg' ? '°' : '');
  return margin.value.startsWith('-') ? figure : `+${figure}`;
}

/** An accepted deviation stays on the map as an outlined pennant: it was taken, not undone. */
function flagOf(deviations: readonly ProofDeviation[], hole: string): HeadState['flag'] {
  const accepted = deviations.find(
    ({ place, settlings }) =>
      place.hole === hole && settlings.some(({ choice, stands }) => stands && choice === 'accept'),
  );
  if (!accepted) return undefined;
  if (accepted.kind === 'lookAgain') return { kind: 'lookAgain', text: '?' };
  const under = accepted.kind === 'under' || accepted.kind === 'endTorqueUnder';
  return { kind: under ? 'under' : 'over', text: marginText(accepted) };
}

/** Accepted in any pass: it stays so on the map, whatever came after. */
function fillOf({ outcome }: ProofHead, flagged: boolean): HeadState['fill'] {
  if (flagged) return 'accepted';
  return outcome === 'other' ? 'todo' : outcome;
}

/** One head of the map as the walk left it. `renewed` is the tag of a fastener that took another's place (*new*). */
export function proofHeadState(document: ProofDocument, hole: string, renewed: string): HeadState {
  const head = document.sheet.heads.find((candidate) => candidate.hole === hole);
  const group = document.procedure.document.holes.find((candidate) => candidate.id === hole)?.group ?? 'A';
  if (!head) {
    return { fill: 'todo', hasTick: false, stripeDeg: null, passDeg: null, earlierDeg: 0, now: false, group };
  }
  const { passTurn, earlierTurn, ccw, fastenerNo } = head;
  const flag = flagOf(document.sheet.deviations, hole);
  return {
    fill: fillOf(head, flag !== undefined),
    hasTick: true,
    stripeDeg: earlierTurn + (passTurn ?? 0),
    passDeg: passTurn,
    earlierDeg: earlierTurn,
    ccw,
    now: false,
    group,
    ...(flag ? { flag } : {}),
    ...(fastenerNo > 1 ? { tag: renewed } : {}),
  };
}
