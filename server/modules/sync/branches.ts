import type { Branch, Place } from './chain.repository';

/** A stretch of a branch that belongs to a chain. */
export interface Stretch {
  branch: number;
  upTo: number;
}

/** The stretches that lead from seq 0 to a place, first to last: a branch stands on its parents. */
export const pathTo = (branches: readonly Branch[], place: Place): Stretch[] => {
  const path: Stretch[] = [];
  let at: { branch: number; upTo: number } | null = { branch: place.branch, upTo: place.seq };
  while (at) {
    path.unshift(at);
    const here: { branch: number; upTo: number } = at;
    const branch = branches.find((one) => one.branch === here.branch);
    at = branch?.fromBranch == null ? null : { branch: branch.fromBranch, upTo: branch.fromSeq };
  }
  return path;
};

/** Where the events of a batch go. */
export type Target = { kind: 'append'; branch: number } | { kind: 'open'; branch: Omit<Branch, 'next' | 'head'> };

/**
 * Where an event with this parent goes: on at the head it follows, else on a new branch from there, which is a fork
 * (decision 5). `parent` is null for a first event (seq 0).
 */
export const targetFor = (branches: readonly Branch[], parent: (Place & { hash: string }) | null): Target => {
  const number = Math.max(-1, ...branches.map((one) => one.branch)) + 1;
  if (!parent) {
    const how = branches.length === 0 ? ('first' as const) : ('fork' as const);
    return { kind: 'open', branch: { branch: number, fromBranch: null, fromSeq: -1, fromHash: '0'.repeat(64), how } };
  }
  const standing = branches.find((one) => one.branch === parent.branch);
  if (standing?.next === parent.seq + 1) return { kind: 'append', branch: parent.branch };
  const { branch: fromBranch, seq: fromSeq, hash: fromHash } = parent;
  return { kind: 'open', branch: { branch: number, fromBranch, fromSeq, fromHash, how: 'fork' } };
};

/** How far each branch goes: what a choice between them has seen. */
export const headsOf = (branches: readonly Branch[]): Record<string, number> =>
  Object.fromEntries(branches.map(({ branch, next }) => [branch, next]));

/**
 * Whether some branch goes on beside the one that stands, further than it did at the last choice: then a person has to
 * say which stands.
 */
export const isForked = (
  branches: readonly Branch[],
  standing: number,
  seen: Readonly<Record<string, number>>,
): boolean => {
  const head = branches.find((one) => one.branch === standing);
  if (!head) return false;
  const path = new Map(pathTo(branches, { branch: standing, seq: head.next - 1 }).map((one) => [one.branch, one.upTo]));
  return branches.some((one) => {
    const goesBeside = one.next - 1 > (path.get(one.branch) ?? one.fromSeq);
    return goesBeside && one.next > (seen[one.branch] ?? 0);
  });
};
