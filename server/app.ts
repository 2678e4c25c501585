import compression from 'compression';
import express, { type Express, Router } from 'express';
import { pinoHttp } from 'pino-http';
import type { Deps } from './deps';
import { handleErrors, unknownRoute } from './http/handleErrors';
import { pages } from './http/pages';
import { floodGuard } from './http/rateLimit';
import { securityHeaders } from './http/security';
import { blobRoutes } from './modules/blobs/blobs.routes';
import { catalogueRoutes } from './modules/catalogue/catalogue.routes';
import { countersignRoutes } from './modules/countersign/countersign.routes';
import { demoRoutes } from './modules/demo/demo.routes';
import { healthRoutes } from './modules/health/health.routes';
import { jobRoutes } from './modules/jobs/jobs.routes';
import { officeAuthRoutes } from './modules/officeAuth/officeAuth.routes';
import { peopleRoutes } from './modules/people/people.routes';
import { procedureRoutes } from './modules/procedures/procedures.routes';
import { proofRoutes } from './modules/proofs/proofs.routes';
import { publicProofRoutes } from './modules/publicProof/publicProof.routes';
import { syncRoutes } from './modules/sync/sync.routes';
import { tabletRoutes } from './modules/tablets/tablets.routes';
import { walkRoutes } from './modules/walks/walks.routes';
import { wrenchRoutes } from './modules/wrenches/wrenches.routes';

const REQUESTS_A_MINUTE = 6_000;

const apiRoutes = (deps: Deps): Router => {
  const router = Router();
  const modules = [healthRoutes, officeAuthRoutes, tabletRoutes, catalogueRoutes, syncRoutes, blobRoutes];
  const office = [jobRoutes, procedureRoutes, wrenchRoutes, peopleRoutes, walkRoutes, countersignRoutes, proofRoutes];
  for (const add of [...modules, ...office, publicProofRoutes]) add(router, deps);
  if (deps.config.demo) demoRoutes(router, deps);
  return router;
};

/** One line a request: what was asked and how it ended, never a header (they hold tokens) nor a body (it holds PINs). */
const requestLog = ({ log }: Deps) =>
  pinoHttp({
    logger: log,
    autoLogging: { ignore: ({ url }) => url === '/health' },
    serializers: {
      req: ({ method, url }: { method: string; url: string }) => ({ method, url }),
      res: ({ statusCode }: { statusCode: number }) => ({ status: statusCode }),
    },
  });

/** The whole server as an Express application; the world comes in as `deps`, so that tests can hand in another. */
export const createApp = (deps: Deps): Express => {
  const app = express();
  app.disable('x-powered-by');
  app.set('query parser', 'simple');
  app.use(securityHeaders(deps.config.secure));
  app.use(compression());
  app.use('/api', (_request, response, next) => {
    response.setHeader('Cache-Control', 'no-store');
    next();
  });
  app.use('/api', requestLog(deps));
  app.use('/api', floodGuard(REQUESTS_A_MINUTE));
  app.use(apiRoutes(deps));
  app.use('/api', unknownRoute);
  app.use(pages(deps.config.distDir));
  app.use(unknownRoute);
  app.use(handleErrors(deps));
  return app;
};
