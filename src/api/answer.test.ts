// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { answerOf } from './answer';
import { tabletClient } from './tabletClient';
import type { challenge } from '@shared/contracts/tablets.contract';

const html = { 'content-type': 'text/html' };

describe('an answer', () => {
  it('is done only when it is JSON of a success', async () => {
    expect(await answerOf(Response.json({ a: 1 }, { status: 201 }))).toEqual({
      kind: 'done',
      value: { a: 1 },
      status: 201,
    });
  });

  it.each([
    ['a page with status 200', new Response('<html>', { status: 200, headers: html })],
    ['a redirect', new Response(null, { status: 302, headers: { location: '/login' } })],
    ['JSON that is cut off', new Response('{"a":', { status: 200, headers: { 'content-type': 'application/json' } })],
    ['JSON that is no object', Response.json([1])],
    ['nothing at all', new Response(null, { status: 204 })],
    ['a refusal that is a page', new Response('<html>', { status: 403, headers: html })],
    ['a refusal in another shape', Response.json({ message: 'no' }, { status: 400 })],
  ])('is somebody else’s when it is %s (fault 23)', async (_, response) => {
    expect((await answerOf(response)).kind).toBe('notOurs');
  });

  it('keeps code, message and details of a refusal', async () => {
    const error = { code: 'batch.hole', message: 'missing', details: { expectedSeq: 4 } };
    expect(await answerOf(Response.json({ error }, { status: 409 }))).toEqual({
      kind: 'refused',
      refusal: { status: 409, ...error },
    });
  });

  it('is busy with the pause the server asks for', async () => {
    const response = new Response('', { status: 503, headers: { 'retry-after': '12' } });
    expect(await answerOf(response)).toMatchObject({ kind: 'busy', code: 'server.ill', retryAfterMs: 12_000 });
    expect(await answerOf(new Response('', { status: 429 }))).toMatchObject({
      code: 'server.busy',
      retryAfterMs: null,
    });
  });

  it('is too large whoever says so', async () => {
    const answer = await answerOf(new Response('<html>', { status: 413, headers: html }));
    expect(answer).toMatchObject({ kind: 'refused', refusal: { code: 'batch.tooLarge' } });
  });
});

describe('the tablet’s client', () => {
  const call = { method: 'POST', path: '/api/tablets/challenge', body: { shop: 's', tablet: 't' } } as const;

  it('sends neither cookies nor follows redirects, and carries the bearer', async () => {
    let seen: RequestInit | undefined;
    const client = tabletClient({
      fetch: (_, init) => {
        seen = init;
        return Promise.resolve(Response.json({ challenge: 'c', expiresAt: 'x' }));
      },
    });
    expect((await client.call<typeof challenge>({ ...call, token: 'tok' })).kind).toBe('done');
    expect(seen).toMatchObject({ credentials: 'omit', redirect: 'manual', cache: 'no-store' });
    expect(seen?.headers).toMatchObject({ authorization: 'Bearer tok', 'content-type': 'application/json' });
  });

  it('calls every way of not being reached by one name', async () => {
    const client = tabletClient({ fetch: () => Promise.reject(new TypeError('Failed to fetch')) });
    expect(await client.call<typeof challenge>(call)).toEqual({ kind: 'unreachable' });
  });
});
