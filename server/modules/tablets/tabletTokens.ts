import type { Deps } from '../../deps';
import { makeMacToken, readMacToken } from '../../keys/macToken';

const TOKEN_MINUTES = 15;
const CHALLENGE_MINUTES = 2;

const later = (now: Date, minutes: number): Date => new Date(now.getTime() + minutes * 60_000);

/** A bearer for a tablet: a quarter of an hour. */
export const makeTabletToken = (deps: Deps, shop: string, tablet: string): { token: string; expiresAt: string } => {
  const until = later(deps.clock.now(), TOKEN_MINUTES);
  const token = makeMacToken(deps.config.appSecret, 'tablet token', [shop, tablet], until);
  return { token, expiresAt: until.toISOString() };
};

/** The tablet that a bearer names, or null when it is none of ours or has run out. */
export const readTabletToken = (deps: Deps, token: string): { shop: string; tablet: string } | null => {
  const read = readMacToken(deps.config.appSecret, 'tablet token', token, deps.clock.now());
  const [shop, tablet] = read?.fields ?? [];
  return read && !read.expired && shop && tablet ? { shop, tablet } : null;
};

/** A challenge that only this tablet may answer, for two minutes. */
export const makeChallenge = (deps: Deps, shop: string, tablet: string): { challenge: string; expiresAt: string } => {
  const until = later(deps.clock.now(), CHALLENGE_MINUTES);
  const fields = [shop, tablet, deps.ids.token(12)];
  const challenge = makeMacToken(deps.config.appSecret, 'tablet challenge', fields, until);
  return { challenge, expiresAt: until.toISOString() };
};

/** Whether a challenge is ours, for this tablet, and still good. */
export const challengeState = (
  deps: Deps,
  challenge: string,
  shop: string,
  tablet: string,
): 'good' | 'expired' | 'foreign' => {
  const read = readMacToken(deps.config.appSecret, 'tablet challenge', challenge, deps.clock.now());
  if (!read || read.fields[0] !== shop || read.fields[1] !== tablet) return 'foreign';
  return read.expired ? 'expired' : 'good';
};
