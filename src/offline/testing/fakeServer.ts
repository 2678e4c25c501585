import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { QuarantinedEvent, Receipt } from '@shared/contracts/sync.contract';
import { bytesToHex } from '@shared/record/bytes';
import { hashText } from '@shared/record/chain';
import type { PublicJwk } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { verifyDetached } from '@shared/record/signature';
import { tokenProof } from '../tabletAuth';
import { webRecordCrypto } from '../webCrypto';

/** A refusal as the server words it. */
const refused = (status: number, code: string, details?: Record<string, unknown>): Response =>
  Response.json({ error: { code, message: code, ...(details ? { details } : {}) } }, { status });

const emptyAnswer = (): CatalogueAnswer => ({
  cursor: 1,
  epoch: 'epoch-1',
  full: false,
  now: '2026-06-13T08:00:00.000Z',
  settings: null,
  people: [],
  wrenches: [],
  procedures: [],
  jobs: [],
  joints: [],
  walks: [],
  orders: [],
  confirmations: [],
});

/**
 * A server in memory that keeps the contract's promises: batches are whole or refused, repeated events change nothing,
 * a hole is refused, another event at a stored place goes to a branch of its own. For tests of the tablet alone.
 */
export class FakeServer {
  readonly chains = new Map<string, SignedEvent[]>();
  readonly blobs = new Map<string, Uint8Array>();
  readonly seals = new Map<string, string>();
  readonly reports: unknown[] = [];
  answer: CatalogueAnswer = emptyAnswer();
  /** Hashes of events that the rules here will never take. */
  readonly poison = new Set<string>();
  readonly tokens = new Set<string>();
  revoked = false;
  /** Events stored, counted: one for each row that was ever added. */
  stored = 0;
  #issued = 0;
  /** One batch at a time, as the row lock of a walk makes it. */
  #turn: Promise<unknown> = Promise.resolve();
  readonly #record = webRecordCrypto();
  #key: { kid: string; publicJwk: PublicJwk } | null;

  constructor(key: { kid: string; publicJwk: PublicJwk } | null) {
    this.#key = key;
  }

  /** The tablet with this key is enrolled from now on. */
  admit(key: { kid: string; publicJwk: PublicJwk }): void {
    this.#key = key;
  }

  /** A bearer that is taken. */
  issueToken(): string {
    const token = `token-${++this.#issued}`;
    this.tokens.add(token);
    return token;
  }

  /** Everything that is signed in has to sign in again (fault 24). */
  expireTokens(): void {
    this.tokens.clear();
  }

  chainOf(walk: string): SignedEvent[] {
    return this.chains.get(walk) ?? [];
  }

  async handle(request: Request): Promise<Response> {
    const { pathname } = new URL(request.url);
    if (pathname === '/api/tablets/challenge') return Response.json({ challenge: 'c1', expiresAt: this.answer.now });
    if (pathname === '/api/tablets/token') return this.#token((await request.json()) as { signature: string });
    if (this.revoked) return refused(403, 'tablet.revoked');
    const bearer = (request.headers.get('authorization') ?? '').replace('Bearer ', '');
    if (!this.tokens.has(bearer)) return refused(401, 'token.expired');
    return this.inside(request, pathname);
  }

  async #token({ signature }: { signature: string }): Promise<Response> {
    if (this.revoked) return refused(403, 'tablet.revoked');
    const keys = new Map(this.#key ? [[this.#key.kid, this.#key.publicJwk]] : []);
    const right = await verifyDetached(tokenProof('c1'), signature, keys, this.#record);
    if (!right.ok) return refused(401, 'challenge.badSignature');
    return Response.json({
      token: this.issueToken(),
      expiresAt: new Date(Date.parse(this.answer.now) + 900_000).toISOString(),
    });
  }

  /** What an enrolled tablet may ask for. */
  protected async inside(request: Request, pathname: string): Promise<Response> {
    const [, walk] = /^\/api\/tablet\/walks\/([^/]+)\/events$/.exec(pathname) ?? [];
    if (walk) {
      const body = (await request.json()) as { events: SignedEvent[]; seals: Seal[] };
      const turn = this.#turn.then(() => this.#events(walk, body));
      this.#turn = turn;
      return turn;
    }
    const [, sha256] = /^\/api\/tablet\/blobs\/([^/]+)$/.exec(pathname) ?? [];
    if (sha256) return this.#blob(sha256, new Uint8Array(await request.arrayBuffer()));
    if (pathname === '/api/tablet/catalogue') return Response.json(this.answer);
    if (pathname === '/api/tablet/report') {
      this.reports.push(await request.json());
      return Response.json({ done: true });
    }
    return refused(404, 'route.unknown');
  }

  async #blob(sha256: string, bytes: Uint8Array<ArrayBuffer>): Promise<Response> {
    const digest = bytesToHex(await this.#record.sha256(bytes));
    if (digest !== sha256) return refused(400, 'blob.wrongHash');
    this.blobs.set(sha256, bytes);
    return Response.json({ sha256, bytes: bytes.length });
  }

  async #events(walk: string, { events, seals }: { events: SignedEvent[]; seals: Seal[] }): Promise<Response> {
    const chain = [...this.chainOf(walk)];
    const quarantined: QuarantinedEvent[] = [];
    let accepted = 0;
    for (const event of events) {
      const { seq, prev } = JSON.parse(event.text) as Envelope;
      if ((await hashText(event.text, this.#record)) !== event.hash) return refused(400, 'batch.wrongHash');
      if (quarantined.length > 0 || this.poison.has(event.hash)) {
        quarantined.push({ hash: event.hash, seq, code: 'event.refused', message: 'not by these rules' });
        continue;
      }
      if (chain[seq]?.hash === event.hash) continue;
      if (seq > chain.length) return refused(409, 'batch.hole', { expectedSeq: chain.length, branch: 0 });
      if (seq < chain.length || prev !== (chain.at(-1)?.hash ?? ZERO_HASH)) return refused(400, 'batch.notConsecutive');
      chain.push(event);
      accepted += 1;
    }
    this.chains.set(walk, chain);
    this.stored += accepted;
    for (const { hash, jwe } of seals) this.seals.set(hash, jwe);
    return Response.json(this.#receipt(walk, chain, accepted, quarantined));
  }

  #receipt(walk: string, chain: SignedEvent[], accepted: number, quarantined: QuarantinedEvent[]): Receipt {
    const missing = chain.flatMap(({ text }) => {
      const { blob } = (JSON.parse(text) as Envelope<string, { blob?: string }>).data;
      return blob !== undefined && !this.blobs.has(blob) ? [blob] : [];
    });
    return {
      walk,
      branch: 0,
      forked: false,
      next: chain.length,
      hash: chain.at(-1)?.hash ?? ZERO_HASH,
      accepted,
      quarantined,
      confirmations: [],
      missingBlobs: [...new Set(missing)],
    };
  }
}

interface Seal {
  hash: string;
  jwe: string;
}
