import { computed, onBeforeUnmount, onMounted, readonly, shallowRef, watch, type ComputedRef, type Ref } from 'vue';
import {
  emptyEntry,
  ENTRY_LOCK_MS,
  isComplete,
  readingEntry,
  type EntryContext,
  type EntryEffect,
  type EntryEvent,
  type EntryState,
  type FieldId,
} from './readingEntry';
import { isForControl, isForField } from './keyTargets';

/** What the entry needs from the screen. */
export interface ReadingEntryOptions {
  context: Readonly<Ref<EntryContext>>;
  /** False while another panel has the keys. */
  listens: () => boolean;
  onEffect: (effect: EntryEffect) => void;
  /** Changes with every new instruction: the entry begins again, empty (W5). */
  begins: () => string;
}

/** The entry of one reading, by taps, by keyboard and by a wrench acting as keyboard. */
export interface ReadingEntryUse {
  state: Readonly<Ref<EntryState>>;
  complete: ComputedRef<boolean>;
  tapDigit: (digit: string) => void;
  erase: () => void;
  record: () => void;
  field: (id: FieldId) => void;
  replace: (value: string) => void;
  received: (value: string) => void;
  clear: () => void;
}

const isFigureKey = (key: string): boolean => key.length === 1 && /[\p{L}\p{N}.,\-−+°]/u.test(key);

/** The page's keys as events of the entry, until the screen goes. */
function listenForKeys(listens: () => boolean, send: (event: EntryEvent) => void): void {
  function onKeyDown(event: KeyboardEvent): void {
    if (!listens() || event.ctrlKey || event.altKey || event.metaKey || isForField(event)) return;
    // When the key was pressed, not when this page came to it: a busy page must not take a burst for a person.
    const at = event.timeStamp;
    if (event.key === 'Enter') {
      if (isForControl(event)) return;
      if (!event.repeat) send({ type: 'enter', at });
    } else if (event.key === 'Backspace') send({ type: 'delete' });
    else if (isFigureKey(event.key)) {
      if (!event.repeat) send({ type: 'key', key: event.key, at });
    } else return;
    event.preventDefault();
  }
  onMounted(() => window.addEventListener('keydown', onKeyDown));
  onBeforeUnmount(() => window.removeEventListener('keydown', onKeyDown));
}

/** Drives the pure machine of `readingEntry` with the page's keys and a clock. */
export function useReadingEntry(options: ReadingEntryOptions): ReadingEntryUse {
  const { context, listens, onEffect, begins } = options;
  const state = shallowRef<EntryState>(emptyEntry(context.value.fields));
  let rest: ReturnType<typeof setTimeout> | undefined;

  function send(event: EntryEvent): void {
    clearTimeout(rest);
    const step = readingEntry(state.value, event, context.value);
    state.value = step.state;
    if (event.type === 'key' || event.type === 'delete') {
      rest = setTimeout(() => send({ type: 'rest' }), ENTRY_LOCK_MS);
    }
    if (step.effect) onEffect(step.effect);
  }

  listenForKeys(listens, send);
  onBeforeUnmount(() => clearTimeout(rest));
  watch(begins, () => {
    clearTimeout(rest);
    state.value = emptyEntry(context.value.fields);
  });
  return {
    state: readonly(state),
    complete: computed(() => isComplete(state.value, context.value)),
    tapDigit: (key) => send({ type: 'key', key, at: performance.now(), tap: true }),
    erase: () => send({ type: 'delete' }),
    record: () => send({ type: 'record' }),
    field: (id) => send({ type: 'field', id }),
    replace: (value) => send({ type: 'replace', value }),
    received: (value) => send({ type: 'received', value, at: performance.now() }),
    clear: () => send({ type: 'clear' }),
  };
}
