import { execFile, spawn, spawnSync } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Environment } from '../src/config/index.ts';

const ROOT = new URL('..', import.meta.url).pathname;
const read = (file: string) => readFileSync(ROOT + file, 'utf8');
const README = read('README.md');
const DEVELOPERS = read('DEVELOPERS.md');
const scripts = (JSON.parse(read('package.json')) as { scripts: Record<string, string> }).scripts;
const openapi = JSON.parse(read('openapi/openapi.json')) as {
  paths: Record<string, Record<string, { summary: string }>>;
};

describe('the documents', () => {
  it('README lists every operation that is published, with its summary', () => {
    const published = Object.entries(openapi.paths).flatMap(([path, methods]) =>
      Object.entries(methods).map(([method, { summary }]) => `| \`${method.toUpperCase()} ${path}\` | ${summary} |`),
    );
    const listed = README.split('\n').filter((line) => /^\| `(GET|PUT|POST|DELETE) /.test(line));
    expect(listed).toEqual(published);
  });

  it('README lists every variable of the environment, its default and what it is', () => {
    const rows = Object.entries(Environment.shape).map(([name, field]) => {
      const given = Environment.parse({})[name as keyof typeof Environment.shape];
      return `| \`${name}\` | ${given === undefined ? '' : `\`${given}\` `}| ${field.description} |`;
    });
    const listed = README.split('\n').filter((line) => /^\| `[A-Z_]+` /.test(line));
    expect(listed).toEqual(rows);
  });

  it.each([
    ['README.md', README],
    ['DEVELOPERS.md', DEVELOPERS],
  ])('%s names no file and no npm script that is not there', (_name, text) => {
    const files = [...text.matchAll(/`((?:src|test|openapi|\.ci)\/[\w./-]*)`/g)].map(([, file]) => file!);
    expect(files.filter((file) => !existsSync(ROOT + file))).toEqual([]);
    const commands = [...text.matchAll(/(?:`| {4})npm (?:run )?(\w+)/g)].map(([, name]) => name!);
    expect(commands.length).toBeGreaterThan(2);
    expect(commands.filter((name) => !(name in scripts))).toEqual([]);
  });
});

describe('what the README shows, copied from it', () => {
  const run = promisify(execFile);
  const blocks = (language: string) =>
    [...README.matchAll(new RegExp(`\`\`\`${language}\\n([\\s\\S]*?)\`\`\``, 'g'))].map(([, code]) => code!);
  let folder: string;
  let base: string;
  let child: ReturnType<typeof spawn>;
  beforeAll(async () => {
    folder = mkdtempSync(join(tmpdir(), 'coilproof-readme-'));
    child = spawn(process.execPath, ['src/main.ts'], {
      cwd: ROOT,
      env: { ...process.env, PORT: '0', DATA_DIR: folder, LOG_LEVEL: 'info' },
      stdio: ['ignore', 'pipe', 'inherit'],
    });
    let log = '';
    while (!/listening at/i.test(log)) log += String((await once(child.stdout!, 'data'))[0]);
    child.stdout!.resume();
    base = /127\.0\.0\.1:\d+/.exec(log)![0];
  });
  afterAll(async () => {
    child.kill('SIGTERM');
    await once(child, 'exit');
    rmSync(folder, { recursive: true });
  });
  const shell = async (code: string) =>
    (await run('bash', ['-c', code.replaceAll('127.0.0.1:8080', base)], { cwd: folder })).stdout;

  it('the first request is answered as it says', async () => {
    const answer = JSON.parse(await shell(blocks('sh')[0]!));
    const shown = JSON.parse(blocks('json')[0]!);
    expect(answer.verdict).toBe(shown.verdict);
    expect(answer.reasons).toEqual(shown.reasons);
    const energy = answer.checks.find(({ check }: { check: string }) => check === 'stored-energy');
    expect(energy.detail).toBe(shown.checks[0].detail);
    expect(answer.cautions.map(({ code }: { code: string }) => code)).toEqual(
      shown.cautions.map(({ code }: { code: string }) => code),
    );
  });

  const hasPython = spawnSync('python3', ['--version']).status === 0;
  it.runIf(hasPython)('a rig registers and posts, from the shell and from Python, and again without harm', async () => {
    await shell(blocks('sh')[1]!);
    writeFileSync(join(folder, 'rig.py'), blocks('python')[0]!.replaceAll('127.0.0.1:8080', base));
    const posted = await shell('python3 rig.py; python3 rig.py');
    expect(posted.match(/^pass /gm)).toHaveLength(2);
    const bulk = await shell(blocks('sh')[2]!);
    expect(bulk).toContain('"status":"recorded"');
    expect(bulk).toContain('"lot":"2026-117"');
    expect(readFileSync(join(folder, 'histogram.svg'), 'utf8')).toMatch(/^<svg/);
    const lot = await (await fetch(`http://${base}/v1/lots/2026-117`)).json();
    expect(lot).toMatchObject({ counts: { pass: 2 } });
  });
});
