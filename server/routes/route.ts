import type { Request, RequestHandler, Response } from 'express';
import type { z, ZodType } from 'zod';
import type { App } from '../app-context.ts';
import type { Action } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';

/** What a project route acts on: at least the project, and who made the thing where that matters. */
export interface Target {
  projectId: string;
  madeById?: string | null;
}

export type Access<P, R extends Target> =
  | { kind: 'public' }
  | { kind: 'account' }
  | { kind: 'site-admin' }
  /** `find` loads what is acted on, null when there is none; authority is then decided by the policy table. */
  | { kind: 'project'; action: Action; find: (app: App, params: P) => Promise<R | null> };

export interface RouteContext<P, Q, B, R> {
  app: App;
  params: P;
  query: Q;
  body: B;
  /** Set on every route that is not public. */
  viewer: Viewer;
  target: R;
  req: Request;
  res: Response;
}

export interface RouteDefinition<
  P extends ZodType,
  Q extends ZodType,
  B extends ZodType,
  S extends ZodType,
  R extends Target,
> {
  /** Name in the API document and in the authority test: "scenes.list". */
  id: string;
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Below /api/v1, with :names. */
  path: string;
  summary: string;
  access: Access<z.output<P>, R>;
  params?: P;
  query?: Q;
  body?: B;
  /** Schema of a JSON answer, or the media type of another one, which the handler writes to `res` itself. */
  answer: S | { mediaType: string } | 'none';
  /** 200 unless said. */
  status?: number;
  /** Refused to interpreters while reference points are open; set by `hideWhileInterpreting` alone. */
  isHiddenWhileInterpreting?: true;
  /** Extra middleware after authority is decided (uploads). */
  before?: (app: App) => RequestHandler[];
  /** How a multipart body is described in the API document. */
  multipart?: Record<string, string>;
  handle(context: RouteContext<z.output<P>, z.output<Q>, z.output<B>, R>): Promise<z.input<S> | undefined>;
}

/** A route with its types folded away, as the app and the API document take it. */
export type Route = RouteDefinition<ZodType, ZodType, ZodType, ZodType, Target>;

/** Declares a route; the only reason to call it is that it ties the schemas to the handler's types. */
export function route<
  S extends ZodType,
  P extends ZodType = z.ZodUndefined,
  Q extends ZodType = z.ZodUndefined,
  B extends ZodType = z.ZodUndefined,
  R extends Target = Target,
>(definition: RouteDefinition<P, Q, B, S, R>): Route {
  return definition as unknown as Route;
}
