/** What came back from the server, sorted by what can be done about it. */
export type Answer<T> =
  | { kind: 'done'; value: T; status: number }
  /** The server said no, and why. */
  | { kind: 'refused'; refusal: ServerRefusal }
  /** Come again later: too much at once, or the server is ill. */
  | { kind: 'busy'; status: number; code: string; retryAfterMs: number | null; details?: Record<string, unknown> }
  /** Somebody else answered: a captive portal, a proxy, another program (fault 23). Nothing counts as sent. */
  | { kind: 'notOurs'; status: number }
  /** Nobody answered: no network, no server, TLS error, or it took too long. */
  | { kind: 'unreachable' };

/** A refusal as the server words it; `code` is translated as `errors.<code>`. */
export interface ServerRefusal {
  status: number;
  code: string;
  message: string;
  details: Record<string, unknown>;
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const isJson = (response: Response): boolean =>
  /^application\/json\b/i.test(response.headers.get('content-type') ?? '');

async function jsonOf(response: Response): Promise<unknown> {
  try {
    return await response.json();
  } catch {
    // Cut off on the way, or no JSON after all: not an answer of ours.
    return undefined;
  }
}

function retryAfterOf(response: Response): number | null {
  const seconds = Number(response.headers.get('retry-after') ?? Number.NaN);
  return Number.isFinite(seconds) && seconds >= 0 ? seconds * 1000 : null;
}

function refusalOf(status: number, body: unknown): ServerRefusal | null {
  const error = isRecord(body) ? body.error : undefined;
  if (!isRecord(error) || typeof error.code !== 'string') return null;
  const message = typeof error.message === 'string' ? error.message : '';
  return { status, code: error.code, message, details: isRecord(error.details) ? error.details : {} };
}

async function failureOf(response: Response): Promise<Answer<never>> {
  const { status } = response;
  const refusal = isJson(response) ? refusalOf(status, await jsonOf(response)) : null;
  if (status === 429 || status >= 500) {
    const code = refusal?.code ?? (status === 429 ? 'server.busy' : 'server.ill');
    const details = refusal ? { details: refusal.details } : {};
    return { kind: 'busy', status, code, retryAfterMs: retryAfterOf(response), ...details };
  }
  // A proxy in between refuses a large body with a page of its own: that too has to be understood as too large.
  if (status === 413) {
    const tooLarge = { status, code: 'batch.tooLarge', message: '', details: {} };
    return { kind: 'refused', refusal: refusal ?? tooLarge };
  }
  return refusal ? { kind: 'refused', refusal } : { kind: 'notOurs', status };
}

/**
 * Sorts an answer. Only JSON of ours with a success status is *done*: a redirect, an HTML page with status 200 and a
 * JSON without our shape are somebody else's.
 */
export async function answerOf<T>(response: Response): Promise<Answer<T>> {
  const { status } = response;
  if (response.type === 'opaqueredirect' || response.redirected || (status >= 300 && status < 400)) {
    return { kind: 'notOurs', status };
  }
  if (!response.ok) return failureOf(response);
  if (!isJson(response)) return { kind: 'notOurs', status };
  const value = await jsonOf(response);
  return isRecord(value) ? { kind: 'done', value: value as T, status } : { kind: 'notOurs', status };
}
