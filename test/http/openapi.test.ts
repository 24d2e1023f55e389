import { readFileSync } from 'node:fs';
import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { ERROR_CATALOGUE } from '../../src/errors.ts';
import { useService } from '../support/service.ts';

interface Operation {
  operationId: string;
  summary: string;
  'x-scope': string;
  parameters?: {
    in: string;
    name: string;
    example?: string;
    examples?: Record<string, { value: string }>;
    schema: { examples?: string[] };
  }[];
  requestBody?: { content: Record<string, { example?: unknown; examples?: Record<string, { value: unknown }> }> };
  responses: Record<string, { description?: string; content?: Record<string, unknown> }>;
}

const committed = JSON.parse(readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8')) as {
  paths: Record<string, Record<string, Operation>>;
  components: { schemas: Record<string, unknown> };
};
const api = useService();

/** The path with each parameter's published example in its place. */
const withParameters = (path: string, { parameters = [] }: Operation) =>
  parameters
    .filter((parameter) => parameter.in === 'path')
    .reduce(
      (filled, { name, schema, example }) => filled.replace(`{${name}}`, example ?? schema.examples?.[0] ?? name),
      path,
    );

const operations = Object.entries(committed.paths).flatMap(([path, methods]) =>
  Object.entries(methods).map(([method, operation]) => ({ path, method, operation, name: `${method} ${path}` })),
);
const examples = operations.flatMap(({ path, method, operation }) =>
  Object.values(operation.requestBody?.content ?? {}).flatMap(({ example, examples: several }) =>
    (example === undefined ? Object.values(several ?? {}).map(({ value }) => value) : [example]).map((body, index) => ({
      name: `${method} ${path} example ${index + 1}`,
      path: withParameters(path, operation),
      method,
      operation,
      body,
    })),
  ),
);

describe('the published OpenAPI', () => {
  it('is what the running app says: npm run openapi writes it', () => {
    expect(JSON.parse(JSON.stringify(api.service().app.swagger()))).toEqual(committed);
  });

  it('gives every operation an id of its own, a summary and a scope', () => {
    const ids = operations.map(({ operation }) => operation.operationId);
    expect(ids.every(Boolean)).toBe(true);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { operation } of operations) {
      expect(operation.summary).toBeTruthy();
      expect(operation['x-scope']).toMatch(/^(calculate|read|measure|approve|administer|public)$/);
    }
  });

  it('gives every operation with a body an example', () => {
    const withBody = operations
      .filter(({ operation }) => operation.requestBody)
      .map(({ operation }) => operation.operationId);
    const exemplified = new Set(examples.map(({ operation }) => operation.operationId));
    expect(withBody.filter((id) => !exemplified.has(id))).toEqual([]);
    expect(withBody.length).toBeGreaterThan(7);
  });

  it.each(examples)('$name is answered as published', async ({ path, method, body, operation }) => {
    const answer = await request(api.server)
      [method as 'post'](path)
      .send(body as object);
    expect(answer.body.errors ?? answer.body.detail).toBeUndefined();
    expect(Object.keys(operation.responses)).toContain(String(answer.status));
    expect(answer.status).toBeLessThan(300);
  });

  it('publishes problems as problem+json, and of the catalogue every one that a request can meet', () => {
    const text = JSON.stringify(operations.map(({ operation }) => operation.responses));
    const unpublished = Object.keys(ERROR_CATALOGUE).filter((code) => !text.includes(`\`${code}\``));
    // It answers methods that no operation has.
    expect(unpublished).toEqual(['method-not-allowed']);
    for (const { operation } of operations) {
      for (const [status, { content }] of Object.entries(operation.responses)) {
        if (Number(status) >= 400) expect(Object.keys(content ?? {})).toEqual(['application/problem+json']);
      }
    }
  });
});
