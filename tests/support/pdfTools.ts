import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';

const execute = promisify(execFile);

/** What the tools of Debian say about a PDF: poppler, qpdf, zbar. */
export interface PdfJudge {
  /** As it stands on the page, columns beside each other. */
  text: string;
  /** In the order in which it was written, one line of spaces. */
  words: string;
  pages: number;
  pageSize: string;
  isTagged: boolean;
  /** Structure tree, one element a line. */
  structure: string;
  fonts: { name: string; isEmbedded: boolean; hasUnicode: boolean }[];
  /** Text of every QR code on the first page, as a camera at 150 dots per inch would see it. */
  qrCodes: string[];
  /** Complaints of qpdf; empty where the file is sound. */
  complaints: string;
  attachments: { name: string; text: string }[];
}

const say = async (program: string, args: string[]): Promise<string> =>
  (await execute(program, args, { encoding: 'utf8', maxBuffer: 64 * 1024 * 1024 })).stdout;

async function fontsOf(file: string): Promise<PdfJudge['fonts']> {
  const [, , ...lines] = (await say('pdffonts', [file])).trim().split('\n');
  return lines.map((line) => {
    const found = /^(\S+)\s+.*\s(yes|no)\s+(?:yes|no)\s+(yes|no)\s+\d+\s+\d+$/.exec(line);
    return { name: found?.[1] ?? line, isEmbedded: found?.[2] === 'yes', hasUnicode: found?.[3] === 'yes' };
  });
}

async function qrCodesOf(folder: string, file: string): Promise<string[]> {
  const page = path.join(folder, 'page');
  await say('pdftoppm', ['-r', '150', '-f', '1', '-l', '1', '-png', '-singlefile', file, page]);
  const found = await say('zbarimg', ['-q', '--raw', '-Sdisable', '-Sqrcode.enable', `${page}.png`]);
  return found.trim().split('\n');
}

async function attachmentsOf(folder: string, file: string): Promise<PdfJudge['attachments']> {
  const listed = await say('pdfdetach', ['-list', file]);
  const names = [...listed.matchAll(/^\d+: (.+)$/gm)].map((match) => match[1] ?? '');
  const attachments: PdfJudge['attachments'] = [];
  for (const [index, name] of names.entries()) {
    const out = path.join(folder, `attached-${index}`);
    await say('pdfdetach', ['-save', String(index + 1), '-o', out, file]);
    attachments.push({ name, text: await readFile(out, 'utf8') });
  }
  return attachments;
}

async function complaintsOf(file: string): Promise<string> {
  try {
    const said = await say('qpdf', ['--check', file]);
    return said.includes('No syntax or stream encoding errors found') ? '' : said;
  } catch (error) {
    return String(error);
  }
}

/** Asks every tool about a PDF. Throws where one of them cannot read it. */
export async function judgePdf(bytes: Uint8Array): Promise<PdfJudge> {
  const folder = await mkdtemp(path.join(tmpdir(), 'proof-pdf-'));
  try {
    const file = path.join(folder, 'proof.pdf');
    await writeFile(file, bytes);
    const info = await say('pdfinfo', [file]);
    const line = (name: string): string => new RegExp(`^${name}:\\s+(.*)$`, 'm').exec(info)?.[1] ?? '';
    return {
      text: (await say('pdftotext', ['-layout', file, '-'])).replaceAll('\u00a0', ' '),
      words: flat(await say('pdftotext', ['-raw', file, '-'])),
      pages: Number(line('Pages')),
      pageSize: line('Page size'),
      isTagged: line('Tagged') === 'yes',
      structure: await say('pdfinfo', ['-struct', file]),
      fonts: await fontsOf(file),
      qrCodes: await qrCodesOf(folder, file),
      complaints: await complaintsOf(file),
      attachments: await attachmentsOf(folder, file),
    };
  } finally {
    await rm(folder, { recursive: true });
  }
}

/** The words of a page in one line, as somebody searches in them. */
export const flat = (text: string): string => text.replace(/\s+/g, ' ');
