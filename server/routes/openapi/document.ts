import {
  type ResponseConfig,
  OpenApiGeneratorV31,
  OpenAPIRegistry,
  extendZodWithOpenApi,
} from '@asteasolutions/zod-to-openapi';
import { z, type ZodObject, type ZodType } from 'zod';
import { problemSchema } from '../../../shared/contracts/problem.ts';
import type { Route } from '../route.ts';

extendZodWithOpenApi(z);

const PROBLEMS: Record<number, string> = {
  400: 'The request cannot be used',
  401: 'Not signed in',
  403: 'Your roles do not allow it',
  404: 'Nothing there, or not for you',
  409: 'It changed in between',
};

function problemAnswers(route: Route) {
  const statuses = [
    ...(route.query || route.body || route.multipart ? [400] : []),
    ...(route.access.kind === 'public' ? [] : [401]),
  ];
  if (route.access.kind === 'project') statuses.push(403, 404);
  if (route.method !== 'get') statuses.push(409);
  return Object.fromEntries(
    statuses.map((status) => [
      status,
      { description: PROBLEMS[status] ?? '', content: { 'application/problem+json': { schema: problemSchema } } },
    ]),
  );
}

function successAnswer(route: Route): Record<string, ResponseConfig> {
  if (route.answer === 'none') return { 204: { description: 'Done' } };
  const status = route.status ?? 200;
  if (!('safeParse' in route.answer)) {
    const schema = { type: 'string' as const, format: 'binary' };
    return { [status]: { description: route.summary, content: { [route.answer.mediaType]: { schema } } } };
  }
  return {
    [status]: { description: route.summary, content: { 'application/json': { schema: route.answer as ZodType } } },
  };
}

function requestBody(route: Route) {
  if (route.multipart) {
    const properties = Object.fromEntries(
      Object.entries(route.multipart).map(([name, description]) => [
        name,
        name === 'files'
          ? { type: 'array' as const, items: { type: 'string' as const, format: 'binary' }, description }
          : { type: 'string' as const, description },
      ]),
    );
    return { content: { 'multipart/form-data': { schema: { type: 'object' as const, properties } } } };
  }
  return route.body ? { content: { 'application/json': { schema: route.body } } } : undefined;
}

/** The API as an OpenAPI 3.1 document, from the schemas the routes themselves validate with. */
export function buildOpenApiDocument(routes: readonly Route[]): Record<string, unknown> {
  const registry = new OpenAPIRegistry();
  const session = registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'groundsel.sid',
  });
  for (const route of routes) {
    const body = requestBody(route);
    registry.registerPath({
      method: route.method,
      path: nameAddress(route),
      operationId: route.id,
      summary: route.summary,
      tags: [route.id.split('.')[0] ?? ''],
      security: route.access.kind === 'public' ? [] : [{ [session.name]: [] }],
      request: {
        ...(route.params ? { params: route.params as ZodObject } : {}),
        ...(route.query ? { query: route.query as ZodObject } : {}),
        ...(body ? { body } : {}),
      },
      responses: { ...successAnswer(route), ...problemAnswers(route) },
    });
  }
  const document = new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Groundsel',
      version: '1',
      description: 'Land-cover mapping for teams. Errors are problem documents (RFC 9457).',
    },
    servers: [{ url: '/api/v1' }],
  });
  for (const route of routes) markRequired(route, document);
  return document as unknown as Record<string, unknown>;
}

/** A number read from an address takes any text at first, which the generator takes for leave to send none. */
function markRequired(route: Route, document: ReturnType<OpenApiGeneratorV31['generateDocument']>): void {
  const operation = document.paths?.[nameAddress(route)]?.[route.method];
  const query = route.query ? (route.query as ZodObject).shape : {};
  for (const parameter of operation?.parameters ?? []) {
    if ('$ref' in parameter) continue;
    const schema = query[parameter.name] as ZodType | undefined;
    parameter.required = parameter.in === 'path' || schema?.safeParse(undefined).success === false;
  }
}

function nameAddress({ path }: Route): string {
  return path.replace(/:(\w+)/g, '{$1}');
}
