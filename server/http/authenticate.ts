import type { Request } from 'express';
import type { EndpointDefinition } from '@shared/contracts/defineEndpoint';
import { CSRF_HEADER } from '@shared/contracts/officeAuth.contract';
import { hasRight } from '@shared/people/roles';
import type { Deps } from '../deps';
import { sessionCaller } from '../modules/officeAuth/officeAuth.usecases';
import { readTabletToken } from '../modules/tablets/tabletTokens';
import { tabletCaller } from '../modules/tablets/tablets.usecases';
import { shopOfToken } from '../tenancy/shopToken';
import type { ShopTx } from '../tenancy/withShop';
import type { OfficeCaller, TabletCaller } from './callers';
import { readSessionCookie } from './cookies';
import { forbidden, unauthorised } from './errors';

/** A caller whose token names a shop; who it is, is asked inside that shop. */
export interface Authenticated<C> {
  shop: string;
  callerIn(tx: ShopTx): Promise<C>;
}

/**
 * Somebody of the office. Throws 401 `session.missing` / `session.expired`, 403 `csrf.wrong` on a write without the
 * session's own token, 403 `right.missing`.
 */
export const authenticateOffice = (
  endpoint: EndpointDefinition,
  request: Request,
  deps: Deps,
): Authenticated<OfficeCaller> => {
  const token = readSessionCookie(request, deps.config.secure);
  const shop = token === null ? null : shopOfToken(token);
  if (!token || !shop) throw unauthorised('session.missing', 'Nobody is signed in.');
  return {
    shop,
    async callerIn(tx) {
      const caller = await sessionCaller(deps, tx, token);
      if (endpoint.method !== 'GET' && request.headers[CSRF_HEADER] !== caller.session.csrf) {
        throw forbidden('csrf.wrong', 'The request does not carry the token of this session.');
      }
      if (endpoint.right && !hasRight(caller.person.roles, endpoint.right)) {
        throw forbidden('right.missing', 'Your roles do not allow this.', { right: endpoint.right });
      }
      return caller;
    },
  };
};

/** A tablet. Throws 401 `token.missing` / `token.expired`, 403 `tablet.revoked`. */
export const authenticateTablet = (
  _endpoint: EndpointDefinition,
  request: Request,
  deps: Deps,
): Authenticated<TabletCaller> => {
  const [scheme, token] = (request.headers.authorization ?? '').split(' ');
  if (scheme !== 'Bearer' || !token) throw unauthorised('token.missing', 'The tablet sent no token.');
  const named = readTabletToken(deps, token);
  if (!named) throw unauthorised('token.expired', 'The token is not valid any more: ask for a new one.');
  return { shop: named.shop, callerIn: (tx) => tabletCaller(tx, named.tablet) };
};
