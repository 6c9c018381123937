import { callsRoutes } from './features/calls/calls.routes.js';
import { deviceRoutes } from './features/devices/devices.routes.js';
import { firstRunRoutes } from './features/first-run/first-run.routes.js';
import { healthRoutes } from './features/health/health.routes.js';
import { mailRoutes } from './features/mail/mail.routes.js';
import { openapiRoutes } from './features/openapi/openapi.routes.js';
import { peopleRoutes } from './features/people/people.routes.js';
import { photoRoutes } from './features/photos/photos.routes.js';
import { pushRoutes } from './features/push/push.routes.js';
import { reportRoutes } from './features/reports/reports.routes.js';
import type { Route } from './features/route.js';
import { sessionRoutes } from './features/sessions/sessions.routes.js';
import { setUpRoutes } from './features/set-up/set-up.routes.js';
import { syncRoutes } from './features/sync/sync.routes.js';

/** Every route of the server, feature by feature. What is not here is not mounted and not documented. */
export function routes(): Route[] {
  const described: Route[] = [
    ...healthRoutes,
    ...sessionRoutes,
    ...firstRunRoutes,
    ...deviceRoutes,
    ...peopleRoutes,
    ...mailRoutes,
    ...syncRoutes,
    ...reportRoutes,
    ...setUpRoutes,
    ...callsRoutes,
    ...photoRoutes,
    ...pushRoutes,
  ];
  return [...described, ...openapiRoutes(described)];
}
