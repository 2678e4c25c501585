import { onBeforeUnmount, onMounted, type Ref } from 'vue';

const inField = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.closest('input, textarea, select, [contenteditable], [role=dialog]') !== null;

/** Where an arrow key leads from one row to the next; −1 is "not on a row yet". */
export function rowAfter(at: number, key: string, count: number): number | null {
  if (count === 0) return null;
  switch (key) {
    case 'ArrowDown':
      return Math.min(count - 1, at + 1);
    case 'ArrowUp':
      return Math.max(0, at < 0 ? 0 : at - 1);
    case 'Home':
      return 0;
    case 'End':
      return count - 1;
    default:
      return null;
  }
}

/**
 * Keys of a list: arrows, Home and End go from row to row, `/` to the search. Rows are the links marked `data-row` inside
 * `list`, so Enter opens by itself; nothing happens while a field has the focus or a modifier is held.
 */
export function useRowKeys(list: Ref<HTMLElement | null>): { focusRow: (index: number) => void } {
  const rows = (): HTMLElement[] => [...(list.value?.querySelectorAll<HTMLElement>('[data-row]') ?? [])];
  const focusRow = (index: number): void => rows()[index]?.focus();

  function onKey(event: KeyboardEvent): void {
    if (event.defaultPrevented || event.ctrlKey || event.altKey || event.metaKey || inField(event.target)) return;
    if (event.key === '/') {
      const find = document.querySelector<HTMLInputElement>('[data-find]');
      if (!find) return;
      find.focus();
      find.select();
    } else {
      const found = rows();
      const at = found.indexOf(document.activeElement as HTMLElement);
      const onPage = at >= 0 || document.activeElement === document.body || document.activeElement?.tagName === 'H1';
      const next = onPage ? rowAfter(at, event.key, found.length) : null;
      if (next === null) return;
      found[next]?.focus();
    }
    event.preventDefault();
  }
  onMounted(() => window.addEventListener('keydown', onKey));
  onBeforeUnmount(() => window.removeEventListener('keydown', onKey));
  return { focusRow };
}
