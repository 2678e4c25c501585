import type { SendBackAction } from '@shared/walk/events';
import type { Violations } from './useForm';

/** One thing that is sent back: a hole, or the joint as a whole where `hole` is null (R11). */
export interface SendBackItem {
  hole: string | null;
  action: SendBackAction;
  note: string;
}

/** What a decision of the office carries: why, and the PIN of who decides. */
export interface DecisionValues {
  reason: string;
  pin: string;
}

const MOST_REASON = 500;

/** Six digits; whether they are right only the server knows. */
export const pinViolations = (pin: string): Violations => {
  if (pin === '') return { pin: { code: 'required' } };
  return /^\d{6}$/.test(pin) ? {} : { pin: { code: 'pin.sixDigits' } };
};

const reasonViolations = (reason: string, field: string): Violations => {
  if (reason.trim() === '') return { [field]: { code: 'required' } };
  return reason.length > MOST_REASON ? { [field]: { code: 'tooLong', params: { most: MOST_REASON } } } : {};
};

/** A decision needs a reason and a PIN. */
export const decisionViolations = ({ reason, pin }: DecisionValues): Violations => ({
  ...reasonViolations(reason, 'reason'),
  ...pinViolations(pin),
});

/** Actions that the joint as a whole can take: one fastener is restarted or replaced at its hole. */
export const actionsFor = (hole: string | null): SendBackAction[] =>
  hole === null ? ['answer', 'look', 'restartJoint'] : ['answer', 'look', 'restart', 'replace', 'restartJoint'];

/** What is missing in a send-back: something to send back, a note at each, the PIN. */
export function sendBackViolations({ items, pin }: { items: SendBackItem[]; pin: string }): Violations {
  const found: Violations = items.length === 0 ? { items: { code: 'required' } } : {};
  items.forEach(({ note }, index) => Object.assign(found, reasonViolations(note, `items.${index}.note`)));
  return { ...found, ...pinViolations(pin) };
}

/** The list with a hole added; the one that is there already stays as it is. */
export function withHole(items: readonly SendBackItem[], hole: string | null): SendBackItem[] {
  if (items.some((item) => item.hole === hole)) return [...items];
  return [...items, { hole, action: 'look', note: '' }];
}

/** The item with another hole: an action that the joint as a whole cannot take becomes a look. */
export const moveItem = (item: SendBackItem, hole: string | null): SendBackItem => ({
  ...item,
  hole,
  action: actionsFor(hole).includes(item.action) ? item.action : 'look',
});
