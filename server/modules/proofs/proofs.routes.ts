import type { Router } from 'express';
import * as contract from '@shared/contracts/proofs.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import { getProof, issueProof, listProofs, printableProof, revokeProof } from './proofs.usecases';

/** Adds the addresses by which the office finds, issues, prints and revokes proofs. */
export const proofRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.listProofs, async ({ tx, query }) => ({
    proofs: await listProofs(deps, tx, query),
  }));
  officeRoute(router, deps, contract.issueProof, ({ tx, caller, params, body }) =>
    issueProof(deps, tx, caller, { walk: params.id, ...body }),
  );
  officeRoute(router, deps, contract.getProof, ({ tx, params }) => getProof(deps, tx, params.id));
  officeRoute(router, deps, contract.proofPdf, async ({ tx, params, query, setHeader }) => {
    const proof = await printableProof(deps, tx, params.id);
    const bytes = await deps.proofPdf(proof, query);
    setHeader('Content-Disposition', `inline; filename="${proof.row.number}-${proof.row.issue}-${query.size}.pdf"`);
    return bytes;
  });
  officeRoute(router, deps, contract.revokeProof, ({ tx, caller, params, body }) =>
    revokeProof(deps, tx, caller, params.id, body.reason),
  );
};
