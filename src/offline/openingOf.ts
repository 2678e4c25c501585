import { err, ok, type Result } from '@shared/kernel/result';
import type { EarlierWork, Purpose } from '@shared/walk/events';
import type { WalkState } from '@shared/walk/state';
import type { Catalogue } from './catalogue';
import type { WalkAct } from './walkAct';
import type { WalkStart } from './walkLog';

/** A walk that somebody wants to begin. */
export interface WantedWalk {
  joint: string;
  purpose: Purpose;
  pulls: string;
  records: string;
}

/** Why a walk cannot be begun on this tablet. */
export type OpeningRefusal = {
  code: 'opening.jointUnknown' | 'opening.jobClosed' | 'opening.noProcedure' | 'opening.noSettings';
};

/** How a walk begins: the document it is bound to and its first act. */
export interface Opening {
  begin: NonNullable<WalkStart['begin']>;
  act: WalkAct;
}

/**
 * What earlier walks left on a joint (W1): the server's word, and the walks on this tablet, which the server may not have
 * yet; those in the order in which they were opened. A finished strip-down sets the joint back to new.
 */
export function earlierWork(known: EarlierWork, here: readonly WalkState[]): EarlierWork {
  return here.reduce<EarlierWork>(({ readingsTaken, usedHoles }, state) => {
    const isStrip = state.opened?.purpose === 'stripDown';
    if (isStrip && state.signatures.some((sign) => sign.stands)) return { readingsTaken: false, usedHoles: [] };
    const used = Object.entries(state.holes).flatMap(([hole, { used: isUsed }]) => (isUsed ? [hole] : []));
    return {
      readingsTaken: readingsTaken || (!isStrip && state.readings.length > 0),
      usedHoles: [...new Set([...usedHoles, ...used])],
    };
  }, known);
}

const newest = (catalogue: Catalogue, code: string) =>
  Object.values(catalogue.procedures)
    .filter((one) => one.code === code && one.state === 'approved')
    .sort((a, b) => b.revision - a.revision)[0];

/** Makes the first event of a walk from what the catalogue says. Pure; `here` are walks of this joint on this tablet. */
export function openingOf(
  catalogue: Catalogue,
  wanted: WantedWalk,
  here: readonly WalkState[],
): Result<Opening, OpeningRefusal> {
  const joint = catalogue.joints[wanted.joint];
  const job = joint && catalogue.jobs[joint.job];
  if (!joint || joint.retired || !job) return err({ code: 'opening.jointUnknown' });
  if (job.state === 'closed') return err({ code: 'opening.jobClosed' });
  const revision = newest(catalogue, joint.procedure);
  if (!revision) return err({ code: 'opening.noProcedure' });
  const settings = catalogue.shop?.settings;
  if (!settings) return err({ code: 'opening.noSettings' });
  const { judgement, countersign, shopOfOne } = settings;
  const { pulls, records, purpose } = wanted;
  const act: WalkAct = {
    type: 'walk.opened',
    data: {
      job: job.id,
      joint: joint.id,
      purpose,
      procedure: { code: revision.code, revision: revision.revision, hash: revision.hash },
      pulls,
      records,
      policy: { judgement, countersign, shopOfOne },
      rules: 1,
      earlier: earlierWork(joint.earlier, here),
    },
  };
  return ok({ begin: { document: revision.document, hash: revision.hash }, act });
}
