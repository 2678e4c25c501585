import { CSRF_HEADER, type OfficeMe } from '@shared/contracts/officeAuth.contract';
import type { TestServer } from './testServer';
import type { TestPerson } from './testShop';

/** What came back. `body` is JSON as parsed, or null. */
export interface Reply {
  status: number;
  // The tests look into answers of many shapes; each expectation names what it wants.
  body: Record<string, never> & { error?: { code: string; details?: Record<string, unknown> } };
  headers: Headers;
  bytes: Uint8Array;
}

/** Calls an address. */
export interface Caller {
  get(path: string): Promise<Reply>;
  send(method: string, path: string, body?: unknown): Promise<Reply>;
}

const replyOf = async (response: Response): Promise<Reply> => {
  const bytes = new Uint8Array(await response.arrayBuffer());
  const isJson = /^application\/json/.test(response.headers.get('content-type') ?? '');
  const body = (isJson ? JSON.parse(new TextDecoder().decode(bytes)) : {}) as Reply['body'];
  return { status: response.status, body, headers: response.headers, bytes };
};

/** A caller that sends these headers. */
export const callerWith = (server: TestServer, headers: Record<string, string>): Caller => {
  const call = async (method: string, path: string, body?: unknown): Promise<Reply> => {
    const raw = body instanceof Uint8Array;
    const type: Record<string, string> =
      body === undefined ? {} : { 'content-type': raw ? 'application/octet-stream' : 'application/json' };
    const sent = body === undefined ? {} : { body: raw ? new Uint8Array(body) : JSON.stringify(body) };
    return replyOf(await fetch(`${server.url}${path}`, { method, headers: { ...headers, ...type }, ...sent }));
  };
  return { get: (path) => call('GET', path), send: call };
};

/** Somebody who is nobody. */
export const anybody = (server: TestServer): Caller => callerWith(server, {});

/** Signs a person in at the office. */
export const signedIn = async (server: TestServer, person: TestPerson): Promise<Caller & { me: OfficeMe }> => {
  const { email, password } = person;
  const reply = await anybody(server).send('POST', '/api/office/sign-in', { email, password });
  if (reply.status !== 200) throw new Error(`sign-in of ${person.name}: ${reply.status} ${JSON.stringify(reply.body)}`);
  const cookie = (reply.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
  const me = reply.body as unknown as OfficeMe;
  return { ...callerWith(server, { cookie, [CSRF_HEADER]: me.csrf }), me };
};
