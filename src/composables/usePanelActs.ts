import { ref, type Ref } from 'vue';
import type { ActMore, LogRefusal, WalkAccess, WalkAct } from './walkAccess';

/** One act at a time, and why the last one was refused. */
export interface PanelActs {
  busy: Ref<boolean>;
  refusal: Ref<LogRefusal | null>;
  /** True when the event is saved for good. A second call while one is being saved does nothing. */
  act: (act: WalkAct, more?: ActMore) => Promise<boolean>;
}

/** Acts of a panel of the walk, guarded against doubling. */
export function usePanelActs(walk: WalkAccess): PanelActs {
  const busy = ref(false);
  const refusal = ref<LogRefusal | null>(null);
  async function act(what: WalkAct, more?: ActMore): Promise<boolean> {
    if (busy.value) return false;
    busy.value = true;
    try {
      refusal.value = await walk.act(what, more);
      return refusal.value === null;
    } finally {
      busy.value = false;
    }
  }
  return { busy, refusal, act };
}
