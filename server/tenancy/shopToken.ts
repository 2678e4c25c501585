import { isUuid } from '@shared/kernel/ids';

const PREFIX = 22;

/** The shop's id as 22 base64url characters: the beginning of every opaque token (decision 12). */
export const shopPrefix = (shop: string): string => Buffer.from(shop.replaceAll('-', ''), 'hex').toString('base64url');

/** The shop that a token names, or null when it names none. Says nothing about whether the token is good. */
export const shopOfToken = (token: string): string | null => {
  const hex = Buffer.from(token.slice(0, PREFIX), 'base64url').toString('hex');
  const shop = hex.replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, '$1-$2-$3-$4-$5');
  return token.length > PREFIX && isUuid(shop) ? shop : null;
};
