import { computed, ref, watch, type ComputedRef, type Ref } from 'vue';
import type { Judged } from '@shared/walk/judgeReading';
import type { SlipAnswer } from '@shared/walk/events';
import { slipOf, type Slip } from '@shared/walk/slips';
import {
  entryOf,
  fieldsOf,
  fieldVerdict,
  preview,
  readingBefore,
  unitOf,
  windowToMeet,
  type PullFigures,
} from './pullEntry';
import { figureOf, type EntryContext, type EntryEffect } from './readingEntry';
import { useReadingEntry, type ReadingEntryUse } from './useReadingEntry';
import { useShownUnits } from './useShownUnits';
import type { PullFrameUse } from './usePullFrame';
import type { LogRefusal, WalkAccess } from './walkAccess';

/** What is asked before the figure is recorded; one tap answers. */
export type PullQuestion =
  | { kind: 'slip'; slip: Slip; typed: string }
  | { kind: 'moved' }
  | { kind: 'another'; text: string }
  | { kind: 'reject' };

/** The entry of a pull and everything that stands between it and its event. */
export interface PullEntryUse {
  entry: ReadingEntryUse;
  context: ComputedRef<EntryContext>;
  figures: ComputedRef<PullFigures | null>;
  judged: ComputedRef<Judged | null>;
  question: Ref<PullQuestion | null>;
  /** A value sent by the wrench waits to be recorded or turned down. */
  waiting: ComputedRef<boolean>;
  /** Typing over a value that was sent: say so. */
  receivedFirst: Ref<boolean>;
  refusal: Ref<LogRefusal | null>;
  busy: Ref<boolean>;
  answerSlip: (answer: SlipAnswer['answer']) => Promise<void>;
  answerMoved: (moved: boolean) => Promise<void>;
  /** `words` goes into the record: why the first was turned down, or that the second was. */
  answerAnother: (take: boolean, words: string) => Promise<void>;
  reject: (reason: string) => Promise<void>;
}

/** What the screen says about the entry. */
export interface PullEntryOptions {
  listens: () => boolean;
  /** *Record by itself* is on for this walk. */
  recordsItself: () => boolean;
  /** The wrench is at its limit: what it gave is recorded, then it is put aside here and another takes the rest (W9). */
  atLimit: () => boolean;
}

interface Parts {
  walk: WalkAccess;
  pull: PullFrameUse;
  entry: ReadingEntryUse;
  context: ComputedRef<EntryContext>;
  question: Ref<PullQuestion | null>;
  refusal: Ref<LogRefusal | null>;
  busy: Ref<boolean>;
  slip: Ref<SlipAnswer | null>;
  moved: Ref<boolean | null>;
  atLimit: () => boolean;
}

function figuresOf({ entry, context }: Pick<Parts, 'entry' | 'context'>): PullFigures | null {
  const read = context.value.fields.map((field) => [field.id, figureOf(entry.state.value, field)] as const);
  const of = (id: string): string | undefined => {
    const found = read.find(([field]) => field === id)?.[1];
    return found?.ok ? found.value : undefined;
  };
  const value = of('value');
  if (value === undefined) return null;
  const [endTorque, pulls] = [of('endTorque'), of('pulls')];
  return { value, ...(endTorque ? { endTorque } : {}), ...(pulls ? { pulls } : {}) };
}

/** Runs one thing at a time: a second tap while the first is being saved does nothing. */
async function once({ busy, refusal }: Parts, work: () => Promise<LogRefusal | null>): Promise<boolean> {
  if (busy.value) return false;
  busy.value = true;
  try {
    refusal.value = await work();
    return refusal.value === null;
  } finally {
    busy.value = false;
  }
}

function findSlip(parts: Parts, figures: PullFigures): Slip | null {
  const frame = parts.pull.frame.value;
  if (parts.slip.value || frame.instruction.mode === 'finishByStripe') return null;
  const value = { value: figures.value, unit: unitOf(frame) };
  return slipOf(value, windowToMeet(frame), readingBefore(frame));
}

/** Asks what has to be asked, then writes the reading. */
async function record(parts: Parts, unit?: PullFigures['unit']): Promise<void> {
  const { walk, pull, entry, question, slip, moved } = parts;
  const read = figuresOf(parts);
  if (!read || parts.busy.value) return;
  const figures = unit ? { ...read, unit } : read;
  const found = unit ? null : findSlip(parts, figures);
  if (found) {
    question.value = { kind: 'slip', slip: found, typed: figures.value };
    return;
  }
  const frame = pull.frame.value;
  if (frame.instruction.pass.repeat && moved.value === null) {
    question.value = { kind: 'moved' };
    return;
  }
  const { source, changedFrom } = entry.state.value;
  const data = entryOf(frame, figures, source);
  const received = source === 'keyed' ? walk.state.received?.seq : undefined;
  const spent = parts.atLimit() ? frame.taken?.wrench.id : undefined;
  const saved = await once(parts, () =>
    walk.act({
      type: 'reading.taken',
      data: {
        ...data,
        ...(moved.value === null ? {} : { moved: moved.value }),
        ...(changedFrom !== null && changedFrom !== figures.value ? { changedFrom } : {}),
        ...(slip.value ? { slip: slip.value } : {}),
        ...(received === undefined ? {} : { received }),
      },
    }),
  );
  if (saved && spent !== undefined) {
    await once(parts, () => walk.act({ type: 'wrench.reported', data: { wrench: spent, what: 'reachedLimit' } }));
  }
}

