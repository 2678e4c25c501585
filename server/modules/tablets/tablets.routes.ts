import type { Router } from 'express';
import { tabletReport } from '@shared/contracts/sync.contract';
import * as contract from '@shared/contracts/tablets.contract';
import type { Deps } from '../../deps';
import { AppError, waitFirst } from '../../http/errors';
import { officeRoute, publicRoute, tabletRoute } from '../../http/route';
import { shopOfToken } from '../../tenancy/shopToken';
import { unknownCode } from './tablets.errors';
import { makeChallenge } from './tabletTokens';
import * as tablets from './tablets.usecases';

/** Adds the addresses for enrolling tablets and for their tokens. */
export const tabletRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.createEnrolmentCode, ({ tx, caller, body }) =>
    tablets.createEnrolmentCode(deps, tx, caller, body.note),
  );

  publicRoute(router, deps, contract.enrol, async ({ body, visit, inShop }) => {
    const key = `enrol ${visit.ip}`;
    const now = deps.clock.now().getTime();
    const seconds = deps.failures.secondsLeft(key, now);
    if (seconds > 0) throw waitFirst('enrolment.wait', 'Too many wrong codes from this address.', seconds);
    const shop = shopOfToken(body.code);
    if (!shop) {
      deps.failures.fail(key, now);
      throw unknownCode();
    }
    const enrolled = await inShop(shop, (tx) => tablets.enrolTablet(deps, tx, body)).catch((error: unknown) => {
      // Whoever knows a code that is used or run out does not guess.
      if (error instanceof AppError && error.status === 404) deps.failures.fail(key, now);
      throw error;
    });
    deps.failures.clear(key);
    return enrolled;
  });

  publicRoute(router, deps, contract.challenge, ({ body, inShop }) =>
    inShop(body.shop, async (tx) => {
      await tablets.tabletCaller(tx, body.tablet);
      return makeChallenge(deps, body.shop, body.tablet);
    }),
  );

  publicRoute(router, deps, contract.token, ({ body, inShop }) =>
    inShop(body.shop, (tx) => tablets.tokenForChallenge(deps, tx, body)),
  );

  officeRoute(router, deps, contract.listTablets, async ({ tx }) => ({ tablets: await tablets.listTablets(tx) }));

  officeRoute(router, deps, contract.revokeTablet, ({ tx, caller, params, body }) =>
    tablets.revokeTablet(deps, tx, caller, params.id, body.reason),
  );

  tabletRoute(router, deps, tabletReport, async ({ tx, caller, body }) => {
    await tablets.keepReport(deps, tx, caller, body);
    return { done: true as const };
  });
};
