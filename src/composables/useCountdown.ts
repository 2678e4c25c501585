import { onBeforeUnmount, readonly, ref, type Ref } from 'vue';

/** Seconds that are left of a wait, counted down on the screen. */
export function useCountdown(): { left: Readonly<Ref<number>>; start: (seconds: number) => void } {
  const left = ref(0);
  let end = 0;
  let timer: ReturnType<typeof setInterval> | undefined;
  const stop = (): void => clearInterval(timer);
  const tick = (): void => {
    left.value = Math.max(0, Math.ceil((end - performance.now()) / 1000));
    if (left.value === 0) stop();
  };
  onBeforeUnmount(stop);
  return {
    left: readonly(left),
    start: (seconds) => {
      stop();
      end = performance.now() + seconds * 1000;
      timer = setInterval(tick, 250);
      tick();
    },
  };
}
