import { onBeforeUnmount, onMounted, ref, type Ref } from 'vue';

/** Size of an element in CSS px, so that the map can be drawn one to one and keep its sizes true. */
export function useBox(element: Ref<Element | null>, first = { width: 712, height: 560 }): Ref<typeof first> {
  const box = ref({ ...first });
  let observer: ResizeObserver | null = null;
  const read = (width: number, height: number): void => {
    if (width > 0 && height > 0) box.value = { width: Math.round(width), height: Math.round(height) };
  };
  onMounted(() => {
    if (!element.value || typeof ResizeObserver === 'undefined') return;
    const now = element.value.getBoundingClientRect();
    read(now.width, now.height);
    observer = new ResizeObserver(([entry]) => {
      if (entry) read(entry.contentRect.width, entry.contentRect.height);
    });
    observer.observe(element.value);
  });
  onBeforeUnmount(() => observer?.disconnect());
  return box;
}
