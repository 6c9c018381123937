import compression from 'compression';
import express, { type Express } from 'express';
import { pinoHttp } from 'pino-http';
import type { Deps } from './deps.js';
import { ApiError } from './middleware/api-error.js';
import { appFiles, hasApp } from './middleware/app-files.js';
import { problemHandler } from './middleware/errors.js';
import { mountRoutes, type MountOptions } from './middleware/mount-routes.js';
import { securityHeaders } from './middleware/security-headers.js';
import { routes } from './routes.js';

/** The whole application on its deps, without a port. */
export function createApp(deps: Deps, options: MountOptions = {}): Express {
  const app = express();
  app.disable('x-powered-by');
  app.disable('etag');
  app.set('trust proxy', deps.settings.trustProxy);
  app.use(requestLog(deps));
  app.use(securityHeaders(deps.settings));
  // An event stream is written line by line; a compressor would hold the lines back.
  app.use(
    compression({
      filter: (request, response) =>
        !String(response.getHeader('Content-Type')).startsWith('text/event-stream') &&
        compression.filter(request, response),
    }),
  );
  app.use('/api', mountRoutes(deps, routes(), options));
  app.use('/api', () => {
    throw new ApiError('not-found');
  });
  if (hasApp(deps.settings.appDir)) app.use(appFiles(deps.settings.appDir));
  app.use(() => {
    throw new ApiError('not-found');
  });
  app.use(problemHandler(deps));
  return app;
}

function requestLog(deps: Deps) {
  return pinoHttp({
    logger: deps.log,
    autoLogging: { ignore: (request) => request.url === '/api/health' },
    // Headers carry the bearer and the cookies: none of them belongs in a log.
    serializers: {
      req: ({ id, method, url }: { id: unknown; method: string; url: string }) => ({ id, method, url }),
      res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
    },
    customLogLevel: (_request, response, error) => {
      if (error || response.statusCode >= 500) return 'error';
      return response.statusCode >= 400 ? 'info' : 'debug';
    },
  });
}
