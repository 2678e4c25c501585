import express, { type Request, type RequestHandler, type Response } from 'express';
import type { BinaryBody, EndpointDefinition } from '@shared/contracts/defineEndpoint';
import { AppError, badRequest } from './errors';

const DEFAULT_LIMIT = 256 * 1024;

/** True for the description of a raw body. */
export const isBinary = (body: object | undefined): body is BinaryBody =>
  body !== undefined && 'kind' in body && body.kind === 'binary';

const parsers = new WeakMap<EndpointDefinition, RequestHandler>();

const parserOf = (endpoint: EndpointDefinition): RequestHandler => {
  const known = parsers.get(endpoint);
  if (known) return known;
  const limit = endpoint.limit ?? DEFAULT_LIMIT;
  const made = isBinary(endpoint.body)
    ? express.raw({ limit, type: () => true })
    : express.json({ limit, strict: true, type: 'application/json' });
  parsers.set(endpoint, made);
  return made;
};

interface ParserError {
  type?: string;
  status?: number;
}

/** What a body parser complains about, as an answer: always the sender's fault, never a 500. */
const bodyError = (error: unknown, endpoint: EndpointDefinition): AppError => {
  const { type, status } = error as ParserError;
  if (type === 'entity.too.large') {
    const { limit = DEFAULT_LIMIT, tooLarge = 'body.tooLarge' } = endpoint;
    return new AppError(413, tooLarge, `The body is larger than ${limit} bytes.`, { limit });
  }
  if (type === 'entity.parse.failed') return badRequest('body.notJson', 'The body is no JSON.');
  if (type === 'encoding.unsupported' || type === 'charset.unsupported') {
    return new AppError(415, 'body.wrongEncoding', 'This encoding of the body is not understood.');
  }
  if (type === 'request.aborted' || type === 'request.size.invalid') {
    return badRequest('body.cut', 'The body ended too early.');
  }
  if (typeof status === 'number' && status < 500) return badRequest('body.unreadable', 'The body cannot be read.');
  throw error;
};

const isJsonType = (request: Request): boolean => /^application\/json\b/i.test(request.headers['content-type'] ?? '');

/** Reads the body that the endpoint expects. Throws an AppError on one that is malformed, cut, too large or of another type. */
export const readBody = async (
  endpoint: EndpointDefinition,
  request: Request,
  response: Response,
): Promise<unknown> => {
  if (endpoint.body === undefined) return undefined;
  if (!isBinary(endpoint.body) && !isJsonType(request)) {
    throw new AppError(415, 'body.wrongType', 'The body must be sent as application/json.');
  }
  const failure = await new Promise<unknown>((resolve) => {
    void parserOf(endpoint)(request, response, resolve);
  });
  if (failure) throw bodyError(failure, endpoint);
  return request.body as unknown;
};
