import type { Router } from 'express';
import * as contract from '@shared/contracts/officeAuth.contract';
import type { Deps } from '../../deps';
import { AppError } from '../../http/errors';
import { officeRoute, publicRoute } from '../../http/route';
import * as auth from './officeAuth.usecases';

/** Adds the addresses for signing in and out at the office. */
export const officeAuthRoutes = (router: Router, deps: Deps): void => {
  publicRoute(router, deps, contract.signIn, async ({ body, setSession }) => {
    const signedIn = await auth.signIn(deps, body);
    if (signedIn instanceof AppError) return signedIn;
    setSession(signedIn.token);
    return signedIn.me;
  });
  officeRoute(router, deps, contract.signOut, async ({ tx, caller, setSession }) => {
    await auth.signOut(deps, tx, caller);
    setSession(null);
    return { done: true as const };
  });
  officeRoute(router, deps, contract.me, ({ tx, caller }) => auth.whoAmI(tx, caller));
};
