/** Roles add up: a person may hold several (product, "People and rights"). */
export type Role = 'technician' | 'supervisor' | 'clerk' | 'keeper' | 'admin';

/** What a role allows, one name for each thing that is asked about separately. */
export type Right =
  | 'see'
  | 'walk'
  | 'sign'
  | 'accept'
  | 'skipWait'
  | 'override'
  | 'countersign'
  | 'sendBack'
  | 'voidWalk'
  | 'writeProcedure'
  | 'approveProcedure'
  | 'keepJobs'
  | 'keepProofs'
  | 'keepWrenches'
  | 'administer';

/** Every role, in the order of the rights table. */
export const ROLES: readonly Role[] = ['technician', 'supervisor', 'clerk', 'keeper', 'admin'];

const RIGHTS: Readonly<Record<Role, readonly Right[]>> = {
  technician: ['see', 'walk', 'sign', 'keepJobs'],
  supervisor: [
    ...(['see', 'walk', 'sign', 'accept', 'skipWait', 'override', 'countersign', 'sendBack', 'voidWalk'] as const),
    ...(['writeProcedure', 'approveProcedure', 'keepJobs', 'keepProofs', 'keepWrenches'] as const),
  ],
  clerk: ['see', 'keepJobs', 'keepProofs'],
  keeper: ['see', 'keepWrenches'],
  admin: ['see', 'administer'],
};

/** True for the name of a role. */
export function isRole(text: string): text is Role {
  return Object.hasOwn(RIGHTS, text);
}

/** Everything that these roles allow together. */
export function rightsOf(roles: readonly Role[]): ReadonlySet<Right> {
  return new Set(roles.flatMap((role) => RIGHTS[role]));
}

/**
 * True when one of the roles gives the right. Two limits are not the role's and are asked elsewhere: nobody judges their
 * own readings (P1), nobody approves what they wrote (A3).
 */
export function hasRight(roles: readonly Role[], right: Right): boolean {
  return roles.some((role) => RIGHTS[role].includes(right));
}
