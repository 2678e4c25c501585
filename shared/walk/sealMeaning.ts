import type { WalkEventType } from './events';

/**
 * The meaning that is sealed with a PIN, so that a seal made for one thing cannot be used for another: a signature's own
 * meaning, else the name of the event (decision 6). Tablet and server compare exactly this text.
 */
export const sealMeaning = (act: { type: WalkEventType; data: object }): string =>
  'meaning' in act.data && typeof act.data.meaning === 'string' ? act.data.meaning : act.type;
