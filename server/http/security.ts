import type { Request, RequestHandler } from 'express';
import { rateLimit, ipKeyGenerator } from 'express-rate-limit';
import helmet from 'helmet';
import { Refusal } from '#server/http/refusal.ts';

/** Headers: everything from this origin alone, no inline script, no framing. */
export function securityHeaders(secure: boolean): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        workerSrc: ["'self'"],
        styleSrc: ["'self'"],
        imgSrc: ["'self'", 'blob:', 'data:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(secure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: secure,
    referrerPolicy: { policy: 'same-origin' },
    crossOriginOpenerPolicy: { policy: 'same-origin' },
  });
}

/** Refuses a changing request that a page of another site has sent. */
export function sameSiteOnly(baseUrl: string): RequestHandler {
  const own = new URL(baseUrl).host;
  return (req, _res, next) => {
    if (req.method === 'GET' || req.method === 'HEAD' || req.method === 'OPTIONS') return next();
    const site = req.get('sec-fetch-site');
    const origin = req.get('origin');
    const foreign =
      (site !== undefined && site !== 'same-origin' && site !== 'none') ||
      (origin !== undefined && !isOwn(origin, [own, req.get('host') ?? own]));
    if (foreign)
      throw new Refusal(
        'foreign-origin',
        'The request came from a page of another site. Open Fringeward itself and try again.',
      );
    next();
  };
}

function isOwn(origin: string, hosts: readonly string[]): boolean {
  try {
    return hosts.includes(new URL(origin).host);
  } catch {
    return false;
  }
}

/** At most `limit` failed attempts a quarter of an hour from one address on one account (whatever `accountOf` tells apart). */
export function attemptLimit(limit: number, accountOf: (req: Request) => string): RequestHandler {
  return rateLimit({
    windowMs: 15 * 60_000,
    limit,
    skipSuccessfulRequests: true,
    // A missing field or a stale page is no guess at a secret.
    requestWasSuccessful: (_req, res) => res.statusCode !== 401 && res.statusCode !== 403,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    keyGenerator: (req) => `${ipKeyGenerator(req.ip ?? '')} ${accountOf(req)}`,
    handler: (_req, _res, next) =>
      next(
        new Refusal(
          'too-many-attempts',
          `More than ${limit} attempts failed within 15 minutes. Wait a quarter of an hour, or ask an administrator.`,
        ),
      ),
  });
}
