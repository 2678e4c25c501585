import { createHmac, hkdfSync, timingSafeEqual } from 'node:crypto';

const SEPARATOR = '.';

const macOf = (secret: string, purpose: string, body: string): Buffer =>
  createHmac('sha256', Buffer.from(hkdfSync('sha256', secret, '', `boltwalk ${purpose} 1`, 32)))
    .update(body)
    .digest();

/** A short-lived token the server need not store: fields, the moment it ends, and a MAC bound to its purpose. */
export const makeMacToken = (secret: string, purpose: string, fields: readonly string[], until: Date): string => {
  const body = [...fields, String(until.getTime())].join(SEPARATOR);
  return `${body}${SEPARATOR}${macOf(secret, purpose, body).toString('base64url')}`;
};

/** The fields of a token made by `makeMacToken`, or null when it is not ours; `expired` when its time is over. */
export const readMacToken = (
  secret: string,
  purpose: string,
  token: string,
  now: Date,
): { fields: string[]; expired: boolean } | null => {
  const parts = token.split(SEPARATOR);
  const mac = Buffer.from(parts.pop() ?? '', 'base64url');
  const expected = macOf(secret, purpose, parts.join(SEPARATOR));
  if (mac.length !== expected.length || !timingSafeEqual(mac, expected)) return null;
  const until = Number(parts.pop());
  return { fields: parts, expired: until < now.getTime() };
};
