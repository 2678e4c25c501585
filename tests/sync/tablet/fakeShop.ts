import { compactDecrypt, exportJWK, generateKeyPair, type JWK } from 'jose';
import type { z } from 'zod';
import { catalogueAnswer, type CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Confirmation, Order } from '@shared/contracts/confirmation.contract';
import { defaultShopSettings } from '@shared/contracts/settings.contract';
import { pinCheck, syncEvents, walkChain, type WalkChain } from '@shared/contracts/sync.contract';
import { enrol, enrolledTablet, enrolmentProofText } from '@shared/contracts/tablets.contract';
import type { WalkRow } from '@shared/contracts/walkRow.contract';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { canonicalJson } from '@shared/record/canonicalJson';
import { hashText, sealEvent } from '@shared/record/chain';
import type { PublicJwk, Signer } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { signDetached, verifyDetached } from '@shared/record/signature';
import { makeDeviceKey, signerOf } from '@/offline/deviceKey';
import { FakeServer } from '@/offline/testing/fakeServer';
import { SHOP, TABLET } from '@/offline/testing/tabletKit';
import { webRecordCrypto } from '@/offline/webCrypto';

/** People, job and joint of the tests: any UUIDs do. */
export const TECH = '0190f0a0-0000-7000-8000-0000000000d1';
export const SUPERVISOR = '0190f0a0-0000-7000-8000-0000000000d2';
export const JOB = '0190f0a0-0000-7000-8000-0000000000e1';
export const JOINT = '0190f0a0-0000-7000-8000-0000000000e2';
export const PINS: Readonly<Record<string, string>> = { [TECH]: '482915', [SUPERVISOR]: '730264' };

const record = webRecordCrypto();
const AT = '2026-06-13T08:00:00.000Z';

const person = (id: string, name: string, roles: CatalogueAnswer['people'][number]['roles']) => ({
  id,
  name,
  roles,
  state: 'active' as const,
  pinVersion: 1,
});

/** What a body on the wire must be, by the contract; a tablet that sends anything else fails the test. */
const demand = <S extends z.ZodType>(schema: S, body: unknown): z.output<S> => schema.parse(body);

/** A shop behind the fake server: enrolment, PINs, catalogue, and an office that writes on released walks. */
export class FakeShop extends FakeServer {
  readonly code = 'BRIN-7Q4K';
  readonly confirmations: Confirmation[] = [];
  #sealingKey: CryptoKey;
  readonly sealingJwk: JWK;
  readonly office: Signer;
  readonly officeJwk: PublicJwk;
  tabletJwk: PublicJwk | null = null;
  codeUsed = false;

  private constructor(sealing: { key: CryptoKey; jwk: JWK }, office: { signer: Signer; jwk: PublicJwk }) {
    super(null);
    this.#sealingKey = sealing.key;
    this.sealingJwk = sealing.jwk;
    this.office = office.signer;
    this.officeJwk = office.jwk;
  }

  static async open(procedure: ProcedureDocument, wrenches: readonly WrenchSnapshot[]): Promise<FakeShop> {
    const pair = await generateKeyPair('ECDH-ES', { crv: 'P-256' });
    const officeKey = await makeDeviceKey(record);
    const shop = new FakeShop(
      { key: pair.privateKey, jwk: await exportJWK(pair.publicKey) },
      { signer: signerOf(officeKey), jwk: officeKey.publicJwk },
    );
    shop.answer = catalogueAnswer.parse(await shop.#catalogue(procedure, wrenches));
    return shop;
  }

  async #keys() {
    const { x = '', y = '' } = this.sealingJwk;
    const sealing: PublicJwk = { kty: 'EC', crv: 'P-256', x, y };
    return {
      signingKeys: [{ ...this.officeJwk, kid: this.office.kid }],
      sealingKey: { ...sealing, kid: await jwkThumbprint(sealing, record) },
    };
  }

