import { readdirSync, readFileSync } from 'node:fs';
import { dirname, relative, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';

const SRC = new URL('../src/', import.meta.url).pathname;

/**
 * Which rooms a room may import from, beside itself. `errors` is the catalogue that everything above the numbers shares;
 * metrology takes two things of physics that are not physics: the error that names a quantity, and the numerics.
 */
const ARROWS: Record<string, readonly string[]> = {
  physics: [],
  metrology: ['physics/invalid-quantity.ts', 'physics/numerics'],
  evidence: ['metrology', 'physics', 'errors'],
  approval: ['evidence', 'metrology', 'physics', 'errors'],
  report: ['approval', 'evidence', 'physics', 'errors'],
  storage: ['approval', 'evidence', 'errors'],
  workers: ['approval', 'evidence', 'metrology', 'physics', 'report', 'errors'],
  http: ['approval', 'evidence', 'metrology', 'physics', 'report', 'demo', 'errors'],
  config: ['errors'],
  demo: ['approval', 'evidence', 'physics'],
  compose: ['http', 'workers', 'storage', 'report', 'config', 'approval', 'evidence', 'metrology', 'physics', 'errors'],
  main: ['compose', 'config'],
  cli: ['compose', 'config', 'demo', 'report', 'approval', 'evidence'],
  errors: [],
};

/** Libraries by the rooms that may see them; a room that is not listed imports no library. */
const LIBRARIES: Record<string, RegExp> = {
  metrology: /^@stdlib\/stats-/,
  approval: /^(canonicalize|node:crypto)$/,
  storage: /^(kysely|kysely\/migration|pg|node:.*)$/,
  http: /^(fastify|fastify-type-provider-zod|@fastify\/.*|zod|prom-client|csv-parse(\/sync)?|node:.*)$/,
  workers: /^(piscina|node:.*)$/,
  config: /^zod$/,
  compose: /^(fastify|pino|piscina|node:.*)$/,
  main: /^close-with-grace$/,
  cli: /^node:.*$/,
  report: /^echarts\/(core|charts|components|renderers)$/,
};

const files = readdirSync(SRC, { recursive: true, encoding: 'utf8' }).filter((file) => file.endsWith('.ts'));
const roomOf = (file: string) => (file.includes('/') ? file.slice(0, file.indexOf('/')) : file.replace('.ts', ''));
const IMPORT =
  /(?:import|export)\s[^;'"]*?from\s+['"]([^'"]+)['"]|import\(\s*['"]([^'"]+)['"]\s*\)|^import\s+['"]([^'"]+)['"]/gm;
const importsOf = (text: string) => [...text.matchAll(IMPORT)].map((match) => (match[1] ?? match[2] ?? match[3])!);

describe('the direction of imports', () => {
  it('finds the rooms', () => {
    expect(files.length).toBeGreaterThan(40);
    expect(files.map(roomOf).filter((room) => !(room in ARROWS))).toEqual([]);
  });

  it('reads imports in each of their forms', () => {
    const forms =
      "import a from 'x';\nimport {\n  b,\n} from 'y';\nexport * from 'z';\nconst c = import('w');\nimport 'v';\n";
    expect(importsOf(forms).sort()).toEqual(['v', 'w', 'x', 'y', 'z']);
  });

  it.each(files)('%s imports along the arrows alone', (file) => {
    const room = roomOf(file);
    const offending = importsOf(readFileSync(SRC + file, 'utf8')).filter((specifier) => {
      if (!specifier.startsWith('.')) return !LIBRARIES[room]?.test(specifier);
      const target = relative(SRC, resolve(dirname(SRC + file), specifier));
      return (
        roomOf(target) !== room &&
        !ARROWS[room]!.some((arrow) => arrow === target || target.startsWith(`${arrow}/`) || arrow === roomOf(target))
      );
    });
    expect(offending).toEqual([]);
  });
});
