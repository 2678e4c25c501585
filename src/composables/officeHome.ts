import { hasRight, type Right, type Role } from '@shared/people/roles';

/** A place of the office's left rail: where it leads, and the right that shows it. */
export interface OfficePlace {
  name: 'jobs' | 'procedures' | 'crib' | 'countersign' | 'proofs' | 'shop';
  right: Right;
}

/** The rail from top to bottom. */
export const OFFICE_PLACES: readonly OfficePlace[] = [
  { name: 'jobs', right: 'see' },
  { name: 'procedures', right: 'see' },
  { name: 'crib', right: 'see' },
  { name: 'countersign', right: 'countersign' },
  { name: 'proofs', right: 'keepProofs' },
  { name: 'shop', right: 'see' },
];

/** Where each role's own work lies; of several roles the one whose work waits for others comes first. */
const HOMES: readonly (readonly [Role, OfficePlace['name']])[] = [
  ['supervisor', 'countersign'],
  ['clerk', 'proofs'],
  ['keeper', 'crib'],
  ['technician', 'jobs'],
  ['admin', 'shop'],
];

/** The places somebody of these roles sees. */
export const placesFor = (roles: readonly Role[]): OfficePlace[] =>
  OFFICE_PLACES.filter(({ right }) => hasRight(roles, right));

/** The page to begin with. */
export const homeOf = (roles: readonly Role[]): OfficePlace['name'] =>
  HOMES.find(([role]) => roles.includes(role))?.[1] ?? 'jobs';
