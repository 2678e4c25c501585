import { beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson } from '@shared/record/canonicalJson';
import { readSavedProof, writeSavedProof } from '@shared/proof/savedProof';
import type { ProofDocument } from '@shared/proof/proofDocument';
import { verifyProof } from '@shared/proof/verifyProof';
import { headD6 } from '../../db/seed/procedures/headD6';
import { drawable } from '../../server/pdf/fontFiles';
import { drawProofPdf } from '../../server/pdf/drawProofPdf';
import type { PdfWish } from '../../server/pdf/renderProofPdf';
import { renderProofPdf } from '../../server/pdf/renderProofPdf';
import { flange64 } from '../support/flange64';
import { flat, judgePdf, type PdfJudge } from '../support/pdfTools';
import { makeProofKit, sketchPlan, type ProofKit } from '../support/proofKit';
import { testCrypto } from '../support/testSigner';
import { testIds } from '../support/walkBook';

let kit: ProofKit;
const sideOf = async ({ sealed, shopKeys }: ProofKit) =>
  (await verifyProof(sealed, { crypto: testCrypto, shopKeys })).side;
const render = async (from: ProofKit, wish: Partial<PdfWish> = {}) =>
  renderProofPdf(from.document, { size: 'a4', lang: 'en', side: await sideOf(from), ...wish });

beforeAll(async () => {
  kit = await makeProofKit(headD6, { plan: sketchPlan });
});

/** Every line of the readings table: the label, then the figures in the order of the columns. */
const tableRows = ({ sheet }: ProofDocument): RegExp[] =>
  sheet.rows.map(({ label, cells }) => {
    const figures = cells.map((cell) => cell?.value?.value.replace('.', '\\.') ?? '');
    return new RegExp(`(^|\\s)${label}\\s+${figures.join('\\s+(×\\d\\s+)?')}`, 'm');
  });

describe.each([
  ['letter', 'en', '612 x 792 pts (letter)'],
  ['a4', 'en', '595.28 x 841.89 pts (A4)'],
  ['letter', 'es', '612 x 792 pts (letter)'],
  ['a4', 'es', '595.28 x 841.89 pts (A4)'],
] as const)('a head of fourteen bolts in four passes on %s in %s', (size, lang, pageSize) => {
  let page: PdfJudge;
  beforeAll(async () => {
    page = await judgePdf(await render(kit, { size, lang }));
  });

  it('is one sound page of that size', () => {
    expect(page.pages).toBe(1);
    expect(page.pageSize).toBe(pageSize);
    expect(page.complaints).toBe('');
  });

  it('shows all 56 readings, each in the row of its bolt', () => {
    const rows = tableRows(kit.document);
    expect(rows).toHaveLength(14);
    for (const row of rows) expect(page.text).toMatch(row);
  });

  it('tells the deviation in the first paragraph and with its figures', () => {
    const text = flat(page.text);
    expect(text).toContain(lang === 'en' ? 'Bolt 5 was over, replaced,' : 'El tornillo 5 quedó por encima,');
    expect(text).toContain(lang === 'en' ? 'over: 104°, window 85 – 95°' : 'por encima: 104°, ventana 85 – 95°');
    expect(text).toContain('16.3 N·m');
  });

  it('has every font embedded with its letters', () => {
    expect(page.fonts.length).toBeGreaterThanOrEqual(5);
    for (const { name, isEmbedded, hasUnicode } of page.fonts)
      expect({ name, isEmbedded, hasUnicode }).toEqual({ name, isEmbedded: true, hasUnicode: true });
    expect(page.fonts.every(({ name }) => name.includes('AtkinsonHyperlegible'))).toBe(true);
  });

  it('carries a QR code that a camera reads', () => {
    expect(page.qrCodes).toEqual([kit.document.publicUrl]);
  });
});

describe('with somebody who recorded beside the one who pulled', () => {
  it.each(['letter', 'a4'] as const)('three signatures stand on one page of %s', async (size) => {
    const three = await makeProofKit(headD6, { plan: sketchPlan, setting: { records: testIds.colleague } });
    const page = await judgePdf(await render(three, { size }));
    expect(page.pages).toBe(1);
    for (const name of ['Ilse Marchetti-Vane, technician', 'Bram Oyelaran, technician', 'Tobias Renquist, supervisor'])
      expect(page.words).toContain(name);
    for (const row of tableRows(three.document)) expect(page.text).toMatch(row);
  });
});

