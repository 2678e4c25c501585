import type { AnswerOf, EndpointDefinition } from '@shared/contracts/defineEndpoint';
import { CSRF_HEADER } from '@shared/contracts/officeAuth.contract';
import { answerOf, type Answer } from './answer';
import { callUrl, type CalledAddress } from './callUrl';
import type { CallParts } from './tabletClient';

/** What the client needs of the world. `csrf` is asked anew for every write: signing in again changes it. */
export interface OfficeClientDeps {
  fetch: typeof fetch;
  csrf: () => string;
  timeoutMs?: number;
}

/**
 * Why a call of the office gave nothing. `code` is the server's own, or `office.busy`, `office.notOurs` (a proxy or a
 * captive portal answered) or `office.unreachable`; it is translated as `office.errors.<code>`.
 */
export class OfficeFailure extends Error {
  readonly code: string;
  /** HTTP status; 0 when nobody answered. */
  readonly status: number;
  readonly details: Record<string, unknown>;

  constructor(code: string, status: number, details: Record<string, unknown> = {}) {
    super(code);
    this.name = 'OfficeFailure';
    this.code = code;
    this.status = status;
    this.details = details;
  }
}

/** Calls the server with the session of whoever is signed in at the office. Throws `OfficeFailure`. */
export interface OfficeClient {
  call<E extends EndpointDefinition>(endpoint: E, parts: CallParts<E>, signal?: AbortSignal): Promise<AnswerOf<E>>;
  /** A file: the bytes as they came. */
  file<E extends EndpointDefinition>(endpoint: E, parts: CallParts<E>, signal?: AbortSignal): Promise<Blob>;
}

const TIMEOUT_MS = 30_000;

type LooseParts = Omit<CalledAddress, 'path'> & { body?: unknown };

function failureOf(answer: Exclude<Answer<unknown>, { kind: 'done' }>): OfficeFailure {
  switch (answer.kind) {
    case 'refused':
      return new OfficeFailure(answer.refusal.code, answer.refusal.status, answer.refusal.details);
    case 'busy': {
      const own = answer.code === 'server.busy' || answer.code === 'server.ill';
      return new OfficeFailure(own ? 'office.busy' : answer.code, answer.status, answer.details);
    }
    case 'notOurs':
      return new OfficeFailure('office.notOurs', answer.status);
    case 'unreachable':
      return new OfficeFailure('office.unreachable', 0);
  }
}

/** A client over `fetch`; the session itself is an httpOnly cookie that no script sees. */
export function officeClient({ fetch, csrf, timeoutMs = TIMEOUT_MS }: OfficeClientDeps): OfficeClient {
  async function ask(endpoint: EndpointDefinition, parts: LooseParts, signal?: AbortSignal): Promise<Response> {
    const { method, path } = endpoint;
    const headers: Record<string, string> = { accept: 'application/json, application/pdf' };
    if (method !== 'GET') headers[CSRF_HEADER] = csrf();
    if (parts.body !== undefined) headers['content-type'] = 'application/json';
    const timeout = AbortSignal.timeout(timeoutMs);
    try {
      return await fetch(callUrl('', { ...parts, path }), {
        method,
        headers,
        body: parts.body === undefined ? null : JSON.stringify(parts.body),
        credentials: 'same-origin',
        cache: 'no-store',
        redirect: 'manual',
        signal: signal ? AbortSignal.any([signal, timeout]) : timeout,
      });
    } catch {
      // Refused connection, no network and time-out reject alike: nobody answered.
      throw new OfficeFailure('office.unreachable', 0);
    }
  }

  return {
    call: async <E extends EndpointDefinition>(endpoint: E, parts: CallParts<E>, signal?: AbortSignal) => {
      const answer = await answerOf<AnswerOf<E>>(await ask(endpoint, parts, signal));
      if (answer.kind !== 'done') throw failureOf(answer);
      return answer.value;
    },
    file: async <E extends EndpointDefinition>(endpoint: E, parts: CallParts<E>, signal?: AbortSignal) => {
      const response = await ask(endpoint, parts, signal);
      const isFile = response.ok && !/json|html/i.test(response.headers.get('content-type') ?? 'html');
      if (isFile) return response.blob();
      const answer = await answerOf<unknown>(response);
      throw answer.kind === 'done' ? new OfficeFailure('office.notOurs', response.status) : failureOf(answer);
    },
  };
}
