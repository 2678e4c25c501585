import { computed, nextTick, reactive, ref, shallowRef, watch, type ComputedRef, type Ref } from 'vue';

/** What is wrong with one field: a code that the page translates, and what its sentence needs. */
export interface Violation {
  code: string;
  params?: Record<string, string | number>;
}

/** What is wrong, by field: `number`, `joints.0.procedure`. */
export type Violations = Record<string, Violation>;

/** Keeps what was typed, so that closing the page by mistake loses nothing. */
export interface DraftKeeper<T> {
  read(): T | null;
  keep(values: T): void;
  drop(): void;
}

/** A form while somebody fills it in. */
export interface Form<T extends object> {
  values: T;
  violations: ComputedRef<Violations>;
  /** The violation to show now: from the first touch of a field on, or after a try to send. */
  shown: (field: string) => Violation | null;
  /** A field was left: from now on it says what is wrong with it. */
  touch: (field: string) => void;
  /** The server's no to one field; stands until that field is changed. */
  refuse: (field: string, violation: Violation) => void;
  /** Sends when nothing is wrong; null when something is, or when it was refused (then `refused` says why). */
  submit: <A>(send: (values: T) => Promise<A>) => Promise<A | null>;
  busy: Ref<boolean>;
  refused: Ref<unknown>;
  /** A try to send that found something wrong: its fields, in order. */
  failedFields: ComputedRef<string[]>;
  /** True while the values came from a draft that was kept. */
  fromDraft: Ref<boolean>;
  /** Begins anew and forgets the draft. */
  reset: () => void;
}

const copy = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T;

type At = (field: string) => unknown;

/** Which fields were touched and which the server refused; a refused one is free again once it is changed. */
function useMarks(values: object, at: At, check: () => Violations) {
  const touched = reactive(new Set<string>());
  const refusedFields = reactive(new Map<string, { violation: Violation; value: unknown }>());
  const tried = ref(false);
  const violations = computed<Violations>(() => ({
    ...check(),
    ...Object.fromEntries([...refusedFields].map(([field, { violation }]) => [field, violation])),
  }));
  const isShown = (field: string): boolean => tried.value || touched.has(field) || refusedFields.has(field);
  watch(values, () => {
    for (const [field, { value }] of refusedFields) if (at(field) !== value) refusedFields.delete(field);
  });
  return {
    tried,
    violations,
    shown: (field: string) => (isShown(field) ? (violations.value[field] ?? null) : null),
    touch: (field: string) => void touched.add(field),
    refuse: (field: string, violation: Violation) => void refusedFields.set(field, { violation, value: at(field) }),
    clear: () => {
      touched.clear();
      refusedFields.clear();
      tried.value = false;
    },
  };
}

/** Sends one thing at a time and remembers why it was refused. */
function useSending() {
  const busy = ref(false);
  const refused = shallowRef<unknown>(null);
  async function send<A>(work: () => Promise<A>): Promise<A | null> {
    busy.value = true;
    refused.value = null;
    try {
      return await work();
    } catch (error) {
      refused.value = error;
      return null;
    } finally {
      busy.value = false;
    }
  }
  return { busy, refused, send };
}

/**
 * One form: checked as one types, sent once at a time, its draft kept. `check` gives everything that is wrong; `first`
 * the values a new form begins with.
 */
export function useForm<T extends object>(options: {
  first: () => T;
  check: (values: T) => Violations;
  draft?: DraftKeeper<T>;
}): Form<T> {
  const { first, check, draft } = options;
  const kept = draft?.read() ?? null;
  const values = reactive({ ...first(), ...kept }) as T;
  const fromDraft = ref(kept !== null);
  const at: At = (field) =>
    field.split('.').reduce<unknown>((found, key) => (found as Record<string, unknown> | undefined)?.[key], values);
  const { tried, clear, violations, ...marks } = useMarks(values, at, () => check(values));
  const { busy, refused, send } = useSending();
  watch(values, () => draft?.keep(copy(values)));

  async function submit<A>(work: (values: T) => Promise<A>): Promise<A | null> {
    tried.value = true;
    refused.value = null;
    if (busy.value || Object.keys(violations.value).length > 0) return null;
    return send(async () => {
      const answer = await work(copy(values));
      draft?.drop();
      return answer;
    });
  }

  function reset(): void {
    Object.assign(values, first());
    clear();
    refused.value = null;
    fromDraft.value = false;
    // The watcher above keeps the empty form as a new draft: it runs before this does.
    void nextTick(() => draft?.drop());
  }

  const failedFields = computed(() => (tried.value ? Object.keys(violations.value) : []));
  return { values, violations, ...marks, submit, busy, refused, failedFields, fromDraft, reset };
}