describe('what else stands on the page', () => {
  let page: PdfJudge;
  beforeAll(async () => {
    page = await judgePdf(await render(kit));
  });

  it('is everything D2 asks for', () => {
    const text = page.words;
    for (const said of [
      'BL-2026-00417',
      'OD6-118204',
      'ZZ9KD63X5TB004417',
      'WR-88120',
      'HEAD-D6 rev 1',
      'p. 212',
      'tolerance: shop’s',
      '84,210 km',
      'T20-112',
      'K-5107',
      '24 Jul 2026',
      'in date, scanned',
      '15 fitted, OD6-HB14',
      'Ilse Marchetti-Vane, technician',
      'Tobias Renquist, supervisor',
      'saw the joint open before it was covered',
      'received 58 min later',
      'dry to the bottom (14 of 14)',
    ])
      expect(text).toContain(said);
    expect(text.replaceAll(' ', '')).toContain(kit.document.sheet.fingerprint);
  });

  it('is tagged: headings, tables, figures with words for who does not see them', () => {
    expect(page.isTagged).toBe(true);
    for (const tag of ['Document', 'H1', 'H2', 'Table', 'TR', 'TH', 'TD', 'Figure'])
      expect(page.structure).toContain(tag);
  });

  it('is the saved proof, which verifies out of the file', async () => {
    const saved = writeSavedProof({ sealed: kit.sealed, keys: kit.shopKeys });
    const { attachments } = await judgePdf(await render(kit, { saved }));
    expect(attachments.map(({ name }) => name)).toEqual(['BL-2026-00417.json']);
    const read = readSavedProof(attachments[0]?.text ?? '');
    const check = await verifyProof(read?.sealed ?? '', { crypto: testCrypto, shopKeys: read?.keys ?? [] });
    expect(check).toMatchObject({ problems: [], shopSigned: true, readingsJudgedAgain: 60 });
  });

  it('is the document alone where nothing was saved', () => {
    expect(page.attachments[0]?.text).toBe(canonicalJson(kit.document));
  });

  it('withholds names where no side sheet is given', async () => {
    const text = flat((await judgePdf(await renderProofPdf(kit.document, { size: 'a4', lang: 'en' }))).text);
    expect(text).toContain('technician 1, technician');
    expect(text).not.toMatch(/Marchetti|Harbour|WR-88120|ZZ9KD63/);
  });

  it('is stamped where it is worth less today', async () => {
    const stamps = [{ code: 'revoked', reason: 'wrong engine' } as const, { code: 'broken', event: 57 } as const];
    const { text, pages } = await judgePdf(await render(kit, { stamps }));
    expect(flat(text)).toContain('REVOKED: wrong engine');
    expect(flat(text)).toContain('BROKEN at event 57');
    expect(pages).toBe(1);
  });
});

describe('the bytes', () => {
  it('are the same twice, in that thread and in this one, and differ with the paper', async () => {
    const [first, second, letter] = await Promise.all([render(kit), render(kit), render(kit, { size: 'letter' })]);
    expect(first.equals(second)).toBe(true);
    expect(first.equals(letter)).toBe(false);
    const attached = { name: 'BL-2026-00417.json', text: canonicalJson(kit.document) };
    const { document } = kit;
    const job = { document, side: await sideOf(kit), size: 'a4', lang: 'en', stamps: [], attached } as const;
    expect(first.equals(await drawProofPdf(job))).toBe(true);
  });

  it('are refused with the reason where a document cannot be drawn, and the next one is drawn all the same', async () => {
    const broken = { ...kit.document, sheet: { ...kit.document.sheet, claim: null as never } };
    await expect(renderProofPdf(broken, { size: 'a4', lang: 'en' })).rejects.toThrow('could not be drawn');
    expect((await render(kit)).subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('keep no letter that a face lacks', () => {
    const hasGlyph = (codePoint: number): boolean => codePoint < 0x250;
    expect(drawable('3⁄8 ⅜ Łukasz\u202f5 王', hasGlyph)).toBe('3[U+2044]8 3/8 Łukasz\u00a05 [U+738B]');
  });
});

describe('more than one page', () => {
  it('keeps claim, deviations and signatures on page 1, and all 320 readings on the next', async () => {
    const flange = await makeProofKit(flange64(), { plan: { source: 'streamed' } });
    const page = await judgePdf(await render(flange, { size: 'letter' }));
    expect(page.pages).toBe(2);
    const [first = '', second = ''] = page.text.split('\f');
    expect(flat(first)).toContain('320 of 320 final readings in window');
    expect(flat(first)).toContain('No deviation was found or reported.');
    expect(flat(first)).toContain('Tobias Renquist');
    expect(flat(second)).toContain('BL-2026-00417, continued');
    for (const row of tableRows(flange.document)) expect(second).toMatch(row);
    expect(page.complaints).toBe('');
  });

  it('keeps twelve deviations on page 1, however long the record', async () => {
    const slips = Array.from({ length: 12 }, (_, index) => ({
      at: { pass: 'p3', hole: `h${index + 1}` },
      kind: 'value' as const,
      value: '104',
    }));
    const many = await makeProofKit(headD6, { plan: { slips } });
    const [first = ''] = (await judgePdf(await render(many))).text.split('\f');
    const found = flat(first).match(/over: 104°, window 85 – 95°/g) ?? [];
    expect(found).toHaveLength(12);
  });
});
