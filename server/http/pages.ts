import path from 'node:path';
import express, { Router } from 'express';

const IMMUTABLE = /\/assets\/.+-[A-Za-z0-9_-]{8}\.[a-z0-9]+$/;
const YEAR_SECONDS = 31_536_000;

/** Built files carry their hash in their name and never change; everything else is asked for again each time. */
const cacheFor = (file: string): string =>
  IMMUTABLE.test(file.split(path.sep).join('/')) ? `public, max-age=${YEAR_SECONDS}, immutable` : 'no-cache';

/**
 * The built pages: files as they are, the page of a proof under /p, and the application for every other address, so that
 * a link into it opens. Never reached by an address under /api.
 */
export const pages = (distDir: string): Router => {
  const router = Router();
  const root = path.resolve(distDir);
  router.use(
    express.static(root, {
      index: 'index.html',
      setHeaders: (response, file) => response.setHeader('Cache-Control', cacheFor(file)),
    }),
  );
  const page = (name: string): express.RequestHandler => {
    return (_request, response) => {
      response.setHeader('Cache-Control', 'no-cache');
      response.sendFile(name, { root });
    };
  };
  router.get('/p/:token', page('verify.html'));
  router.get('/{*splat}', (request, response, next) => {
    // A missing file is missing: answering it with the page would be taken for a script or a picture.
    if (path.extname(request.path) !== '') next();
    else page('index.html')(request, response, next);
  });
  return router;
};
