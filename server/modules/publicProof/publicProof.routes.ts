import type { Router } from 'express';
import * as contract from '@shared/contracts/proofs.contract';
import type { Deps } from '../../deps';
import { publicRoute } from '../../http/route';
import { shopOfToken } from '../../tenancy/shopToken';
import { proofUnknown } from '../proofs/proofs.errors';
import { publicKeysOf, publicProofByToken } from './publicProof.usecases';

/** Adds the addresses that whoever checks a proof asks, signed in or not. */
export const publicProofRoutes = (router: Router, deps: Deps): void => {
  publicRoute(router, deps, contract.publicProof, ({ params, inShop }) => {
    const shop = shopOfToken(params.token);
    if (!shop) throw proofUnknown();
    return inShop(shop, (tx) => publicProofByToken(deps, tx, params.token));
  });
  publicRoute(router, deps, contract.publicJwks, ({ params, inShop }) =>
    inShop(params.shop, (tx) => publicKeysOf(deps, tx)),
  );
};
