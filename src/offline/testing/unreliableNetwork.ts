import type { FakeServer } from './fakeServer';

/** What becomes of one request on its way. */
export type Fate =
  | 'fine'
  | 'notReached'
  /** The server did it; the answer got lost (fault 6). */
  | 'replyLost'
  /** Delivered twice (fault 7). */
  | 'doubled'
  /** An older request arrives once more, before this one (fault 8). */
  | 'oldOneAgain'
  /** The answer is cut off in the middle. */
  | 'replyCut'
  /** A network's log-in page answers with 200 and HTML (fault 23). */
  | 'portalPage'
  | 'portalRedirect'
  /** A page in JSON that is not ours. */
  | 'foreignJson'
  | 'tooLarge'
  | 'tooMany'
  | 'illServer'
  /** The token has ended meanwhile (fault 24). */
  | 'tokenEnded';

/** Every fate there is. */
export const FATES: readonly Fate[] = [
  'fine',
  'notReached',
  'replyLost',
  'doubled',
  'oldOneAgain',
  'replyCut',
  'portalPage',
  'portalRedirect',
  'foreignJson',
  'tooLarge',
  'tooMany',
  'illServer',
  'tokenEnded',
];

const html = { 'content-type': 'text/html; charset=utf-8' };

const STAND_INS: Partial<Record<Fate, () => Response>> = {
  portalPage: () => new Response('<html>Welcome to the network</html>', { status: 200, headers: html }),
  portalRedirect: () => new Response(null, { status: 302, headers: { location: 'http://login.example/' } }),
  foreignJson: () => Response.json({ status: 'ok' }),
  tooLarge: () => new Response('<html>413</html>', { status: 413, headers: html }),
  tooMany: () =>
    Response.json({ error: { code: 'rate.tooMany', message: '' } }, { status: 429, headers: { 'retry-after': '7' } }),
  illServer: () => new Response('<html>503</html>', { status: 503, headers: html }),
};

const lost = (): never => {
  throw new TypeError('Failed to fetch');
};

/** A `fetch` through a network on which `fateOf` decides what becomes of each request. */
export function unreliableNetwork(server: FakeServer, fateOf: (path: string) => Fate): typeof fetch {
  const past: Request[] = [];
  const handleCopy = (request: Request): Promise<Response> => server.handle(request.clone());
  return async (input, init) => {
    const request = new Request(new URL(input as string, 'http://server'), { ...init, signal: null });
    const fate = fateOf(new URL(request.url).pathname);
    const standIn = STAND_INS[fate];
    if (standIn) return standIn();
    if (fate === 'notReached') return lost();
    if (fate === 'tokenEnded') server.expireTokens();
    const old = past.at(Math.floor(past.length / 2));
    if (fate === 'oldOneAgain' && old) await handleCopy(old);
    past.push(request.clone());
    const [answer] = await Promise.all([handleCopy(request), ...(fate === 'doubled' ? [handleCopy(request)] : [])]);
    if (fate === 'replyLost') return lost();
    if (fate === 'replyCut') return new Response((await answer.text()).slice(0, -3), answer);
    return answer;
  };
}
