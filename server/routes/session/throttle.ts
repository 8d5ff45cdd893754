import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import type { App } from '../../app-context.ts';
import { TooManyRequests } from '../../errors.ts';
import { RateStore } from '../../middleware/rate-store.ts';

const WINDOW_MS = 15 * 60_000;

function limiter(
  app: App,
  prefix: string,
  limit: number,
  keyOf: (req: Request) => string,
  countSuccess: boolean,
): RequestHandler {
  return rateLimit({
    windowMs: WINDOW_MS,
    limit,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    skipSuccessfulRequests: !countSuccess,
    store: new RateStore(app.db, prefix, WINDOW_MS),
    keyGenerator: keyOf,
    handler: (req, _res, next) => {
      const resetTime = (req as Request & { rateLimit?: { resetTime?: Date } }).rateLimit?.resetTime;
      const retryAfterSeconds = resetTime ? Math.max(1, (resetTime.getTime() - Date.now()) / 1000) : WINDOW_MS / 1000;
      next(
        new TooManyRequests('Too many tries.', {
          found: `more than ${limit} in 15 minutes`,
          advice: `Wait ${Math.ceil(retryAfterSeconds / 60)} minutes, or ask for a link to choose a new password.`,
          retryAfterSeconds,
        }),
      );
    },
  });
}

const addressOf = (req: Request) => ipKeyGenerator(req.ip ?? '');
const accountOf = (req: Request) =>
  String((req.body as { email?: unknown } | undefined)?.email ?? '')
    .trim()
    .toLowerCase()
    .slice(0, 120);

/** At most 8 failed tries an account and 40 an address in 15 minutes. */
export function signInThrottle(app: App): RequestHandler[] {
  return [limiter(app, 'sign-in-address', 40, addressOf, false), limiter(app, 'sign-in-account', 8, accountOf, false)];
}

/** At most 5 reset letters an account and 20 an address in 15 minutes. */
export function resetThrottle(app: App): RequestHandler[] {
  return [limiter(app, 'reset-address', 20, addressOf, true), limiter(app, 'reset-account', 5, accountOf, true)];
}

/** At most 8 failed tries in 15 minutes of the present password, by someone at a browser that was left signed in. */
export function passwordThrottle(app: App): RequestHandler[] {
  return [limiter(app, 'password-account', 8, (req) => req.user?.id ?? '', false)];
}

/** At most 40 tries of welcome and reset links an address in 15 minutes. */
export function linkThrottle(app: App): RequestHandler[] {
  return [limiter(app, 'link-address', 40, addressOf, false)];
}
