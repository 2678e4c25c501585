import { inject, provide, type InjectionKey } from 'vue';

/** What waits on this tablet, for the chip at the top right of every screen. Read afresh; reactive. */
export interface StandTray {
  readonly waiting: number;
  readonly refused: number;
  open(): void;
}

const key: InjectionKey<StandTray> = Symbol('tray');

/** Makes the tray known to every screen below. */
export const provideTray = (tray: StandTray): void => provide(key, tray);

/** The tray of this tablet. */
export function useTray(): StandTray {
  const tray = inject(key);
  if (!tray) throw new Error('no tray is provided here');
  return tray;
}
