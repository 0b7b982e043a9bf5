import { OpenAPIRegistry, OpenApiGeneratorV31, type RouteConfig } from '@asteasolutions/zod-to-openapi';
import { z } from 'zod';
import { ProblemSchema } from '@/shared/contract/common';
import { PLANE_HEADERS } from '@/shared/contract/cubes';
import { ENDPOINTS, type Endpoint } from '@/shared/contract/endpoints';

/** The OpenAPI 3.1 document, generated from the table of endpoints and the schemas it names. */
export function openApiDocument(version: string) {
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'outswell',
  });
  registry.registerComponent('securitySchemes', 'token', { type: 'http', scheme: 'bearer' });
  for (const endpoint of ENDPOINTS) registry.registerPath(toRoute(endpoint));
  return new OpenApiGeneratorV31(registry.definitions).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Outswell',
      version,
      description:
        'Angles in degrees, velocities in km/s, distances in pc, brightness in the unit of the cube. Channels and pixels count from 0. A write with a session carries its CSRF token (GET /me) in X-CSRF-Token; one with a token does not need it.',
    },
    servers: [{ url: '/api/v1' }],
    security: [{ session: [] }, { token: [] }],
  });
}

function toRoute({ method, path, summary, open, query, body, binaryBody, answer }: Endpoint): RouteConfig {
  const names = [...path.matchAll(/:(\w+)/g)].map((m) => m[1]!);
  const params = z.object(
    Object.fromEntries(names.map((n) => [n, n === 'channel' ? z.int().min(0) : z.string()])),
  );
  const headers = answer.binary === 'application/octet-stream' ? planeHeaders : undefined;
  return {
    method,
    path: path.replace(/:(\w+)/g, '{$1}'),
    summary,
    ...(open && { security: [] }),
    request: {
      ...(names.length > 0 && { params }),
      ...(query && { query }),
      ...(body && { body: { required: true, content: { 'application/json': { schema: body } } } }),
      ...(binaryBody && {
        body: {
          required: true,
          content: Object.fromEntries(binaryBody.map((type) => [type, { schema: BYTES }])),
        },
      }),
    },
    responses: {
      [answer.status]: {
        description: summary,
        ...(headers && { headers }),
        ...((answer.schema || answer.binary) && {
          content: {
            [answer.binary ?? 'application/json']: {
              schema: answer.schema ?? BYTES,
            },
          },
        }),
      },
      default: {
        description: 'A problem: what is wrong and what to do',
        content: { 'application/problem+json': { schema: ProblemSchema } },
      },
    },
  };
}

const BYTES = z.string().meta({ format: 'binary' });
const planeHeaders = z.object(
  Object.fromEntries(Object.values(PLANE_HEADERS).map((name) => [name, z.string()])),
);
