import { parseWalkEventData } from '@shared/contracts/walkEvents';
import type { WalkEventType } from '@shared/walk/events';

/**
 * The first field of an event's data that does not have its shape, or null. The rules are written for data that has it,
 * and what comes over the wire may be anything.
 */
export const misshapenField = (type: WalkEventType, data: unknown): string | null => {
  const parsed = parseWalkEventData(type, data);
  return parsed.ok ? null : `data.${parsed.error.path}`;
};
