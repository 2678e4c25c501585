import type { z } from 'zod';
import type { Right } from '../people/roles';

/** Who may call: anybody, somebody signed in at the office (cookie), or an enrolled tablet (15-minute bearer). */
export type EndpointAuth = 'public' | 'office' | 'tablet';

/** What both sides of the wire know of one endpoint. `{ kind: 'binary' }` bodies are raw bytes, not JSON. */
export interface EndpointDefinition {
  method: 'GET' | 'POST' | 'PUT' | 'PATCH';
  /** Path as Express writes it, parameters with a colon. */
  path: `/api/${string}`;
  auth: EndpointAuth;
  /** Right that one of the caller's roles must give (office only); absent = being signed in is enough. */
  right?: Right;
  params?: z.ZodType;
  query?: z.ZodType;
  body?: z.ZodType | BinaryBody;
  /** Largest body in bytes; absent = 256 KiB. */
  limit?: number;
  /** Code of the 413 for a larger one; absent = `body.tooLarge`. */
  tooLarge?: string;
  /** Answers by status; errors share `errorAnswer` and are not listed. */
  responses: Partial<Record<200 | 201, z.ZodType | BinaryBody>>;
}

/** A body or answer of raw bytes. */
export interface BinaryBody {
  kind: 'binary';
  contentType: string;
}

/** Keeps the exact types of a definition, so that client and server infer from it. */
export const defineEndpoint = <const E extends EndpointDefinition>(endpoint: E): E => endpoint;

type Parsed<S> = S extends z.ZodType ? z.output<S> : S extends BinaryBody ? Uint8Array : undefined;
type Given<S> = S extends z.ZodType ? z.input<S> : S extends BinaryBody ? Uint8Array : undefined;
type Field<E, K extends string> = E extends Record<K, infer S> ? S : undefined;

/** Parameters of the path after validation. */
export type ParamsOf<E extends EndpointDefinition> = Parsed<Field<E, 'params'>>;
/** Query after validation. */
export type QueryOf<E extends EndpointDefinition> = Parsed<Field<E, 'query'>>;
/** Body after validation (what a handler receives). */
export type BodyOf<E extends EndpointDefinition> = Parsed<Field<E, 'body'>>;
/** Body before validation (what a client sends). */
export type SentBodyOf<E extends EndpointDefinition> = Given<Field<E, 'body'>>;
/** Query before validation (what a client sends). */
export type SentQueryOf<E extends EndpointDefinition> = Given<Field<E, 'query'>>;
/** Answer of a success. */
export type AnswerOf<E extends EndpointDefinition> =
  E['responses'] extends Partial<Record<200 | 201, infer S>> ? Parsed<Exclude<S, undefined>> : never;
