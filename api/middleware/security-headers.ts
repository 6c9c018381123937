import type { RequestHandler } from 'express';
import helmet from 'helmet';
import type { Settings } from '../settings.js';

/**
 * Everything is self-hosted, so the policy names no other host. Angular puts component styles into the page, hence
 * 'unsafe-inline' for styles alone; scripts stay strict. What only makes sense under HTTPS is sent only there: on a
 * mill's plain http, `upgrade-insecure-requests` would break every request.
 */
export function securityHeaders(settings: Settings): RequestHandler {
  const https = settings.tls !== null || settings.publicOrigins.some((each) => each.startsWith('https:'));
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': ["'self'"],
        'script-src': ["'self'"],
        'script-src-attr': ["'none'"],
        'style-src': ["'self'", "'unsafe-inline'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'font-src': ["'self'"],
        'connect-src': ["'self'"],
        'worker-src': ["'self'"],
        'manifest-src': ["'self'"],
        'object-src': ["'none'"],
        'base-uri': ["'self'"],
        'form-action': ["'self'"],
        'frame-ancestors': ["'none'"],
        ...(https ? { 'upgrade-insecure-requests': [] } : {}),
      },
    },
    strictTransportSecurity: https ? { maxAge: 31_536_000, includeSubDomains: false } : false,
    crossOriginOpenerPolicy: https,
    originAgentCluster: https,
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}
