import { flushPromises, mount, type VueWrapper } from '@vue/test-utils';
import { afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { PublicProof } from '@shared/contracts/proofs.contract';
import { writeSavedProof } from '@shared/proof/savedProof';
import { withholdSide } from '@shared/proof/sealProof';
import { SHOWN_OUTSIDE } from '@shared/proof/sideSheet';
import { makeProofKit, procedureOf, sketchPlan, type ProofKit } from '../../tests/support/proofKit';
import App from './App.vue';
import { language } from './tell';

const TOKEN = '0190aTestToken_f4Xq9Zk2Lm7Rw1Vb8Nc3';

let kit: ProofKit;
beforeAll(async () => {
  kit = await makeProofKit(procedureOf('HEAD-D6'), { plan: sketchPlan });
});

const answerOf = (change: Partial<PublicProof> = {}): PublicProof => ({
  number: kit.document.number,
  issue: 1,
  state: 'issued',
  shop: { id: kit.document.shop.id, name: kit.document.shop.name },
  issuedAt: kit.document.issuedAt,
  reason: null,
  supersededBy: null,
  jws: withholdSide(kit.sealed, SHOWN_OUTSIDE),
  keys: kit.shopKeys.map((key) => ({ ...key, kid: kit.shop.signer.kid })),
  stored: kit.log.signed.map(({ hash }) => hash),
  ...change,
});

const json = (body: unknown, status = 200): Response =>
  new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } });

/** The shop's server, or none. */
const serverWith = (proof: () => Response, keys: () => Response = () => json({ keys: kit.shopKeys })) =>
  vi.stubGlobal('fetch', (path: string) => {
    if (path === `/api/public/proofs/${TOKEN}`) return Promise.resolve(proof());
    if (path === `/api/public/jwks/${kit.document.shop.id}`) return Promise.resolve(keys());
    return Promise.reject(new TypeError(`nobody serves ${path}`));
  });

const settled = async (page: VueWrapper): Promise<void> => {
  await vi.waitFor(() => {
    if (page.find('.waiting').exists()) throw new Error('still checking');
  }, 15_000);
  await flushPromises();
};
const opened = async (token: string | null = TOKEN): Promise<VueWrapper> => {
  const page = mount(App, { props: { token } });
  await flushPromises();
  await settled(page);
  return page;
};
const textOf = (page: VueWrapper, selector: string): string => page.find(selector).text().replaceAll('\u00a0', ' ');

async function choose(page: VueWrapper, name: string, content: string): Promise<void> {
  const input = page.find('input[type=file]');
  const files = [new File([content], name, { type: 'application/json' })];
  Object.defineProperty(input.element, 'files', { value: files, configurable: true });
  await input.trigger('change');
  await flushPromises();
  await settled(page);
}

/** The sealed proof with one figure of one event changed. */
function tampered(): string {
  const [jws = '', ...rest] = kit.sealed.split('~');
  const [header, payload = '', signature] = jws.split('.');
  const text = Buffer.from(payload, 'base64url').toString().replace('\\"value\\":\\"104\\"', '\\"value\\":\\"94\\"');
  return [`${header}.${Buffer.from(text).toString('base64url')}.${signature}`, ...rest].join('~');
}

beforeEach(() => (language.value = 'en'));
afterEach(() => vi.unstubAllGlobals());

