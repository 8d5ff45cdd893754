import { z } from 'zod';
import { route } from '../route.ts';

export const openapiRoutes = [
  route({
    id: 'openapi.read',
    method: 'get',
    path: '/openapi.json',
    summary: 'This document, OpenAPI 3.1',
    access: { kind: 'public' },
    answer: z.record(z.string(), z.unknown()),
    async handle() {
      // Loaded on demand: the document lists all routes, this one too.
      const { routes } = await import('../index.ts');
      const { buildOpenApiDocument } = await import('./document.ts');
      return buildOpenApiDocument(routes);
    },
  }),
];