async function keep(parts: Parts, text: string): Promise<void> {
  const { walk, pull, entry } = parts;
  const wrench = pull.frame.value.taken?.wrench.id;
  if (wrench === undefined) return entry.received(text);
  const value = { value: text, unit: unitOf(pull.frame.value) };
  await once(parts, () => walk.act({ type: 'reading.received', data: { wrench, source: 'keyed', value } }));
}

async function turnDown(parts: Parts, reason: string): Promise<boolean> {
  const { walk, entry, question } = parts;
  const received = walk.state.received?.seq;
  question.value = null;
  if (received === undefined) {
    entry.clear();
    return true;
  }
  const done = await once(parts, () => walk.act({ type: 'reading.rejected', data: { received, reason } }));
  if (done) entry.clear();
  return done;
}

function answersOf(parts: Parts) {
  const { walk, pull, entry, question, slip, moved } = parts;
  const close = (): void => void (question.value = null);
  return {
    answerSlip: async (answer: SlipAnswer['answer']) => {
      const asked = question.value?.kind === 'slip' ? question.value : null;
      close();
      if (!asked) return;
      const { kind, meant } = asked.slip;
      slip.value = { kind, answer, ...(answer === 'corrected' ? { first: asked.typed } : {}) };
      if (answer === 'asTyped') return record(parts);
      // The wrench was not reset, so what it shows is not this hole's: the true figure is typed.
      if (kind === 'sameAsBefore') return entry.clear();
      entry.replace(meant.value);
      return record(parts, meant.unit);
    },
    answerMoved: async (answer: boolean) => {
      moved.value = answer;
      close();
      await record(parts);
    },
    answerAnother: async (take: boolean, words: string) => {
      const text = question.value?.kind === 'another' ? question.value.text : '';
      close();
      if (take) {
        if (await turnDown(parts, words)) await keep(parts, text);
        return;
      }
      const hole = pull.frame.value.instruction.slot.hole;
      await once(parts, () => walk.act({ type: 'note.added', data: { text: words, hole } }));
    },
    reject: async (reason: string) => void (await turnDown(parts, reason)),
  };
}

function onEffect(parts: Parts, receivedFirst: Ref<boolean>, effect: EntryEffect): void {
  receivedFirst.value = effect.kind === 'receivedFirst';
  if (effect.kind === 'record') void record(parts);
  else if (effect.kind === 'keyed') void keep(parts, effect.text);
  else if (effect.kind === 'another') parts.question.value = { kind: 'another', text: effect.text };
  else if (effect.kind === 'reject') parts.question.value = { kind: 'reject' };
}

/** A value that the wrench sent is in the chain at once: it stands here again after a restart. */
function followReceived({ walk, pull, entry }: Parts): void {
  watch(
    () => walk.state.received?.seq,
    () => {
      const sent = walk.state.received;
      if (sent && sent.value.unit === unitOf(pull.frame.value)) entry.received(sent.value.value);
    },
    { immediate: true },
  );
}

/** Answers belong to one figure at one hole: the next instruction asks anew. */
function forgetAnswers({ pull, slip, moved }: Parts): void {
  watch(pull.begins, () => {
    slip.value = null;
    moved.value = null;
  });
}

/** The entry of one pull: figures, verdict, the questions of W6 and R12, and the one event at the end. */
export function usePullEntry(walk: WalkAccess, pull: PullFrameUse, options: PullEntryOptions): PullEntryUse {
  const units = useShownUnits();
  const receivedFirst = ref(false);
  const asked = {
    question: ref<PullQuestion | null>(null),
    refusal: ref<LogRefusal | null>(null),
    busy: ref(false),
    slip: ref<SlipAnswer | null>(null),
    moved: ref<boolean | null>(null),
  };
  const context = computed<EntryContext>(() => ({
    fields: fieldsOf(pull.frame.value, (window, unit) => units.window(window, unit)),
    verdict: (field, value) => fieldVerdict(pull.frame.value, field, value),
    recordsItself: options.recordsItself(),
  }));
  const entry = useReadingEntry({
    context,
    listens: () => options.listens() && asked.question.value === null && !asked.busy.value,
    onEffect: (effect) => onEffect(parts, receivedFirst, effect),
    begins: () => pull.begins.value,
  });
  const parts: Parts = { walk, pull, entry, context, atLimit: options.atLimit, ...asked };
  forgetAnswers(parts);
  followReceived(parts);
  const figures = computed(() => figuresOf({ entry, context }));
  return {
    entry,
    context,
    figures,
    judged: computed(() => (figures.value ? preview(pull.frame.value, figures.value) : null)),
    ...asked,
    waiting: computed(() => walk.state.received !== null && entry.state.value.source === 'keyed'),
    receivedFirst,
    ...answersOf(parts),
  };
}
