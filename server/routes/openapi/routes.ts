import { z } from 'zod';
import { route, type Route } from '../route.ts';
import { buildOpenApiDocument } from './document.ts';

/** The route that describes all routes, itself too; hence the list is asked for when the document is. */
export function createOpenApiRoutes(listRoutes: () => readonly Route[]): Route[] {
  let document: Record<string, unknown> | null = null;
  return [
    route({
      id: 'openapi.read',
      method: 'get',
      path: '/openapi.json',
      summary: 'This document, OpenAPI 3.1',
      access: { kind: 'public' },
      answer: z.record(z.string(), z.unknown()),
      handle: () => Promise.resolve((document ??= buildOpenApiDocument(listRoutes()))),
    }),
  ];
}
