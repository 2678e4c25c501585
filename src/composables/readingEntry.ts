import { parseEntry, type EntryProblem } from '@shared/quantity/entry';
import type { Verdict } from '@shared/judge/verdict';
import { burstBefore, type TimedKey } from './keyBurst';

/** The figures that a reading is made of (W5). */
export type FieldId = 'value' | 'endTorque' | 'pulls';

/** One figure to be entered; a `wanted` one may stay empty. */
export interface EntryField {
  id: FieldId;
  need: 'required' | 'wanted';
  /** Whole digits of the upper limit: with as many, a figure is judged at once. Null: only after a rest, or on Enter. */
  highDigits: number | null;
  allowNegative?: boolean;
}

/** What the machine has to know of the stage. `verdict` judges a figure that reads well; null where none is due. */
export interface EntryContext {
  fields: readonly EntryField[];
  verdict: (field: FieldId, value: string) => Verdict | null;
  /** *Record by itself*: a keyed value in its window needs no second key (this walk only). */
  recordsItself?: boolean;
}

/** Everything entered and not yet recorded. Always begins empty (W5). */
export interface EntryState {
  active: FieldId;
  texts: Readonly<Record<FieldId, string>>;
  /** The verdict on this figure is on the screen. */
  shown: Readonly<Record<FieldId, boolean>>;
  /** Keys of the active field since it was last empty. */
  keys: readonly TimedKey[];
  source: 'typed' | 'keyed';
  /** A digit of this figure was deleted after its verdict was out of the window (W5). */
  changedFrom: string | null;
  /** Enter counts for nothing before this moment: the Enter that ends a burst may come twice. */
  lockedUntil: number;
}

/** What happened to the entry. Times are milliseconds of a clock that never goes back. */
export type EntryEvent =
  | { type: 'key'; key: string; at: number; tap?: boolean }
  | { type: 'delete' }
  | { type: 'enter'; at: number }
  /** 700 ms passed without a key. */
  | { type: 'rest' }
  | { type: 'field'; id: FieldId }
  | { type: 'record' }
  /** A value that the wrench sent is waiting, from the chain: also after a restart. */
  | { type: 'received'; value: string; at: number }
  /** What a person chose instead of the figure typed. */
  | { type: 'replace'; value: string }
  | { type: 'clear' };

/** What has to be done besides. `keyed`: a device sent this; `another`: it sent one more before the first was recorded. */
export type EntryEffect =
  | { kind: 'record' }
  | { kind: 'keyed'; text: string }
  | { kind: 'another'; text: string }
  | { kind: 'receivedFirst' }
  | { kind: 'reject' };

/** The entry after an event, and what it asks for. */
export interface EntryStep {
  state: EntryState;
  effect: EntryEffect | null;
}

/** Longest text a figure may have; more keys count for nothing, as sixty in a tenth of a second do. */
const LONGEST = 13;
/** W10, and the lock after a burst. */
export const ENTRY_LOCK_MS = 700;

const empty = { value: '', endTorque: '', pulls: '' };
const unseen = { value: false, endTorque: false, pulls: false };

/** A new entry, with nothing in it. */
export const emptyEntry = (fields: readonly EntryField[]): EntryState => ({
  active: fields[0]?.id ?? 'value',
  texts: empty,
  shown: unseen,
  keys: [],
  source: 'typed',
  changedFrom: null,
  lockedUntil: 0,
});

const fieldOf = (context: EntryContext, id: FieldId): EntryField =>
  context.fields.find((field) => field.id === id) ?? { id, need: 'wanted', highDigits: null };

/** The figure of a field where it reads well, else what is wrong with it (`empty` included). */
export function figureOf(
  state: EntryState,
  field: EntryField,
): { ok: true; value: string } | { ok: false; error: EntryProblem } {
  const read = parseEntry(state.texts[field.id], { allowNegative: field.allowNegative === true });
  if (!read.ok || field.id !== 'pulls' || /^\d{1,2}$/.test(read.value)) return read;
  return { ok: false, error: { code: 'notANumber' } };
}

/** The verdict as it may be shown now; null while none is due. */
export function shownVerdict(state: EntryState, context: EntryContext, id: FieldId): Verdict | null {
  const figure = figureOf(state, fieldOf(context, id));
  return state.shown[id] && figure.ok ? context.verdict(id, figure.value) : null;
}

/** Every figure that is required reads well, and none that is there reads badly. */
export function isComplete(state: EntryState, context: EntryContext): boolean {
  return context.fields.every((field) => {
    const figure = figureOf(state, field);
    return figure.ok || (figure.error.code === 'empty' && field.need === 'wanted');
  });
}

const isOff = (verdict: Verdict | null): boolean => verdict !== null && verdict !== 'in';

const wholeDigits = (text: string): number => /^-?0*(\d*)/.exec(text)?.[1]?.length ?? 0;

/** look.md: judged with as many whole digits as the upper limit. */
const isLongEnough = (field: EntryField, text: string): boolean =>
  field.highDigits !== null && wholeDigits(text) >= field.highDigits;

const only = (state: EntryState): EntryStep => ({ state, effect: null });

function withText(state: EntryState, context: EntryContext, text: string): EntryState {
  const { active } = state;
  const shown = isLongEnough(fieldOf(context, active), text);
  return { ...state, texts: { ...state.texts, [active]: text }, shown: { ...state.shown, [active]: shown } };
}

