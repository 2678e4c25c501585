import type { JointRow } from '@shared/contracts/jobRow.contract';
import type { WalkRow, WalkStateName } from '@shared/contracts/walkRow.contract';

/**
 * Where a joint stands. Only `finished` may run; everything else reads *not finished: do not run* (W12). `attention`:
 * a walk of it waits for a person: forked, refused events, a PIN refused or not theirs, two walks at once.
 */
export type JointStandingName =
  | 'attention'
  | 'stopped'
  | 'sentBack'
  | 'signed'
  | 'review'
  | 'walking'
  | 'strippedDown'
  | 'notFinal'
  | 'voided'
  | 'neverOpened'
  | 'finished';

/** Where a joint stands and the walk that says so; `walk` is null where nobody ever opened one. */
export interface JointStanding {
  name: JointStandingName;
  walk: WalkRow | null;
  doNotRun: boolean;
  why: ('forked' | 'quarantined' | 'refusedSeals' | 'parallel')[];
}

/** Most urgent first: what stops an engine, then what waits for somebody at the office, then what is under way. */
export const STANDINGS: readonly JointStandingName[] = [
  'attention',
  'stopped',
  'sentBack',
  'signed',
  'review',
  'walking',
  'strippedDown',
  'notFinal',
  'voided',
  'neverOpened',
  'finished',
];

/** How urgent a standing is: 0 is the most urgent. */
export const urgencyOf = (name: JointStandingName): number => STANDINGS.indexOf(name);

const underWay = new Set<WalkStateName>(['walking', 'review', 'signed', 'sentBack', 'stopped']);

function reasonsOf(walk: WalkRow, walks: readonly WalkRow[]): JointStanding['why'] {
  const others = walk.parallel.filter((id) => walks.some((other) => other.id === id && underWay.has(other.state)));
  return [
    ...(walk.forked ? (['forked'] as const) : []),
    ...(walk.quarantined > 0 ? (['quarantined'] as const) : []),
    ...(walk.refusedSeals > 0 ? (['refusedSeals'] as const) : []),
    ...(others.length > 0 && underWay.has(walk.state) ? (['parallel'] as const) : []),
  ];
}

function nameOf(walk: WalkRow, walks: readonly WalkRow[]): JointStandingName {
  if (walk.state !== 'finished') return walk.state;
  if (walk.purpose === 'finalAssembly') return 'finished';
  if (walk.purpose === 'stripDown') return 'strippedDown';
  // A recheck leaves the joint as the walk before it did; a trial fit leaves it unfinished.
  if (walk.purpose !== 'recheck') return 'notFinal';
  const before = walks.filter((other) => other.state === 'finished' && other.openedAt < walk.openedAt);
  const last = before.at(-1);
  return last ? nameOf(last, before) : 'notFinal';
}

/** Where a joint stands after all its walks. The walk opened last that was not voided decides. */
export function jointStanding(joint: Pick<JointRow, 'id'>, walks: readonly WalkRow[]): JointStanding {
  const own = walks
    .filter((walk) => walk.joint === joint.id)
    .sort((a, b) => (a.openedAt < b.openedAt ? -1 : a.openedAt > b.openedAt ? 1 : 0));
  const standing = own.filter((walk) => walk.state !== 'voided');
  const walk = standing.at(-1) ?? own.at(-1) ?? null;
  if (!walk) return { name: 'neverOpened', walk, doNotRun: true, why: [] };
  const why = reasonsOf(walk, own);
  const name = why.length > 0 ? 'attention' : nameOf(walk, standing);
  return { name, walk, doNotRun: name !== 'finished', why };
}
