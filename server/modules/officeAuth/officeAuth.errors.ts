import { conflict, unauthorised, waitFirst } from '../../http/errors';

/** One answer for an unknown address, a wrong password and somebody who left. */
export const signInRefused = () => unauthorised('signIn.refused', 'E-mail address or password is not right.');
export const signInWait = (seconds: number) =>
  waitFirst('signIn.wait', 'Too many wrong passwords in a row: wait before the next try.', seconds);
export const whichShop = (shops: { id: string; name: string }[]) =>
  conflict('signIn.whichShop', 'This address signs in at several shops: say which.', { shops });
export const sessionMissing = () => unauthorised('session.missing', 'Nobody is signed in.');
export const sessionExpired = () => unauthorised('session.expired', 'The session has ended: sign in again.');
