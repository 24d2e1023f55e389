import swagger from '@fastify/swagger';
import swaggerUi from '@fastify/swagger-ui';
import type { FastifyInstance } from 'fastify';
import { jsonSchemaTransform, jsonSchemaTransformObject } from 'fastify-type-provider-zod';

const DESCRIPTION = `Decides, for each wound part and each place it is used, whether it may go in.

All quantities are SI and the field name carries the unit after an underscore. Bodies are strict: an unknown field is an error.
Everything that goes wrong is \`application/problem+json\` (RFC 9457) with RFC 6901 pointers to the offending fields.
Answers that concern something that can hurt carry \`cautions\`; they defer to local codes and licensed practice.`;

/** OpenAPI 3.1 of the routes registered after this, at /openapi.json, and interactive documentation of it at /docs. */
export async function openapi(app: FastifyInstance, version: string): Promise<void> {
  await app.register(swagger, {
    openapi: {
      openapi: '3.1.0',
      info: {
        title: 'coilproof',
        version,
        description: DESCRIPTION,
        license: { name: 'Apache-2.0', identifier: 'Apache-2.0' },
      },
      tags: [
        { name: 'approval', description: 'may this part go in?' },
        { name: 'evidence', description: 'what rigs measured, unit by unit and lot by lot' },
        { name: 'registry', description: 'materials, rigs, released parts, lots' },
        { name: 'calculation', description: 'nothing stored' },
        { name: 'service', description: 'health, metrics, documents' },
      ],
    },
    transform: jsonSchemaTransform,
    transformObject: jsonSchemaTransformObject,
  });
  await app.register(swaggerUi, { routePrefix: '/docs', staticCSP: true });
}
