import type { RequestHandler } from 'express';
import { NotAllowed } from '../errors.ts';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses requests that change something and come from another site. Browsers say where a request comes from in
 * Sec-Fetch-Site and Origin; programs that send neither carry no one's cookies by accident.
 */
export function sameOrigin(publicUrl: string): RequestHandler {
  const publicOrigin = new URL(publicUrl).origin;
  return (req, _res, next) => {
    if (SAFE.has(req.method)) return next();
    const site = req.get('sec-fetch-site');
    const origin = req.get('origin');
    const foreignSite = site !== undefined && site !== 'same-origin' && site !== 'none';
    const foreignOrigin = origin !== undefined && origin !== publicOrigin && !isHost(origin, req.get('host'));
    if (foreignSite || foreignOrigin) {
      throw new NotAllowed(
        'This request comes from another site.',
        {
          found: origin ?? site ?? '',
          wanted: publicOrigin,
          advice: 'Open Groundsel at its own address and try again.',
        },
        'foreign-origin',
      );
    }
    next();
  };
}

function isHost(origin: string, host: string | undefined): boolean {
  return URL.canParse(origin) && new URL(origin).host === host;
}
