import { base64urlToBytes, bytesToBase64url, utf8, utf8ToText } from '../record/bytes';
import { canonicalJson } from '../record/canonicalJson';
import type { RecordCrypto } from '../record/crypto';

/** What stands beside the events and may be withheld (decision 7). A line that is not there was withheld, or never known. */
export interface SideSheet {
  names: Record<string, string>;
  customer?: string;
  claim?: string;
  /** A VIN in two lines, so that its end alone can be shown. */
  vinHead?: string;
  vinTail?: string;
}

/** What the shop knows: one text each, empty where there is none. */
export interface SideFacts {
  names: Record<string, string>;
  customer: string;
  claim: string;
  vin: string;
}

/** Which lines are shown to somebody who only has the link of the QR code. */
export type SideLine = 'names' | 'customer' | 'claim' | 'vinHead' | 'vinTail';
/** Minimal personal data outside: the end of the VIN is enough to know the vehicle on the paper by. */
export const SHOWN_OUTSIDE: readonly SideLine[] = ['vinTail'];

const TAIL = 6;
const NAME = 'name:';

function linesOf(facts: SideFacts): [string, string][] {
  const lines: [string, string][] = [
    ['customer', facts.customer],
    ['claim', facts.claim],
    ['vinHead', facts.vin.slice(0, -TAIL)],
    ['vinTail', facts.vin.slice(-TAIL)],
    ...Object.entries(facts.names).map(([person, name]): [string, string] => [NAME + person, name]),
  ];
  return lines.filter(([, value]) => value !== '');
}

/** Digest of a line, as RFC 9901 takes it: base64url SHA-256 of the disclosure's ASCII. */
async function digestOf(disclosure: string, crypto: Pick<RecordCrypto, 'sha256'>): Promise<string> {
  return bytesToBase64url(await crypto.sha256(utf8(disclosure)));
}

/**
 * Hides each line behind a digest that is signed in its stead. `salt` gives at least 128 random bits as base64url for
 * each call: without it a name could be found by trying names. Digests come sorted, so that their order tells nothing.
 */
export async function concealSide(
  facts: SideFacts,
  salt: () => string,
  crypto: Pick<RecordCrypto, 'sha256'>,
): Promise<{ digests: string[]; disclosures: string[] }> {
  const disclosures = linesOf(facts).map(([line, value]) =>
    bytesToBase64url(utf8(canonicalJson([salt(), line, value]))),
  );
  const digests = await Promise.all(disclosures.map((disclosure) => digestOf(disclosure, crypto)));
  return { digests: digests.sort(), disclosures };
}

function readDisclosure(disclosure: string): { line: string; value: string } | null {
  const bytes = base64urlToBytes(disclosure);
  const text = bytes && utf8ToText(bytes);
  if (text === null) return null;
  let parsed: unknown;
  try {
    parsed = JSON.parse(text);
  } catch {
    return null;
  }
  if (!Array.isArray(parsed) || parsed.length !== 3) return null;
  const [, line, value] = parsed as unknown[];
  return typeof line === 'string' && typeof value === 'string' ? { line, value } : null;
}

function isShown(disclosure: string, shown: readonly SideLine[]): boolean {
  const line = readDisclosure(disclosure)?.line ?? '';
  return shown.includes((line.startsWith(NAME) ? 'names' : line) as SideLine);
}

/** The disclosures that may be shown; the others are withheld, and the shop's signature still holds. */
export const shownDisclosures = (disclosures: readonly string[], shown: readonly SideLine[]): string[] =>
  disclosures.filter((disclosure) => isShown(disclosure, shown));

/** The side sheet that is shown, and how many lines do not belong to this document (their digest was not signed). */
export async function revealSide(
  disclosures: readonly string[],
  digests: readonly string[],
  crypto: Pick<RecordCrypto, 'sha256'>,
): Promise<{ side: SideSheet; foreign: number }> {
  const side: SideSheet = { names: {} };
  let foreign = 0;
  for (const disclosure of disclosures) {
    const read = readDisclosure(disclosure);
    if (!read || !digests.includes(await digestOf(disclosure, crypto))) foreign += 1;
    else if (read.line.startsWith(NAME)) side.names[read.line.slice(NAME.length)] = read.value;
    else if (isPlainLine(read.line)) side[read.line] = read.value;
  }
  return { side, foreign };
}

const PLAIN = ['customer', 'claim', 'vinHead', 'vinTail'] as const;
const isPlainLine = (line: string): line is (typeof PLAIN)[number] => PLAIN.some((plain) => plain === line);
