import type { RequestHandler } from 'express';
import helmet from 'helmet';
import { verifyRequestOrigin } from 'lucia';
import { ProblemError } from './problem-error.ts';

/**
 * Scripts only from ourselves. KaTeX and the maths field write `style` attributes, so styles may be inline.
 * Vite's reloading needs inline scripts, so the policy is off while the client is served from its sources.
 */
export function securityHeaders(overHttps: boolean, clientFromSources: boolean): RequestHandler {
  return helmet({
    contentSecurityPolicy: clientFromSources
      ? false
      : {
          useDefaults: false,
          directives: {
            defaultSrc: ["'self'"],
            scriptSrc: ["'self'"],
            scriptSrcAttr: ["'none'"],
            styleSrc: ["'self'", "'unsafe-inline'"],
            fontSrc: ["'self'", 'data:'],
            imgSrc: ["'self'", 'data:', 'blob:'],
            connectSrc: ["'self'"],
            objectSrc: ["'none'"],
            baseUri: ["'self'"],
            formAction: ["'self'"],
            frameAncestors: ["'none'"],
            // On plain http it would send every request to a port that does not speak TLS.
            ...(overHttps && { upgradeInsecureRequests: [] }),
          },
        },
    strictTransportSecurity: overHttps,
    referrerPolicy: { policy: 'same-origin' },
    crossOriginOpenerPolicy: overHttps,
    originAgentCluster: overHttps,
  });
}

/**
 * Refuses a changing request that another site's page sent. In production only the address people type counts;
 * on one's own machine localhost and 127.0.0.1 are both in use, so there the Host header counts too.
 */
export function sameSiteOnly(baseUrl: string, trustHostHeader: boolean): RequestHandler {
  const own = new URL(baseUrl).host;
  return (req, _res, next) => {
    const { origin, host } = req.headers;
    const allowed = trustHostHeader && host ? [own, host] : [own];
    if (!origin || !verifyRequestOrigin(origin, allowed)) throw new ProblemError('cross-site');
    next();
  };
}
