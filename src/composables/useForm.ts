import { computed, reactive, readonly, ref, type ComputedRef, type Ref } from 'vue';

/** Violations of a form by field, already in words; a field without one is left out. */
export type Violations<T> = Partial<Record<keyof T & string, string>>;

export interface UseFormOptions<T extends object> {
  /** What the form begins with; `reset` goes back to it. */
  initial: () => T;
  /** What is wrong with the values as they stand. Rules live in shared/, not here. */
  validate: (values: T) => Violations<T>;
  /** Keeps the values; a refusal comes back as violations, a fault is thrown and shown by the caller. */
  save: (values: T) => Promise<Violations<T> | void>;
}

export interface UseFormReturn<T extends object> {
  /** The edit copy, to bind fields to. */
  values: T;
  /** What to show beside each field: only of fields that were touched, or of all once saving was tried. */
  violations: ComputedRef<Violations<T>>;
  hasChanged: ComputedRef<boolean>;
  canSave: ComputedRef<boolean>;
  isSaving: Readonly<Ref<boolean>>;
  touch: (field: keyof T & string) => void;
  /** True where it was saved. */
  save: () => Promise<boolean>;
  reset: () => void;
}

const copy = <T extends object>(value: T): T => JSON.parse(JSON.stringify(value)) as T;

/** What stands wrong with the values now: the rules' violations and, while unchanged, those of the last refusal. */
function useViolations<T extends object>(values: T, validate: UseFormOptions<T>['validate']) {
  const touched = ref(new Set<string>());
  const tried = ref(false);
  const refused = ref<{ at: string; violations: object } | null>(null);
  const now = computed(() => JSON.stringify(values));
  const all = computed<Violations<T>>(() => ({
    ...(refused.value?.at === now.value ? refused.value.violations : {}),
    ...validate(values),
  }));
  const shown = computed<Violations<T>>(() => {
    if (tried.value) return all.value;
    return Object.fromEntries(Object.entries(all.value).filter(([field]) => touched.value.has(field))) as Violations<T>;
  });
  const clear = (): void => {
    refused.value = null;
    tried.value = false;
    touched.value = new Set();
  };
  const touch = (field: keyof T & string): void => void (touched.value = new Set(touched.value).add(field));
  return { now, all, shown, tried, refused, clear, touch };
}

/** One life cycle for all forms: edit copy, what changed, what is wrong, save once, reset. */
export function useForm<T extends object>(options: UseFormOptions<T>): UseFormReturn<T> {
  const kept = ref(JSON.stringify(options.initial()));
  const values = reactive(copy(options.initial())) as T;
  const isSaving = ref(false);
  const { now, all, shown, tried, refused, clear, touch } = useViolations(values, options.validate);
  const hasChanged = computed(() => now.value !== kept.value);
  const canSave = computed(() => hasChanged.value && !isSaving.value && Object.keys(all.value).length === 0);

  async function save(): Promise<boolean> {
    tried.value = true;
    if (!canSave.value) return false;
    isSaving.value = true;
    const sent = now.value;
    try {
      const answer = await options.save(copy(values));
      if (answer && Object.keys(answer).length > 0) {
        refused.value = { at: sent, violations: answer };
        return false;
      }
      kept.value = sent;
      clear();
      return true;
    } finally {
      isSaving.value = false;
    }
  }

  function reset(): void {
    Object.assign(values, JSON.parse(kept.value));
    clear();
  }

  return { values, violations: shown, hasChanged, canSave, isSaving: readonly(isSaving), touch, save, reset };
}
