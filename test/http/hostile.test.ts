import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { useService } from '../support/service.ts';

interface Operation {
  requestBody?: { content: Record<string, { example?: unknown; examples?: Record<string, { value: unknown }> }> };
}
const openapi = JSON.parse(readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8')) as {
  paths: Record<string, Record<string, Operation>>;
};
const api = useService({ LOG_LEVEL: 'fatal', REQUEST_TIMEOUT_MS: '120000' });

/** Posted bodies: a calculation or an approval answers these in one request, without anything registered before. */
const cases = Object.entries(openapi.paths)
  .filter(([path]) => !path.includes('{'))
  .flatMap(([path, { post }]) =>
    Object.values(post?.requestBody?.content ?? {}).flatMap(({ example, examples }) =>
      (example === undefined ? Object.values(examples ?? {}).map(({ value }) => value) : [example]).map(
        (body, index) => ({
          name: `${path} example ${index + 1}`,
          path,
          body,
        }),
      ),
    ),
  );

/** What no number of a request should be able to do harm with; `raw` goes into the text as it stands. */
const HOSTILE = ['1e308', '-1e308', '1e-308', '0', '-1', 'null', '"1"', '[]', '{}', '1e999', `1${'0'.repeat(400)}`];

/** Leaves of an example that are tried: enough to meet each kind of field, few enough to be quick. */
const LEAVES = 14;

type Path = readonly (string | number)[];
function numbersIn(node: unknown, path: Path = []): Path[] {
  if (typeof node === 'number') return [path];
  if (node === null || typeof node !== 'object') return [];
  return Object.entries(node).flatMap(([key, value]) => numbersIn(value, [...path, key]));
}

const MARK = '@@hostile@@';
function withRaw(body: unknown, path: Path, raw: string): string {
  const copy = structuredClone(body) as Record<string, unknown>;
  const container = path
    .slice(0, -1)
    .reduce<Record<string, unknown>>((node, key) => node[key] as Record<string, unknown>, copy);
  container[path.at(-1)!] = MARK;
  return JSON.stringify(copy).replace(`"${MARK}"`, raw);
}

describe('hostile numbers', () => {
  it.each(cases)('$name: a problem that says where, or an answer in numbers, never a fault', async ({ path, body }) => {
    const leaves = numbersIn(body);
    const step = Math.max(1, Math.floor(leaves.length / LEAVES));
    for (const leaf of leaves.filter((_, index) => index % step === 0)) {
      for (const raw of HOSTILE) {
        const payload = withRaw(body, leaf, raw);
        const answer = await api
          .service()
          .app.inject({ method: 'POST', url: path, headers: { 'content-type': 'application/json' }, payload });
        const where = `${leaf.join('/')} = ${raw.slice(0, 20)}: ${answer.statusCode} ${answer.body.slice(0, 300)}`;
        expect(answer.statusCode, where).toBeLessThan(500);
        if (answer.statusCode >= 400) {
          expect(answer.headers['content-type'], where).toMatch(/^application\/problem\+json/);
          expect(answer.json().detail, where).toBeTruthy();
          if (answer.statusCode === 422 && answer.json().type !== 'urn:coilproof:problem:number-range') {
            expect(answer.json().errors?.[0]?.pointer, where).toEqual(expect.any(String));
          }
        }
      }
    }
  });
});
