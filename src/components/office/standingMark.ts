import type { JointStandingName } from '@/composables/jointStanding';
import type { MarkKind } from './markKind';

const MARKS: Readonly<Record<JointStandingName, MarkKind>> = {
  attention: 'look',
  stopped: 'no',
  sentBack: 'no',
  signed: 'waits',
  review: 'waits',
  walking: 'half',
  strippedDown: 'away',
  notFinal: 'away',
  voided: 'gone',
  neverOpened: 'free',
  finished: 'done',
};

/** The sign beside a joint's standing. */
export const standingMark = (name: JointStandingName): MarkKind => MARKS[name];
