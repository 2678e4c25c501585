import type { AnswerOf, EndpointDefinition, ParamsOf, SentBodyOf, SentQueryOf } from '@shared/contracts/defineEndpoint';
import { answerOf, type Answer } from './answer';
import { callUrl, type CalledAddress } from './callUrl';

/*
 * The tablet speaks the contracts by their types alone: the schemas stay out of the walk's bundle, and a new server may
 * answer with fields that this program does not know yet.
 */

/** The parts of a call that an endpoint asks for, and no others. */
export type CallParts<E extends EndpointDefinition> = (ParamsOf<E> extends undefined
  ? object
  : { params: ParamsOf<E> }) &
  (SentQueryOf<E> extends undefined ? object : { query: SentQueryOf<E> }) &
  (SentBodyOf<E> extends undefined ? object : { body: SentBodyOf<E> });

/** A call of one endpoint. Method and path are checked against the contract by the compiler. */
export type TabletCall<E extends EndpointDefinition> = CallParts<E> & {
  method: E['method'];
  path: E['path'];
  /** Bearer; absent for the calls by which one is got. */
  token?: string;
};

/** What the client needs of the world. */
export interface TabletClientDeps {
  fetch: typeof fetch;
  /** Origin of the server; empty for our own. */
  origin?: string;
  timeoutMs?: number;
}

/** Calls the server as a tablet. Never throws: whatever happens is an `Answer`. */
export interface TabletClient {
  call<E extends EndpointDefinition>(call: TabletCall<E>): Promise<Answer<AnswerOf<E>>>;
}

const TIMEOUT_MS = 30_000;

interface LooseCall extends CalledAddress {
  method: string;
  token?: string;
  body?: unknown;
}

function requestOf({ method, token, body }: LooseCall, timeoutMs: number): RequestInit {
  const binary = body instanceof Uint8Array;
  const headers: Record<string, string> = { accept: 'application/json' };
  if (token !== undefined) headers.authorization = `Bearer ${token}`;
  if (body !== undefined) headers['content-type'] = binary ? 'application/octet-stream' : 'application/json';
  return {
    method,
    headers,
    body: body === undefined ? null : binary ? new Uint8Array(body) : JSON.stringify(body),
    // The tablet is known by its token, never by somebody's session in this browser (decision 9, fault 24).
    credentials: 'omit',
    cache: 'no-store',
    redirect: 'manual',
    signal: AbortSignal.timeout(timeoutMs),
  };
}

/** A client over `fetch`. */
export function tabletClient({ fetch, origin = '', timeoutMs = TIMEOUT_MS }: TabletClientDeps): TabletClient {
  return {
    call: async <E extends EndpointDefinition>(call: TabletCall<E>): Promise<Answer<AnswerOf<E>>> => {
      const loose = call as unknown as LooseCall;
      let response: Response;
      try {
        response = await fetch(callUrl(origin, loose), requestOf(loose, timeoutMs));
      } catch {
        // `fetch` rejects alike for no network, refused connection, TLS error and time-out; all mean: not reached.
        return { kind: 'unreachable' };
      }
      return answerOf<AnswerOf<E>>(response);
    },
  };
}
