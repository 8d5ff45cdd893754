import { Router, type Request, type RequestHandler, type Response } from 'express';
import type { ZodType } from 'zod';
import type { App } from '../app-context.ts';
import { InvalidInput, NotAllowed, NotFound, NotSignedIn } from '../errors.ts';
import { decide } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { findRoles } from '../services/memberships.ts';
import type { Route, Target } from './route.ts';

function check(schema: ZodType | undefined, value: unknown, what: string): unknown {
  if (!schema) return undefined;
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const errors = result.error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message }));
  throw new InvalidInput(`The ${what} cannot be used.`, {
    errors,
    found: errors.map(({ path, message }) => (path ? `${path}: ${message}` : message)).join(' '),
    advice: 'Correct what is named and send again.',
  });
}

/** Params that are no identifier point to nothing, so they are missing, not malformed. */
function checkParams(route: Route, req: Request): unknown {
  if (!route.params) return undefined;
  const result = route.params.safeParse(req.params);
  if (!result.success) throw new NotFound();
  return result.data;
}

function viewerOf(req: Request): Viewer | null {
  const user = req.user;
  return user ? { userId: user.id, name: user.name, email: user.email, siteAdmin: user.siteAdmin, roles: [] } : null;
}

async function authorise(
  app: App,
  route: Route,
  params: unknown,
  viewer: Viewer | null,
): Promise<{ viewer: Viewer | null; target: Target }> {
  const nothing: Target = { projectId: '' };
  const { access } = route;
  if (access.kind === 'public') return { viewer, target: nothing };
  if (!viewer) throw new NotSignedIn();
  if (access.kind === 'account') return { viewer, target: nothing };
  if (access.kind === 'site-admin') {
    if (!viewer.siteAdmin) throw new NotFound();
    return { viewer, target: nothing };
  }
  const target = await access.find(app, params);
  if (!target) throw new NotFound();
  const roles = await findRoles(app, target.projectId, viewer.userId);
  const decision = decide(access.action, roles, target.madeById === viewer.userId);
  if (decision === 'hide') throw new NotFound();
  if (decision === 'forbid') {
    throw new NotAllowed(undefined, {
      found: `you are ${roles.join(' and ')} here`,
      advice: 'Ask the project lead for the role you need.',
    });
  }
  return { viewer: { ...viewer, roles }, target };
}

/** Runs middleware inside a handler, so that authority is decided before an upload's first byte is stored. */
async function runBefore(before: readonly RequestHandler[], req: Request, res: Response): Promise<void> {
  for (const handler of before) {
    await new Promise<void>((resolve, reject) => {
      void handler(req, res, (error?: unknown) => (error ? reject(error as Error) : resolve()));
    });
  }
}

/** Builds the router: each route validates, loads, authorises, calls and presents, in this order. */
export function mountRoutes(app: App, routes: readonly Route[]): Router {
  const router = Router();
  const checksAnswers = app.config.nodeEnv !== 'production';
  for (const route of routes) {
    const before = route.before?.(app) ?? [];
    router[route.method](route.path, async (req: Request, res: Response) => {
      const params = checkParams(route, req);
      const { viewer, target } = await authorise(app, route, params, viewerOf(req));
      await runBefore(before, req, res);
      const query = check(route.query, req.query, 'query');
      const body = check(route.body, req.body ?? {}, 'request');
      const answer = await route.handle({ app, params, query, body, viewer: viewer as Viewer, target, req, res });
      if (res.headersSent) return;
      res.status(route.status ?? (route.answer === 'none' ? 204 : 200));
      if (route.answer === 'none') return void res.end();
      if ('mediaType' in route.answer && !('safeParse' in route.answer)) return void res.end();
      const schema = route.answer as ZodType;
      res.json(checksAnswers ? schema.parse(answer) : answer);
    });
  }
  return router;
}
