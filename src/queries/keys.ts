/** Names of what is read, so that a write can say what has to be read again. */
export const keys = {
  me: ['me'],
  doors: ['doors'],
  jobs: ['jobs'],
  walks: ['walks'],
  proofs: ['proofs'],
  procedures: ['procedures'],
  wrenches: ['wrenches'],
  people: ['people'],
  pinUses: ['pinUses'],
  tablets: ['tablets'],
} as const satisfies Record<string, readonly string[]>;
