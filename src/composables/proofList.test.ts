import { describe, expect, it } from 'vitest';
import type { ProofRow } from '@shared/contracts/proofs.contract';
import type { OfficeWalk } from '@shared/contracts/walks.contract';
import { proofLines } from './proofList';

const aProof = (id: string, issuedAt: string): ProofRow =>
  ({ id, number: id, issue: 1, state: 'issued', issuedAt }) as ProofRow;
const aWalk = (id: string, more: Partial<OfficeWalk> = {}): OfficeWalk =>
  ({
    id,
    purpose: 'finalAssembly',
    proof: null,
    forked: false,
    quarantined: 0,
    refusedSeals: 0,
    missingBlobs: 0,
    changedAt: '2026-05-01T08:00:00Z',
    ...more,
  }) as OfficeWalk;

describe('the list of proofs', () => {
  it('puts what waits to be issued first, then the newest proof', () => {
    const lines = proofLines([aProof('a', '2026-01-01T00:00:00Z'), aProof('b', '2026-02-01T00:00:00Z')], [aWalk('w')]);
    expect(lines.map(({ kind, id }) => `${kind} ${id}`)).toEqual(['ready w', 'proof b', 'proof a']);
  });

  it('leaves out walks that have a proof, never get one, or need a look first', () => {
    const walks = [
      aWalk('issued', { proof: { id: 'p', number: 'BL-1', state: 'issued' } }),
      aWalk('trial', { purpose: 'trialFit' }),
      aWalk('forked', { forked: true }),
      aWalk('refused', { refusedSeals: 1 }),
      aWalk('photos', { missingBlobs: 2 }),
      aWalk('recheck', { purpose: 'recheck' }),
    ];
    expect(proofLines([], walks).map(({ id }) => id)).toEqual(['recheck']);
  });
});
