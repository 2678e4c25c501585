import { badRequest, conflict, forbidden, waitFirst } from '../../http/errors';
import type { AppError } from '../../http/errors';

/** Why a PIN does not count. */
export type PinRefusal =
  { code: 'pin.wrong' | 'pin.notSet' | 'pin.personLeft' | 'pin.personUnknown' } | { code: 'pin.wait'; seconds: number };

/** A refused PIN as an answer to a person who waits for it. */
export const pinError = (refusal: PinRefusal): AppError => {
  switch (refusal.code) {
    case 'pin.wrong':
      return forbidden('pin.wrong', 'The PIN is not right.');
    case 'pin.notSet':
      return conflict('pin.notSet', 'This person has set no PIN yet.');
    case 'pin.personLeft':
      return forbidden('pin.personLeft', 'This person has left the shop.');
    case 'pin.personUnknown':
      return forbidden('pin.personUnknown', 'This shop knows no such person.');
    case 'pin.wait':
      return waitFirst('pin.wait', 'Too many wrong PINs in a row: wait before the next try.', refusal.seconds);
  }
};

export const sealUnreadable = () => badRequest('seal.unreadable', 'The sealed PIN cannot be opened.');
export const sealElsewhere = () => badRequest('seal.otherEvent', 'The PIN was sealed for something else.');
export const sealStale = () =>
  badRequest('seal.stale', 'The PIN was sealed too long ago: check the clock of the tablet.');
