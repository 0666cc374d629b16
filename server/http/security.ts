import type { RequestHandler } from 'express';
import rateLimit from 'express-rate-limit';
import helmet from 'helmet';
import type { Config } from '@/server/config';
import { tooMany } from './problem';

/**
 * Headers of every answer. The web app decodes labels with WebAssembly, shows photos from memory and styles itself at
 * run time; it loads nothing from another origin and nobody frames it.
 */
export function securityHeaders(config: Config): RequestHandler[] {
  const https = config.publicUrl.startsWith('https:');
  return [
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
          styleSrc: ["'self'", "'unsafe-inline'"],
          imgSrc: ["'self'", 'blob:', 'data:'],
          mediaSrc: ["'self'", 'blob:', 'mediastream:'],
          fontSrc: ["'self'", 'data:'],
          connectSrc: ["'self'"],
          workerSrc: ["'self'", 'blob:'],
          objectSrc: ["'none'"],
          baseUri: ["'self'"],
          formAction: ["'self'"],
          frameAncestors: ["'none'"],
          ...(https ? { upgradeInsecureRequests: [] } : {}),
        },
      },
      // Only over HTTPS does the browser heed it; on a plain address it would be noise.
      strictTransportSecurity: https ? { maxAge: 31_536_000, includeSubDomains: false } : false,
      referrerPolicy: { policy: 'no-referrer' },
      crossOriginEmbedderPolicy: false,
    }),
    (_request, response, next) => {
      response.set('Permissions-Policy', 'camera=(self), microphone=(), geolocation=(), payment=()');
      next();
    },
  ];
}

/** Slows down anybody who hammers the routes that need no sign-in. Counted per process: a brake, not a lock. */
export function publicLimit(config: Config): RequestHandler {
  const windowMs = 60_000;
  return rateLimit({
    windowMs,
    limit: config.limits.publicPerMinute,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    skip: (request) => request.path === '/health', // whoever watches over the service asks often
    handler: (_request, _response, next) => {
      next(tooMany(windowMs / 1000));
    },
  });
}