describe('the page behind the QR code', () => {
  it('says in one sentence that the proof holds, and how the readings came out', async () => {
    serverWith(() => json(answerOf()));
    const page = await opened();
    expect(textOf(page, '.verdict h1')).toBe('This proof holds.');
    expect(textOf(page, '.verdict')).toContain(
      'All 60 readings judged again; of the 56 that count now, 56 are in window.',
    );
    expect(textOf(page, '.checks')).toContain(`${kit.log.signed.length} of ${kit.log.signed.length} events`);
    expect(page.findAll('.checks__off')).toHaveLength(0);
  });

  it('shows every reading, the deviation and the map, and no name', async () => {
    serverWith(() => json(answerOf()));
    const page = await opened();
    expect(page.findAll('.readings tbody tr')).toHaveLength(14);
    const figures = page.findAll('.readings tbody td').map((cell) => cell.text());
    expect(figures.filter((text) => /\d/.test(text))).toHaveLength(56 + 14);
    expect(textOf(page, '.paper')).toContain('over: 104°, window 85 – 95°');
    expect(page.find('svg.map').attributes('aria-label')).toContain('5: in window, new fastener');
    expect(page.html()).not.toMatch(/Marchetti|Renquist|Harbour|WR-88120|ZZ9KD63/);
    expect(textOf(page, '.paper__facts')).toContain('ends 004417');
  });

  it('speaks Spanish', async () => {
    serverWith(() => json(answerOf()));
    const page = await opened();
    language.value = 'es';
    await flushPromises();
    expect(textOf(page, '.verdict h1')).toBe('Esta prueba es válida.');
    expect(textOf(page, '.paper__claim')).toContain('56 de 56 lecturas finales en ventana');
  });

  it.each([
    [{ state: 'revoked', reason: 'wrong engine' }, 'The shop has revoked this proof.', 'wrong engine'],
    [{ state: 'inDoubt', reason: 'W-03 read high' }, 'The shop has put this proof in doubt.', 'W-03 read high'],
    [
      { state: 'superseded', supersededBy: { number: 'BL', issue: 2, publicUrl: 'https://x.example/p/y' } },
      'The record holds, but a later issue has taken this proof’s place.',
      'Open issue 2',
    ],
  ] as [Partial<PublicProof>, string, string][])('tells today’s truth: %j', async (change, headline, more) => {
    serverWith(() => json(answerOf(change)));
    const page = await opened();
    expect(textOf(page, '.verdict h1')).toBe(headline);
    expect(textOf(page, '.verdict')).toContain(more);
  });

  it('names the event of which one character was changed, and shows nothing that nobody vouches for', async () => {
    serverWith(() => json(answerOf({ jws: tampered() })));
    const page = await opened();
    const seq = kit.log.book.events.findIndex(
      (event) => event.type === 'reading.received' && event.data.value.value === '104',
    );
    expect(textOf(page, '.verdict h1')).toContain(`Broken at event ${seq}`);
    expect(textOf(page, '.problems')).toContain('something in it was changed');
    expect(page.find('.paper').exists()).toBe(false);
  });

  it('names the event that the shop stores otherwise today', async () => {
    const stored = kit.log.signed.map(({ hash }, seq) => (seq === 91 ? '0'.repeat(64) : hash));
    serverWith(() => json(answerOf({ stored })));
    const page = await opened();
    expect(textOf(page, '.verdict h1')).toMatch(/^Broken at event 91 \(reading, bolt \d+ · pass 2\)/);
    expect(page.find('.caution').exists()).toBe(true);
  });

  it('sees that another proof was put behind the link', async () => {
    const other = await makeProofKit(procedureOf('HUB-F4'), { facts: { publicUrl: 'https://x.example/p/other' } });
    serverWith(
      () => json(answerOf({ jws: other.sealed, stored: other.log.signed.map(({ hash }) => hash) })),
      () => json({ keys: other.shopKeys }),
    );
    expect(textOf(await opened(), '.verdict h1')).toContain('belongs to another link');
  });

  it.each([
    ['no such proof', () => json({ error: { code: 'proof.unknown', message: '' } }, 404), 'There is no proof behind'],
    ['a page that is no answer', () => new Response('<html>', { status: 200 }), 'no answer of a shop'],
    ['an answer of another shape', () => json({ hello: 1 }), 'no answer of a shop'],
  ])('says what is wrong: %s', async (_what, answer, words) => {
    serverWith(answer);
    expect(textOf(await opened(), '[role=alert]')).toContain(words);
  });

  it('says so when the shop cannot be reached, and tries again', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('offline')));
    const page = await opened();
    expect(textOf(page, '[role=alert]')).toContain('The shop cannot be reached');
    serverWith(() => json(answerOf()));
    await page.find('[role=alert] button').trigger('click');
    await flushPromises();
    await settled(page);
    expect(textOf(page, '.verdict h1')).toBe('This proof holds.');
  });
});

describe('a saved file', () => {
  const saved = (): string => writeSavedProof({ sealed: kit.sealed, keys: kit.shopKeys });

  it('is checked against the keys the shop publishes, names shown', async () => {
    serverWith(() => json(answerOf()));
    const page = await opened(null);
    expect(page.find('.verdict').exists()).toBe(false);
    await choose(page, 'BL-2026-00417.json', saved());
    expect(textOf(page, '.verdict h1')).toBe('This file holds as it was issued.');
    expect(textOf(page, '.signatures')).toContain('Ilse Marchetti-Vane, technician');
  });

  it('is not taken for the shop’s where its keys could not be asked', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('offline')));
    const page = await opened(null);
    await choose(page, 'BL-2026-00417.json', saved());
    expect(textOf(page, '.verdict h1')).toContain('Whose key signed it could not be asked here.');
  });

  it('signed by a key the shop does not publish does not hold', async () => {
    serverWith(
      () => json(answerOf()),
      () => json({ keys: [] }),
    );
    const page = await opened(null);
    await choose(page, 'forged.json', saved());
    expect(textOf(page, '.verdict h1')).toContain('the shop’s signature does not fit');
    expect(page.find('.paper').exists()).toBe(false);
  });

  it('that is none is refused by name, and the linked proof comes back', async () => {
    serverWith(() => json(answerOf()));
    const page = await opened();
    await choose(page, 'holiday.json', '{"a":1}');
    expect(textOf(page, '[role=alert]')).toContain('“holiday.json” is no saved proof');
    await page.find('[role=alert] button').trigger('click');
    await flushPromises();
    await settled(page);
    expect(textOf(page, '.verdict h1')).toBe('This proof holds.');
  });
});
