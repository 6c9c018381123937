import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { Router, static as serveFolder } from 'express';

/** The builder puts a hash of the content in these names, so they never change. */
const HASHED = /-[A-Z0-9]{8}\.[a-z0-9.]+$/;

/**
 * The built application. A path without extension is a page of it and gets index.html; a missing chunk, picture or
 * /robots.txt is not there, and must not look as if it were.
 */
export function appFiles(appDir: string): Router {
  const router = Router();
  router.use(
    serveFolder(appDir, {
      index: false,
      redirect: false,
      setHeaders: (response, path) => {
        response.set('Cache-Control', HASHED.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache');
      },
    }),
  );
  router.get('/{*path}', (request, response, next) => {
    if (/\.[^/]*$/.test(request.path)) return next();
    response.set('Cache-Control', 'no-cache');
    response.sendFile(join(appDir, 'index.html'), { cacheControl: false }, (error) => {
      if (error) next(error);
    });
  });
  return router;
}

export function hasApp(appDir: string | null): appDir is string {
  return appDir !== null && existsSync(join(appDir, 'index.html'));
}
