// The one piece of the host's that shared/ uses: every browser, worker and server has it, the language's own types do not.
declare const TextEncoder: new () => { encode(text: string): Uint8Array };
declare const TextDecoder: new (
  label: 'utf-8',
  options: { fatal: boolean; ignoreBOM: boolean },
) => { decode(bytes: Uint8Array): string };

const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';

/** The UTF-8 bytes of a text. */
export function utf8(text: string): Uint8Array<ArrayBuffer> {
  return new Uint8Array(new TextEncoder().encode(text));
}

/** The text of UTF-8 bytes, or null where they are no UTF-8. */
export function utf8ToText(bytes: Uint8Array): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return null;
  }
}

/** Lower-case hexadecimal, two digits a byte. */
export function bytesToHex(bytes: Uint8Array): string {
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Base64url without padding (RFC 7515, appendix C). */
export function bytesToBase64url(bytes: Uint8Array): string {
  let text = '';
  for (let i = 0; i < bytes.length; i += 3) {
    const group = ((bytes[i] ?? 0) << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    const letters = Math.min(3, bytes.length - i) + 1;
    for (let k = 0; k < letters; k += 1) text += ALPHABET.charAt((group >> (18 - 6 * k)) & 63);
  }
  return text;
}

/**
 * The bytes of a base64url text, or null where it is none. Unused bits must be 0: otherwise several texts would mean the
 * same bytes, and a changed character of a signature could go unseen.
 */
export function base64urlToBytes(text: string): Uint8Array<ArrayBuffer> | null {
  if (text.length % 4 === 1 || !/^[A-Za-z0-9_-]*$/.test(text)) return null;
  const bytes = new Uint8Array(Math.floor((text.length * 3) / 4));
  let held = 0;
  let bits = 0;
  let at = 0;
  for (const letter of text) {
    held = (held << 6) | ALPHABET.indexOf(letter);
    bits += 6;
    if (bits >= 8) {
      bits -= 8;
      bytes[at] = held >> bits;
      at += 1;
      held &= (1 << bits) - 1;
    }
  }
  return held === 0 ? bytes : null;
}
