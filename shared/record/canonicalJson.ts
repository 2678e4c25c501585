/** Why a value has no canonical text. Thrown, because writers only hand in what they made; readers catch it. */
export class CanonicalJsonError extends Error {
  readonly code: 'loneSurrogate' | 'nullCharacter' | 'notFinite' | 'notJson' | 'tooDeep';

  constructor(code: CanonicalJsonError['code']) {
    super(`No canonical JSON: ${code}`);
    this.name = 'CanonicalJsonError';
    this.code = code;
  }
}

const DEEPEST = 64;
const LONE_SURROGATE = /[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/;

function writeString(text: string): string {
  if (LONE_SURROGATE.test(text)) throw new CanonicalJsonError('loneSurrogate');
  // PostgreSQL can hold U+0000 neither in text nor in jsonb: it must not get into a chain.
  if (text.includes('\u0000')) throw new CanonicalJsonError('nullCharacter');
  return JSON.stringify(text);
}

function writeNumber(value: number): string {
  if (!Number.isFinite(value)) throw new CanonicalJsonError('notFinite');
  return JSON.stringify(value);
}

function isPlainObject(value: object): value is Record<string, unknown> {
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === Object.prototype || prototype === null;
}

function writeObject(value: object, depth: number): string {
  if (Array.isArray(value)) {
    return `[${Array.from(value, (item: unknown) => write(item, depth + 1)).join(',')}]`;
  }
  if (!isPlainObject(value)) throw new CanonicalJsonError('notJson');
  // The default sort compares UTF-16 code units, which is the order RFC 8785 (3.2.3) asks for.
  const members = Object.keys(value)
    .sort()
    .map((key) => `${writeString(key)}:${write(value[key], depth + 1)}`);
  return `{${members.join(',')}}`;
}

function write(value: unknown, depth: number): string {
  if (depth > DEEPEST) throw new CanonicalJsonError('tooDeep');
  if (value === null || typeof value === 'boolean') return String(value);
  if (typeof value === 'string') return writeString(value);
  if (typeof value === 'number') return writeNumber(value);
  if (typeof value === 'object') return writeObject(value, depth);
  throw new CanonicalJsonError('notJson');
}

/**
 * The one text of a JSON value after RFC 8785: members sorted, numbers as ECMAScript writes them, no spaces. Throws
 * {@link CanonicalJsonError} on a lone surrogate, U+0000, NaN or infinity, undefined (also as a member), anything that is
 * no plain JSON value, and nesting beyond 64.
 */
export function canonicalJson(value: unknown): string {
  return write(value, 0);
}
