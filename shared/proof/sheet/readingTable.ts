import { compareQuantities } from '../../quantity/quantity';
import type { Window } from '../../quantity/window';
import type { Pass, Stage } from '../../procedure/procedure';
import type { Source } from '../../walk/events';
import { holeById, labelOf, takesReading, walkPasses, windowOf } from '../../walk/slots';
import type { ReadingRecord, WalkState } from '../../walk/state';
import type { ProofCell, ProofColumn, ProofRow } from '../sheet';
import { eventAt, holesOf, lastRound, nounOf, outcomeAt, tagOf, type SheetSource } from './source';

interface Place {
  pass: Pass;
  stage: Stage;
  number: number;
  round: number;
}

const isShown = (stage: Stage): boolean => takesReading(stage) || stage.kind === 'check';

function placesOf(state: WalkState): Place[] {
  return walkPasses(state).flatMap((pass, index) =>
    Array.from({ length: pass.repeat ? lastRound(state, pass.id) : 1 }, (_, round) =>
      pass.stages.filter(isShown).map((stage) => ({ pass, stage, number: index + 1, round: round + 1 })),
    ).flat(),
  );
}

/** Readings that made up what stands: a *total* begins anew, each *this pull* comes on top (R1, W9). */
function partsOf(state: WalkState, standing: ReadingRecord): ReadingRecord[] {
  const { countsFor, attempt } = standing;
  const same = state.readings.filter(
    (record) =>
      record.status !== 'voided' &&
      record.seq <= standing.seq &&
      record.attempt === attempt &&
      record.countsFor?.hole === countsFor?.hole &&
      record.countsFor?.pass === countsFor?.pass &&
      record.countsFor?.stage === countsFor?.stage &&
      record.countsFor?.round === countsFor?.round,
  );
  return same.length > 0 ? same : [standing];
}

function readingCell(state: WalkState, standing: ReadingRecord, base: ProofCell): ProofCell {
  const { data } = standing;
  const parts = partsOf(state, standing);
  return {
    ...base,
    value: data.total,
    verdict: data.verdict,
    sources: [...new Set(parts.map((part) => part.data.source))],
    wrench: data.wrench === null ? null : tagOf(state, data.wrench),
    pulls: base.pulls,
    end: data.endTorque ? { value: data.endTorque, verdict: data.endVerdict ?? null } : null,
    moved: data.moved ?? null,
    click: data.click ?? null,
  };
}

function cellOf(source: SheetSource, place: Place, hole: string): ProofCell | null {
  const { state } = source;
  const { pass, stage, round } = place;
  if (!pass.order.includes(hole)) return null;
  const outcome = outcomeAt(state, { pass: pass.id, hole, stage: stage.id, round });
  if (!outcome) return null;
  const nothing = { value: null, verdict: null, sources: [], wrench: null, pulls: 0, end: null };
  const base: ProofCell = {
    ...nothing,
    seq: outcome.seq,
    status: outcome.status === 'accepted' ? 'accepted' : 'done',
    moved: null,
    click: null,
    mark: null,
    outOfOrder: outcome.outOfOrder === true,
  };
  const record = state.readings.find((reading) => reading.seq === outcome.seq);
  if (record) return readingCell(state, record, { ...base, pulls: outcome.pulls ?? record.data.pulls });
  const event = eventAt(source, outcome.seq);
  return event?.type === 'stage.done' ? { ...base, mark: event.data.result ?? null } : base;
}

const sameWindow = (a: Window, b: Window): boolean =>
  (['low', 'high', 'target'] as const).every(
    (limit) => compareQuantities({ value: a[limit], unit: a.unit }, { value: b[limit], unit: b.unit }) === 0,
  );

/** Windows of a stage, groups with the same one together. */
function windowsOf(holes: readonly string[], state: WalkState, pick: (hole: string) => Window | null) {
  const found: ProofColumn['windows'] = [];
  for (const hole of holes) {
    const window = pick(hole);
    const group = holeById(state.procedure, hole)?.group ?? '';
    if (!window) continue;
    const entry = found.find((other) => sameWindow(other.window, window));
    if (!entry) found.push({ groups: [group], window });
    else if (!entry.groups.includes(group)) entry.groups.push(group);
  }
  return found;
}

const only = <T>(values: readonly T[]): T | null => {
  const all = [...new Set(values)];
  return all.length === 1 ? (all[0] ?? null) : null;
};

function columnOf(state: WalkState, place: Place, cells: readonly (ProofCell | null)[]): ProofColumn {
  const { pass, stage, number, round } = place;
  const filled = cells.filter((cell) => cell !== null);
  const endWindow = (hole: string): Window | null => {
    const group = holeById(state.procedure, hole)?.group ?? '';
    return stage.kind === 'turn' ? (stage.endTorque.windows?.[group] ?? null) : null;
  };
  return {
    id: `${pass.id}/${stage.id}/${round}`,
    pass: number,
    round: pass.repeat ? round : null,
    kind: stage.kind,
    windows: windowsOf(pass.order, state, (hole) => windowOf(state.procedure, stage, hole)),
    endWindows: windowsOf(pass.order, state, endWindow),
    hasEnd: filled.some((cell) => cell.end !== null),
    hasPulls: filled.some((cell) => cell.pulls > 1),
    source: only<Source | null>(filled.flatMap((cell) => (cell.sources.length > 0 ? cell.sources : [null]))),
    wrench: only(filled.map((cell) => cell.wrench)),
    isFinal: round === (pass.repeat ? lastRound(state, pass.id) : 1),
  };
}

/** Readings by hole and pass (D2): windows, verdicts, sources, end torques and pulls of all stages. */
export function readingTable(source: SheetSource): { columns: ProofColumn[]; rows: ProofRow[] } {
  const { state } = source;
  const places = placesOf(state);
  const holes = holesOf(state);
  const cells = holes.map((hole) => places.map((place) => cellOf(source, place, hole)));
  const columns = places.map((place, index) =>
    columnOf(
      state,
      place,
      cells.map((row) => row[index] ?? null),
    ),
  );
  const rows = holes.map((hole, index) => ({
    hole,
    label: labelOf(state.procedure, hole),
    noun: nounOf(state, hole),
    group: holeById(state.procedure, hole)?.group ?? '',
    fastenerNo: state.holes[hole]?.fastenerNo ?? 1,
    cells: cells[index] ?? [],
  }));
  return { columns, rows };
}