  async #catalogue(document: ProcedureDocument, wrenches: readonly WrenchSnapshot[]): Promise<CatalogueAnswer> {
    const hash = await hashText(canonicalJson(document), record);
    const settings = { id: SHOP, name: 'Brindle Lane Engine Works', timeZone: 'UTC', settings: defaultShopSettings };
    const job = { id: JOB, number: 'J-1', customer: '', engineFamily: '', engineModel: '', engineSerial: '', vin: '' };
    const joint = {
      id: JOINT,
      job: JOB,
      procedure: document.code,
      purpose: 'finalAssembly',
      bank: '',
      castingNumber: '',
    };
    return {
      ...this.answer,
      cursor: 5,
      full: true,
      settings: { ...settings, ...(await this.#keys()) },
      people: [person(TECH, 'Tess', ['technician']), person(SUPERVISOR, 'Sol', ['supervisor'])],
      wrenches: wrenches.map((snapshot) => ({ id: snapshot.id, snapshot, state: 'inService' as const })),
      procedures: [{ code: document.code, revision: 1, hash, state: 'approved', approvedAt: AT, document }],
      jobs: [{ ...job, claim: '', odometer: null, hours: null, state: 'open', createdAt: AT, changedAt: AT }],
      joints: [
        {
          ...joint,
          purpose: 'finalAssembly',
          retired: false,
          earlier: { readingsTaken: false, usedHoles: [] },
        },
      ],
    };
  }

  override async handle(request: Request): Promise<Response> {
    const { pathname } = new URL(request.url);
    if (pathname === '/api/tablets/enrol') return this.#enrol(await request.json());
    if (pathname.endsWith('/events')) demand(syncEvents.body, await request.clone().json());
    return super.handle(request);
  }

  async #enrol(body: unknown): Promise<Response> {
    const { code, publicJwk, proof, name } = demand(enrol.body, body);
    const refuse = (status: number, why: string) =>
      Response.json({ error: { code: `enrolment.${why}`, message: why } }, { status });
    if (code !== this.code) return refuse(404, 'unknownCode');
    if (this.codeUsed) return refuse(409, 'codeUsed');
    const kid = await jwkThumbprint(publicJwk, record);
    const proved = await verifyDetached(enrolmentProofText(code, kid), proof, new Map([[kid, publicJwk]]), record);
    if (!proved.ok) return refuse(400, 'badProof');
    this.codeUsed = true;
    this.tabletJwk = publicJwk;
    this.admit({ kid, publicJwk });
    const answer = { tablet: { id: TABLET, name }, shop: { id: SHOP, name: 'Brindle Lane Engine Works' } };
    const token = { token: this.issueToken(), expiresAt: new Date(Date.parse(AT) + 900_000).toISOString() };
    return Response.json(enrolledTablet.parse({ ...answer, ...(await this.#keys()), ...token }), { status: 201 });
  }

  protected override async inside(request: Request, pathname: string): Promise<Response> {
    if (pathname === '/api/tablet/pin-check') return this.#pinCheck(demand(pinCheck.body, await request.json()));
    const [, walk] = /^\/api\/tablet\/walks\/([^/]+)$/.exec(pathname) ?? [];
    if (walk) return Response.json(walkChain.parse(await this.#chain(walk)));
    return super.inside(request, pathname);
  }

  /** What is sealed in a JWE to this shop. */
  async opened(jwe: string): Promise<Record<string, unknown>> {
    const { plaintext } = await compactDecrypt(jwe, this.#sealingKey);
    return JSON.parse(new TextDecoder().decode(plaintext)) as Record<string, unknown>;
  }

  async #pinCheck(body: { person: string; jwe: string }): Promise<Response> {
    const { pin, person: who, tablet } = await this.opened(body.jwe);
    if (who !== body.person || tablet !== TABLET || pin !== PINS[body.person]) {
      return Response.json({ error: { code: 'pin.wrong', message: '' } }, { status: 403 });
    }
    return Response.json({ person: body.person, pinVersion: 1, at: this.answer.now });
  }

  /** The line of a walk as the catalogue tells it. */
  rowOf(walk: string, more: Partial<WalkRow> = {}): WalkRow {
    const chain = this.chainOf(walk);
    const [procedure] = this.answer.procedures;
    return {
      id: walk,
      job: JOB,
      joint: JOINT,
      purpose: 'finalAssembly',
      procedure: { code: procedure?.code ?? '', revision: 1, hash: procedure?.hash ?? '' },
      state: 'walking',
      writer: TABLET,
      branch: 0,
      next: chain.length,
      head: chain.at(-1)?.hash ?? ZERO_HASH,
      pulls: TECH,
      records: TECH,
      openedAt: AT,
      changedAt: AT,
      readingsDone: 0,
      readingsDue: 0,
      openDeviations: 0,
      forked: false,
      parallel: [],
      quarantined: 0,
      refusedSeals: 0,
      missingBlobs: 0,
      ...more,
    };
  }

  async #chain(walk: string): Promise<WalkChain> {
    const keys = [{ ...this.officeJwk, kid: this.office.kid }];
    if (this.tabletJwk) keys.push({ ...this.tabletJwk, kid: await jwkThumbprint(this.tabletJwk, record) });
    return {
      walk: this.rowOf(walk),
      branch: 0,
      events: this.chainOf(walk).map((event, seq) => ({ ...event, branch: 0, seq, receivedAt: AT })),
      confirmations: [],
      keys,
    };
  }

  /** The office writes on a walk that was released to it. */
  async write(walk: string, type: string, data: object, by: string): Promise<SignedEvent> {
    const chain = this.chainOf(walk);
    const envelope: Envelope = {
      v: 1,
      shop: SHOP,
      walk,
      branch: 0,
      seq: chain.length,
      prev: chain.at(-1)?.hash ?? ZERO_HASH,
      at: AT,
      mono: 0,
      boot: 'office',
      known: 5,
      by,
      tablet: 'office',
      type,
      data,
    };
    const event = await sealEvent(envelope, this.office, record);
    this.chains.set(walk, [...chain, event]);
    return event;
  }

  /** Places an order, signed by the shop. */
  async order(said: Omit<Order, 'jws' | 'state'>): Promise<void> {
    const order: Order = { ...said, jws: await signDetached(canonicalJson(said), this.office), state: 'open' };
    this.answer = { ...this.answer, cursor: this.answer.cursor + 1, full: false, orders: [order] };
  }
}
