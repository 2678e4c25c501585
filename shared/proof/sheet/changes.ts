import { groupBy } from '../../kernel/groupBy';
import type { Quantity } from '../../quantity/quantity';
import type { WalkEvent, WalkEventData, WalkEventType } from '../../walk/events';
import { slotKey } from '../../walk/slots';
import type { ReadingRecord, WalkState } from '../../walk/state';
import { phrase, type Phrase, type PhraseParam } from '../phrase';
import type { ProofLine } from '../sheet';
import { eventAt, placeOf, type SheetSource } from './source';

type EventOf<T extends WalkEventType> = WalkEvent & { type: T; data: WalkEventData[T] };

const eventsOf = <T extends WalkEventType>(source: SheetSource, type: T): EventOf<T>[] =>
  source.events.filter((event): event is EventOf<T> => event.type === type);

function voidedLine(source: SheetSource, event: EventOf<'reading.voided'>): ProofLine[] {
  const { state } = source;
  const record = state.readings.find((reading) => reading.seq === event.data.reading);
  if (!record) return [];
  const again = state.readings.find(
    (reading) => reading.seq > event.seq && reading.data.retype === true && reading.data.hole === record.data.hole,
  );
  const params = { first: { quantity: record.data.value }, reason: event.data.reason };
  const said = again
    ? phrase('change.voided', { ...params, value: { quantity: again.data.value } })
    : phrase('change.voidedOnly', params);
  return [{ seq: event.seq, at: event.at, place: placeOf(state, record.data.hole, record.data), said }];
}

function typedLine(state: WalkState, record: ReadingRecord): ProofLine[] {
  const { changedFrom, slip, value } = record.data;
  const line = (said: Phrase): ProofLine => ({
    seq: record.seq,
    at: record.at,
    place: placeOf(state, record.data.hole, record.data),
    said,
  });
  const changed: PhraseParam = { quantity: value };
  return [
    ...(changedFrom === undefined ? [] : [line(phrase('change.changed', { first: changedFrom, value: changed }))]),
    ...(slip?.answer === 'corrected' && slip.first !== undefined
      ? [line(phrase('change.slip', { first: slip.first, value: changed }))]
      : []),
  ];
}

function rejectedLine(source: SheetSource, event: EventOf<'reading.rejected'>): ProofLine {
  const sent = eventAt(source, event.data.received);
  const first: PhraseParam = sent?.type === 'reading.received' ? { quantity: sent.data.value } : '';
  const slot = source.state.deviations.find((deviation) => deviation.seq === event.seq)?.slot ?? null;
  const place = placeOf(source.state, slot?.hole ?? null, slot);
  return { seq: event.seq, at: event.at, place, said: phrase('change.rejected', { first, reason: event.data.reason }) };
}

const answerParam = (answer: 'yes' | 'no', value: Quantity | undefined): PhraseParam =>
  value ? { quantity: value } : { phrase: phrase(`answer.${answer}`) };

function stepLine(source: SheetSource, event: EventOf<'step.corrected'>): ProofLine {
  const { state } = source;
  const before = eventAt(source, event.data.corrects);
  const first = before?.type === 'step.done' || before?.type === 'step.corrected' ? before.data : null;
  const id = Object.values(state.steps).find((record) => record.seq === event.seq);
  const stepId = id?.step ?? (first && 'step' in first ? first.step : '');
  const step = state.procedure.steps.find((candidate) => candidate.id === stepId)?.text ?? stepId;
  const said = phrase('change.step', {
    step,
    first: first ? answerParam(first.answer, first.value) : '',
    value: answerParam(event.data.answer, event.data.value),
    reason: event.data.reason,
  });
  const hole = id?.hole ?? (first && 'hole' in first ? first.hole : null);
  return { seq: event.seq, at: event.at, place: placeOf(state, hole, null), said };
}

const partText = (part: { partNumber: string; batch: string; count: number }): string =>
  `${part.count} × ${part.partNumber}, ${part.batch}`;

function partLine(source: SheetSource, event: EventOf<'part.corrected'>): ProofLine {
  const before = eventAt(source, event.data.corrects);
  const first = before?.type === 'part.taken' || before?.type === 'part.corrected' ? partText(before.data) : '';
  const taken = source.state.parts.find((part) => part.seq === event.seq);
  const { fasteners, parts } = source.state.procedure;
  const name = [...fasteners, ...parts].find((candidate) => candidate.id === taken?.part)?.name ?? taken?.part ?? '';
  const { reason } = event.data;
  const said = phrase('change.part', { part: name, first, value: partText(event.data), reason });
  return { seq: event.seq, at: event.at, place: placeOf(source.state, null, null), said };
}

/** Everything that was voided, changed, turned down or corrected, with both values (R10, W5, W6). */
export function sheetChanges(source: SheetSource): ProofLine[] {
  const { state } = source;
  return [
    ...eventsOf(source, 'reading.voided').flatMap((event) => voidedLine(source, event)),
    ...state.readings.flatMap((record) => typedLine(state, record)),
    ...eventsOf(source, 'reading.rejected').map((event) => rejectedLine(source, event)),
    ...eventsOf(source, 'step.corrected').map((event) => stepLine(source, event)),
    ...eventsOf(source, 'part.corrected').map((event) => partLine(source, event)),
  ].sort((a, b) => a.seq - b.seq);
}

const stands = (state: WalkState, record: ReadingRecord): boolean => {
  const slot = record.countsFor;
  return slot !== null && state.holes[slot.hole]?.slots[slotKey(slot)] !== undefined && sameAttempt(state, record);
};

const sameAttempt = (state: WalkState, record: ReadingRecord): boolean =>
  record.attempt === (state.holes[record.data.hole]?.attempt ?? record.attempt);

function earlierLine(state: WalkState, records: readonly ReadingRecord[]): ProofLine[] {
  const [first] = records;
  if (!first) return [];
  const readings: PhraseParam = {
    join: 'comma',
    list: records.map(({ data }) => ({
      phrase: phrase('earlier.reading', {
        pass: placeOf(state, data.hole, data).pass ?? 0,
        value: { quantity: data.total },
        verdict: { phrase: phrase(`verdict.${data.verdict}`) },
      }),
    })),
  };
  const elsewhere = first.status === 'elsewhere';
  const where = placeOf(state, first.data.hole, null);
  const said = phrase(elsewhere ? 'earlier.elsewhere' : 'earlier.row', { readings });
  return [{ seq: first.seq, at: first.at, place: where, said }];
}

/** Readings of fasteners that were loosened or replaced, and of a branch that does not stand: facts for all that (W11, W13). */
export function earlierReadings(source: SheetSource): ProofLine[] {
  const { state } = source;
  const gone = state.readings.filter(
    (record) => record.status !== 'voided' && (record.status === 'elsewhere' || !stands(state, record)),
  );
  const groups = groupBy(
    gone,
    ({ data, attempt, status }) => `${data.hole} ${attempt} ${status === 'elsewhere' ? 'elsewhere' : ''}`,
  );
  return [...groups.values()].flatMap((records) => earlierLine(state, records));
}

/** Readings entered from a sheet, with both times (D2). */
export function lateEntries({ state }: SheetSource): ProofLine[] {
  return state.readings
    .filter(({ data, status }) => data.pulledAt !== undefined && status !== 'voided')
    .map((record) => ({
      seq: record.seq,
      at: record.at,
      place: placeOf(state, record.data.hole, record.data),
      said: phrase('late.row', { pulled: { time: record.data.pulledAt ?? '' }, entered: { time: record.at } }),
    }));
}
