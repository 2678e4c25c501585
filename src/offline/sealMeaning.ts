import type { WalkAct } from './walkAct';

/**
 * The meaning that is sealed with a PIN, so that a seal made for one thing cannot be used for another: a signature's own
 * meaning, else the name of the event.
 */
export const sealMeaning = (act: WalkAct): string =>
  act.type === 'walk.signed' || act.type === 'walk.countersigned' ? act.data.meaning : act.type;
