import { expect, it } from 'vitest';
import { hasRight, isRole, rightsOf, ROLES, type Right, type Role } from './roles';

/** The rights table of the specification, read off row by row: t, s, c, k, a. */
const TABLE: [string, Right[]][] = [
  ['tscka', ['see']],
  ['ts', ['walk', 'sign']],
  ['s', ['accept', 'skipWait', 'override', 'countersign', 'sendBack', 'voidWalk']],
  ['s', ['writeProcedure', 'approveProcedure']],
  ['tsc', ['keepJobs']],
  ['sc', ['keepProofs']],
  ['sk', ['keepWrenches']],
  ['a', ['administer']],
];
const LETTER: Record<Role, string> = { technician: 't', supervisor: 's', clerk: 'c', keeper: 'k', admin: 'a' };

it.each(TABLE.flatMap(([letters, rights]) => rights.map((right) => [right, letters] as const)))(
  'gives %s to %s and nobody else',
  (right, letters) => {
    expect(
      ROLES.filter((role) => hasRight([role], right))
        .map((role) => LETTER[role])
        .join(''),
    ).toBe(letters);
  },
);

it('adds roles up', () => {
  const both = rightsOf(['clerk', 'keeper']);
  expect([...both].sort()).toEqual(['keepJobs', 'keepProofs', 'keepWrenches', 'see']);
  expect(hasRight(['clerk', 'keeper'], 'keepWrenches')).toBe(true);
  expect(hasRight([], 'see')).toBe(false);
});

it('knows roles by name', () => expect(['admin', 'toString', ''].map(isRole)).toEqual([true, false, false]));