function onKey(state: EntryState, event: Extract<EntryEvent, { type: 'key' }>, context: EntryContext): EntryStep {
  const { key, at, tap } = event;
  const text = state.texts[state.active];
  const keys = [...state.keys, tap ? { key, at, tap } : { key, at }].slice(-LONGEST);
  // A value that was sent is taken or turned down first (R10); its keys are still watched for one more burst.
  if (state.source === 'keyed' && state.active === 'value') {
    return { state: { ...state, keys }, effect: tap ? { kind: 'receivedFirst' } : null };
  }
  if (text.length >= LONGEST) return only({ ...state, keys });
  return only({ ...withText(state, context, text + key), keys });
}

function onDelete(state: EntryState, context: EntryContext): EntryStep {
  const { active, texts, source } = state;
  if (source === 'keyed' && active === 'value') return { state, effect: { kind: 'reject' } };
  const changed = active === 'value' && isOff(shownVerdict(state, context, 'value')) ? texts.value : null;
  const text = texts[active].slice(0, -1);
  return only({ ...withText(state, context, text), keys: [], changedFrom: state.changedFrom ?? changed });
}

function nextField(state: EntryState, context: EntryContext): FieldId | null {
  const at = context.fields.findIndex((field) => field.id === state.active);
  return context.fields[at + 1]?.id ?? null;
}

/** On to the next figure, or, from the last one, recording where nothing is missing. */
function forward(state: EntryState, context: EntryContext): EntryStep {
  const next = nextField(state, context);
  if (next) return only({ ...state, active: next, keys: [] });
  if (isComplete(state, context)) return { state: { ...state, keys: [] }, effect: { kind: 'record' } };
  return only({ ...state, active: firstMissing(state, context), keys: [] });
}

function firstMissing(state: EntryState, context: EntryContext): FieldId {
  const missing = context.fields.find((field) => field.need === 'required' && !figureOf(state, field).ok);
  return missing?.id ?? state.active;
}

/** The Enter that ends a burst only shows the value (look.md, "The main button tells the truth"). */
function onBurst(state: EntryState, text: string, at: number, context: EntryContext): EntryStep {
  const { active } = state;
  const locked = { ...state, keys: [], lockedUntil: at + ENTRY_LOCK_MS };
  if (active === 'value' && state.source === 'keyed') return { state: locked, effect: { kind: 'another', text } };
  const filled = {
    ...locked,
    texts: { ...state.texts, [active]: text.slice(0, LONGEST) },
    shown: { ...state.shown, [active]: true },
  };
  if (active !== 'value') return only({ ...filled, active: nextField(state, context) ?? active });
  const reads = figureOf(filled, fieldOf(context, 'value')).ok;
  if (!reads) return only(filled);
  return { state: { ...filled, source: 'keyed', changedFrom: null }, effect: { kind: 'keyed', text } };
}

function onEnter(state: EntryState, at: number, context: EntryContext): EntryStep {
  const burst = burstBefore(state.keys, at);
  if (burst !== null) return onBurst(state, burst, at, context);
  const { active } = state;
  // Figures typed by hand over a value that waits: Enter must not record the other one.
  if (active === 'value' && state.source === 'keyed' && state.keys.length > 0) {
    return { state: { ...state, keys: [] }, effect: { kind: 'receivedFirst' } };
  }
  if (at < state.lockedUntil) return only({ ...state, keys: [] });
  const figure = figureOf(state, fieldOf(context, active));
  if (!figure.ok && figure.error.code !== 'empty') {
    return only({ ...state, keys: [], shown: { ...state.shown, [active]: true } });
  }
  if (!figure.ok && fieldOf(context, active).need === 'required') return only({ ...state, keys: [] });
  // Off and not seen yet: this Enter shows it, the next one records it.
  const seen = state.shown[active];
  const judged = { ...state, keys: [], shown: { ...state.shown, [active]: true } };
  if (!seen && isOff(shownVerdict(judged, context, active))) return only(judged);
  return forward(judged, context);
}

function onReceived(state: EntryState, value: string, at: number, context: EntryContext): EntryStep {
  const filled: EntryState = {
    ...state,
    keys: [],
    texts: { ...state.texts, value },
    shown: { ...state.shown, value: true },
    source: 'keyed',
    changedFrom: null,
    lockedUntil: Math.max(state.lockedUntil, at + ENTRY_LOCK_MS),
  };
  const next = context.fields[1]?.id;
  if (next) return only({ ...filled, active: state.active === 'value' ? next : state.active });
  const itself = context.recordsItself === true && shownVerdict(filled, context, 'value') === 'in';
  return itself ? { state: filled, effect: { kind: 'record' } } : only(filled);
}

/** The entry after one event. Pure: keys, times and judgement come in, what to do comes out. */
export function readingEntry(state: EntryState, event: EntryEvent, context: EntryContext): EntryStep {
  switch (event.type) {
    case 'key':
      return onKey(state, event, context);
    case 'delete':
      return onDelete(state, context);
    case 'enter':
      return onEnter(state, event.at, context);
    case 'rest':
      return only(
        state.texts[state.active] === '' ? state : { ...state, shown: { ...state.shown, [state.active]: true } },
      );
    case 'field':
      return only({ ...state, active: event.id, keys: [] });
    case 'record':
      return isComplete(state, context)
        ? { state, effect: { kind: 'record' } }
        : only({ ...state, active: firstMissing(state, context), keys: [] });
    case 'received':
      return onReceived(state, event.value, event.at, context);
    case 'replace':
      return only({
        ...state,
        keys: [],
        texts: { ...state.texts, value: event.value },
        shown: { ...state.shown, value: true },
      });
    case 'clear':
      return only({ ...emptyEntry(context.fields), changedFrom: null });
  }
}
