import type { Request, Response } from 'express';

/** Days a session lasts. */
export const SESSION_DAYS = 14;

const nameOf = (secure: boolean): string => (secure ? '__Host-boltwalk' : 'boltwalk');

/** The session's token, or null. */
export const readSessionCookie = (request: Request, secure: boolean): string | null => {
  const wanted = `${nameOf(secure)}=`;
  const found = (request.headers.cookie ?? '').split(/;\s*/).find((part) => part.startsWith(wanted));
  return found ? found.slice(wanted.length) : null;
};

/** Sets the session cookie, or takes it away with null. Scripts cannot read it; other sites cannot send it. */
export const writeSessionCookie = (response: Response, token: string | null, secure: boolean): void => {
  response.cookie(nameOf(secure), token ?? '', {
    httpOnly: true,
    sameSite: 'strict',
    secure,
    path: '/',
    maxAge: token === null ? 0 : SESSION_DAYS * 24 * 3_600_000,
  });
};
