import type { Request, RequestHandler, Response, Router } from 'express';
import type { AnswerOf, BodyOf, EndpointDefinition, ParamsOf, QueryOf } from '@shared/contracts/defineEndpoint';
import type { Deps } from '../deps';
import { withShop, type ShopTx } from '../tenancy/withShop';
import { authenticateOffice, authenticateTablet, type Authenticated } from './authenticate';
import type { OfficeCaller, TabletCaller, Visit } from './callers';
import { writeSessionCookie } from './cookies';
import { AppError } from './errors';
import { isBinary, readBody } from './readBody';
import { validate } from './validate';

/** What every handler gets: the validated request and the world. */
export interface Input<E extends EndpointDefinition> {
  params: ParamsOf<E>;
  query: QueryOf<E>;
  body: BodyOf<E>;
  deps: Deps;
  visit: Visit;
  /** Sets (or with null clears) the session cookie of the answer. */
  setSession: (token: string | null) => void;
  /** Sets a header of the answer. */
  setHeader: (name: string, value: string) => void;
}

/** A success, or a refusal before which what was written is committed. */
export type Answer<E extends EndpointDefinition> = Promise<AnswerOf<E> | AppError>;

type InShop<E extends EndpointDefinition, C> = (input: Input<E> & { tx: ShopTx; caller: C }) => Answer<E>;

const inputOf = async <E extends EndpointDefinition>(
  endpoint: E,
  deps: Deps,
  request: Request,
  response: Response,
): Promise<Input<E>> => {
  const body = await readBody(endpoint, request, response);
  const schema = endpoint.body;
  return {
    params: (endpoint.params && validate(endpoint.params, request.params, 'params')) as ParamsOf<E>,
    query: (endpoint.query && validate(endpoint.query, request.query, 'query')) as QueryOf<E>,
    body: (schema && !isBinary(schema) ? validate(schema, body, 'body') : body) as BodyOf<E>,
    deps,
    visit: { ip: request.ip ?? '', userAgent: request.headers['user-agent'] ?? '' },
    setSession: (token) => writeSessionCookie(response, token, deps.config.secure),
    setHeader: (name, value) => response.setHeader(name, value),
  };
};

const send = (endpoint: EndpointDefinition, response: Response, answer: unknown): void => {
  if (answer instanceof AppError) throw answer;
  const created = endpoint.responses[201];
  const shape = created ?? endpoint.responses[200];
  response.status(created ? 201 : 200);
  if (shape && isBinary(shape)) {
    response.type(shape.contentType).end(answer);
  } else {
    response.json(answer);
  }
};

const add = (router: Router, endpoint: EndpointDefinition, handler: RequestHandler): void => {
  const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch';
  router[method](endpoint.path, handler);
};

const inShopRoute =
  <C>(authenticate: (endpoint: EndpointDefinition, request: Request, deps: Deps) => Authenticated<C>) =>
  <E extends EndpointDefinition>(router: Router, deps: Deps, endpoint: E, handler: InShop<E, C>): void => {
    add(router, endpoint, async (request, response) => {
      const known = authenticate(endpoint, request, deps);
      const input = await inputOf(endpoint, deps, request, response);
      const answer = await withShop(deps.client, known.shop, async (tx) => {
        const caller = await known.callerIn(tx);
        return handler({ ...input, tx, caller });
      });
      send(endpoint, response, answer);
    });
  };

/** A route for somebody signed in at the office: token → validate → session and right → one transaction → commit → answer. */
export const officeRoute = inShopRoute<OfficeCaller>(authenticateOffice);
/** A route for an enrolled tablet with its bearer. */
export const tabletRoute = inShopRoute<TabletCaller>(authenticateTablet);

/** A route for anybody. The handler itself enters the shop that the request names, by `inShop`. */
export const publicRoute = <E extends EndpointDefinition>(
  router: Router,
  deps: Deps,
  endpoint: E,
  handler: (
    input: Input<E> & { inShop: <T>(shop: string, work: (tx: ShopTx) => Promise<T>) => Promise<T> },
  ) => Answer<E>,
): void => {
  add(router, endpoint, async (request, response) => {
    const input = await inputOf(endpoint, deps, request, response);
    send(endpoint, response, await handler({ ...input, inShop: (shop, work) => withShop(deps.client, shop, work) }));
  });
};
