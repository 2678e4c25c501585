import { onBeforeUnmount, onMounted } from 'vue';
import { isForControl, isForField } from './keyTargets';

/** W10: so long after anything was typed, sent or shown, Enter is not yet a decision. */
export const KEY_GUARD_MS = 700;

/**
 * Enter does what the main button of the screen does. It counts for nothing right after the screen came up, right after
 * another Enter, and at the end of a burst of figures: a wrench acting as keyboard decides nothing.
 */
export function useMainKey(act: () => void, isOn: () => boolean = () => true): void {
  let quietFrom = 0;
  function onKeyDown(event: KeyboardEvent): void {
    const now = event.timeStamp;
    if (event.key !== 'Enter') {
      if (event.key.length === 1) quietFrom = now + KEY_GUARD_MS;
      return;
    }
    if (!isOn() || event.ctrlKey || event.altKey || event.metaKey || isForField(event) || isForControl(event)) return;
    event.preventDefault();
    const early = now < quietFrom;
    if (!event.repeat) quietFrom = now + KEY_GUARD_MS;
    if (!early && !event.repeat) act();
  }
  onMounted(() => {
    quietFrom = performance.now() + KEY_GUARD_MS;
    window.addEventListener('keydown', onKeyDown);
  });
  onBeforeUnmount(() => window.removeEventListener('keydown', onKeyDown));
}
