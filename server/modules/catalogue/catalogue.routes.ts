import type { Router } from 'express';
import { catalogue } from '@shared/contracts/catalogue.contract';
import type { Deps } from '../../deps';
import { tabletRoute } from '../../http/route';
import { readCatalogue } from './catalogue.usecases';

/** Adds the address by which tablets hear what changed. */
export const catalogueRoutes = (router: Router, deps: Deps): void => {
  tabletRoute(router, deps, catalogue, ({ tx, query }) => readCatalogue(deps, tx, query));
};
