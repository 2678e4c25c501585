import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { canonicalJson } from '@shared/record/canonicalJson';
import { provenance, workedExample } from './reference';

const example = workedExample<{ json: string }, { canonical: string; sha256: string }>('REF-REC-02');

it(provenance(example), () => {
  const text = canonicalJson(JSON.parse(example.inputs.json));
  expect(text).toBe(example.expected.canonical);
  expect(createHash('sha256').update(text, 'utf8').digest('hex')).toBe(example.expected.sha256);
});

it('RFC 8785, 3.2.3: members sorted by UTF-16 code units (read in public tests of that RFC)', () => {
  const members = {
    '\u20ac': 'Euro Sign',
    '\r': 'Carriage Return',
    '\ufb33': 'Hebrew Letter Dalet With Dagesh',
    '1': 'One',
    '\ud83d\ude00': 'Emoji: Grinning Face',
    '\u0080': 'Control',
    '\u00f6': 'Latin Small Letter O With Diaeresis',
  };
  expect(Object.values(JSON.parse(canonicalJson(members)) as object).map(String)).toHaveLength(7);
  expect(canonicalJson(members)).toBe(
    '{"\\r":"Carriage Return","1":"One","\u0080":"Control","\u00f6":"Latin Small Letter O With Diaeresis",' +
      '"\u20ac":"Euro Sign","\ud83d\ude00":"Emoji: Grinning Face","\ufb33":"Hebrew Letter Dalet With Dagesh"}',
  );
});

/** RFC 8785, appendix B: IEEE 754 bits and the text they must have; read in several public tests of that RFC. */
const NUMBERS: [string, string][] = [
  ['0000000000000000', '0'],
  ['8000000000000000', '0'],
  ['0000000000000001', '5e-324'],
  ['8000000000000001', '-5e-324'],
  ['7fefffffffffffff', '1.7976931348623157e+308'],
  ['ffefffffffffffff', '-1.7976931348623157e+308'],
  ['4340000000000000', '9007199254740992'],
  ['c340000000000000', '-9007199254740992'],
  ['4430000000000000', '295147905179352830000'],
  ['44b52d02c7e14af5', '9.999999999999997e+22'],
  ['44b52d02c7e14af6', '1e+23'],
  ['44b52d02c7e14af7', '1.0000000000000001e+23'],
  ['444b1ae4d6e2ef4e', '999999999999999700000'],
  ['444b1ae4d6e2ef4f', '999999999999999900000'],
  ['444b1ae4d6e2ef50', '1e+21'],
  ['3eb0c6f7a0b5ed8c', '9.999999999999997e-7'],
  ['3eb0c6f7a0b5ed8d', '0.000001'],
  ['41b3de4355555553', '333333333.3333332'],
  ['41b3de4355555554', '333333333.33333325'],
  ['41b3de4355555555', '333333333.3333333'],
  ['41b3de4355555556', '333333333.3333334'],
  ['41b3de4355555557', '333333333.33333343'],
  ['becbf647612f3696', '-0.0000033333333333333333'],
  ['43143ff3c1cb0959', '1424953923781206.2'],
];

const doubleOf = (bits: string): number => Buffer.from(bits, 'hex').readDoubleBE();

describe('RFC 8785, appendix B', () => {
  it.each(NUMBERS)('%s is written %s', (bits, text) => expect(canonicalJson(doubleOf(bits))).toBe(text));

  it.each(['7fffffffffffffff', '7ff0000000000000'])('%s (NaN, infinity) is refused', (bits) => {
    expect(() => canonicalJson(doubleOf(bits))).toThrow('notFinite');
  });
});
