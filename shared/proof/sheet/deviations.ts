import { standingSettling, type Deviation, type DeviationKind, type Settling } from '../../walk/deviation';
import { holeById, slotKey, stageOf } from '../../walk/slots';
import type { ReadingRecord, WalkState } from '../../walk/state';
import { phrase, type Phrase, type PhraseParam } from '../phrase';
import type { ProofDeviation, ProofSettling } from '../sheet';
import { eventAt, placeOf, tagOf, type SheetSource } from './source';

/** These are told with both values under *voided and changed*. */
const TOLD_AS_CHANGES: ReadonlySet<DeviationKind> = new Set([
  'voidedOutOfWindow',
  'rejectedOutOfWindow',
  'changedValue',
]);

/** Deviations that are told as such: what was withdrawn went away with its reading, which is told as voided. */
export const toldDeviations = (state: WalkState): Deviation[] =>
  state.deviations.filter(({ kind, status }) => status !== 'withdrawn' && !TOLD_AS_CHANGES.has(kind));

function readingParams(state: WalkState, deviation: Deviation): Record<string, PhraseParam> {
  const record = state.readings.find((reading) => reading.seq === deviation.reading);
  if (!record) return {};
  const { total, window, endTorque } = record.data;
  const params: Record<string, PhraseParam> = { value: { quantity: total } };
  if (window) params.window = { window: { low: window.low, high: window.high, unit: window.unit } };
  if (endTorque) params.end = { quantity: endTorque };
  const endWindow = endWindowOf(state, record);
  if (endWindow) params.endWindow = { window: endWindow };
  if (record.data.wrench !== null) params.wrench = tagOf(state, record.data.wrench);
  return params;
}

function endWindowOf(state: WalkState, record: ReadingRecord) {
  const stage = stageOf(state, record.data)?.stage;
  const group = holeById(state.procedure, record.data.hole)?.group ?? '';
  const window = stage?.kind === 'turn' ? stage.endTorque.windows?.[group] : undefined;
  return window && { low: window.low, high: window.high, unit: window.unit };
}

function stepPhrase(source: SheetSource, deviation: Deviation): Phrase {
  const step = source.state.procedure.steps.find((candidate) => candidate.id === deviation.step)?.text ?? '';
  const event = eventAt(source, deviation.seq);
  const value = event?.type === 'step.done' || event?.type === 'step.corrected' ? event.data.value : undefined;
  return value
    ? phrase('step.value', { step, values: { list: [{ quantity: value }], join: 'comma' } })
    : phrase('step.done', { step });
}

function interruptedParams(source: SheetSource, deviation: Deviation): Record<string, PhraseParam> {
  const event = eventAt(source, deviation.seq);
  if (event?.type !== 'walk.resumed') return {};
  const { begun, way } = event.data;
  return { begun: { phrase: phrase(`begun.${begun}`) }, way: { phrase: phrase(`way.${way}`) } };
}

function foundPhrase(source: SheetSource, deviation: Deviation): Phrase {
  const { state } = source;
  const event = eventAt(source, deviation.seq);
  if (event?.type === 'wrench.reported')
    return phrase(`found.wrench.${event.data.what}`, { wrench: tagOf(state, event.data.wrench) });
  const note = deviation.note ?? '';
  const params: Record<string, PhraseParam> = {
    ...readingParams(state, deviation),
    note,
    quoted: note === '' ? '' : { phrase: phrase('quoted', { note }) },
  };
  if (event) params.person = { person: event.by };
  if (event?.type === 'wrench.taken') params.wrench = event.data.wrench.tag;
  if (deviation.step !== undefined) params.step = { phrase: stepPhrase(source, deviation) };
  if (deviation.kind === 'interrupted') Object.assign(params, interruptedParams(source, deviation));
  return phrase(`found.${deviation.kind}`, params);
}

/** The value that stood after the next pull of the same fastener. */
function pulledAgain(state: WalkState, deviation: Deviation): ReadingRecord | undefined {
  const before = state.readings.find((reading) => reading.seq === deviation.reading);
  const slot = deviation.slot;
  return state.readings.find(
    (record) =>
      before !== undefined &&
      slot !== null &&
      record.seq > before.seq &&
      record.status !== 'voided' &&
      record.attempt === before.attempt &&
      record.countsFor?.hole === slot.hole &&
      slotKey(record.countsFor) === slotKey(slot),
  );
}

function settledPhrase(state: WalkState, deviation: Deviation, settling: Settling): Phrase {
  const { choice, reason, by, order } = settling;
  const again = choice === 'pullAgain' ? pulledAgain(state, deviation) : undefined;
  let said = again
    ? phrase('settled.pullAgainNow', { value: { quantity: again.data.total } })
    : phrase(`settled.${choice}`, { person: { person: by } });
  if (order !== undefined) said = phrase('settled.order', { settled: { phrase: said }, person: { person: by } });
  return reason.trim() === '' ? said : phrase('settled.reason', { settled: { phrase: said }, reason });
}

function settlingsOf(state: WalkState, deviation: Deviation): ProofSettling[] {
  const last = standingSettling(deviation);
  return deviation.settlings.map((settling) => ({
    choice: settling.choice,
    said: settledPhrase(state, deviation, settling),
    by: settling.by,
    at: settling.at,
    seq: settling.seq,
    stands: settling === last,
  }));
}

/** Every deviation in words, with every decision about it (D1). */
export function sheetDeviations(source: SheetSource): ProofDeviation[] {
  const { state } = source;
  return toldDeviations(state).map((deviation) => ({
    id: deviation.id,
    seq: deviation.seq,
    at: deviation.at,
    kind: deviation.kind,
    status: deviation.status,
    place: placeOf(state, deviation.hole, deviation.slot),
    found: foundPhrase(source, deviation),
    settlings: settlingsOf(state, deviation),
  }));
}
