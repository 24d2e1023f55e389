/**
 * A rig's afternoon: 20 rigs post 10,000 units of one lot, one by one, over a network that loses requests and answers at random,
 * while the service is killed twice with SIGKILL. It ends with exactly the units that were measured, each once, and the lot approved
 * or not by its numbers. Prints what happened; exits 1 where anything is lost or counted twice.
 *
 *     node test/acceptance/rig-afternoon.ts [units]
 */
import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as delay } from 'node:timers/promises';

const RIGS = 20;
const UNITS = Number(process.argv[2] ?? 10_000);
const LOST = 0.03;
const LOT = '/v1/lots/afternoon';

/** A repeatable source of chance (Park and Miller's minimal standard). */
let state = 20260302;
const chance = () => {
  state = (state * 48271) % 2147483647;
  return state / 2147483647;
};
const normal = () => Math.sqrt(-2 * Math.log(chance())) * Math.cos(2 * Math.PI * chance());

const folder = mkdtempSync(join(tmpdir(), 'coilproof-afternoon-'));
const port = await freePort();
const base = `http://127.0.0.1:${port}`;
let service = await start();
let kills = 0;

const drawing = {
  inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 },
  saturation: { current_A: 4, inductanceDrop: 0.3, temperature_degC: 25 },
};
await call('PUT', '/v1/parts/LG-RC-330/revisions/B', { drawing });
await call('PUT', LOT, { part: { number: 'LG-RC-330', revision: 'B' }, size: UNITS });
for (let rig = 0; rig < RIGS; rig++) {
  await call('PUT', `/v1/rigs/bench-${rig}`, {
    instrument: { inductance: { relative: 0.003 }, current: { relative: 0.001 } },
    calibrationDue: '2027-12-31',
  });
}

const measured = Array.from({ length: UNITS }, (_, k) => unitOf(k));
const started = Date.now();
let acknowledged = 0;
let attempts = 0;
await Promise.all(Array.from({ length: RIGS }, (_, rig) => work(rig)));
const seconds = (Date.now() - started) / 1000;

const stored = await everyUnit();
const serials = new Set(stored);
const missing = measured.filter(({ serial }) => !serials.has(serial)).length;
const { counts } = (await call('GET', LOT)) as { counts: Record<string, number> };
const counted = counts.pass! + counts.inconclusive! + counts.fail!;
const { quantities } = (await call('GET', `${LOT}/statistics`)) as {
  quantities: { quantity: string; n: number; mean: number; capability?: { cpk: { value: number } } }[];
};
const approval = (await call('POST', '/v1/approvals', {
  part: { number: 'LG-RC-330', revision: 'B' },
  duty: { peakCurrent_A: 4, evidence: { minimumUnits: UNITS } },
  evidence: { lots: ['afternoon'] },
})) as { verdict: string; reasons: string[] };

console.log(`${UNITS} units from ${RIGS} rigs in ${seconds.toFixed(0)} s, ${attempts} attempts, ${kills} kills`);
console.log(
  `stored ${stored.length}, different ${serials.size}, missing ${missing}, counted ${counted}: ${JSON.stringify(counts)}`,
);
for (const { quantity, n, mean, capability } of quantities) {
  console.log(
    `  ${quantity}: n ${n}, mean ${mean.toPrecision(6)}${capability ? `, Cpk ${capability.cpk.value.toFixed(2)}` : ''}`,
  );
}
console.log(`the lot: ${approval.verdict}. ${approval.reasons.join(' ')}`);
service.kill('SIGTERM');
await once(service, 'exit');
rmSync(folder, { recursive: true });
const exact = stored.length === UNITS && serials.size === UNITS && missing === 0 && counted === UNITS && kills === 2;
const rolledUp = quantities.every(({ n }) => n === UNITS);
if (!exact || !rolledUp) throw new Error('the afternoon did not end with each unit once');

function unitOf(k: number) {
  const inductance = 1e-3 * (1 + 0.015 * normal());
  const slope = 20 * (1 + 0.02 * normal());
  const currents = [0, 2, 4, 6, 8];
  return {
    serial: `A-${String(k).padStart(5, '0')}`,
    measuredAt: new Date(Date.UTC(2026, 2, 2, 12) + k * 1000).toISOString(),
    rig: `bench-${k % RIGS}`,
    sweep: {
      kind: 'differential',
      current_A: currents,
      inductance_H: currents.map((i) => inductance * (1 - i / slope)),
    },
  };
}

async function work(rig: number): Promise<void> {
  for (let k = rig; k < UNITS; k += RIGS) {
    while (!(await post(measured[k]!))) await delay(20 + 80 * chance());
    acknowledged += 1;
    if (kills < 2 && acknowledged >= (UNITS * (kills + 1)) / 3) await kill();
  }
}

/** One attempt; false where the request or its answer was lost, as the rig sees it. */
async function post(unit: object): Promise<boolean> {
  attempts += 1;
  const cut = new AbortController();
  const fate = chance();
  // Half of the losses cut the connection while the request is under way; the others lose the answer after it was made.
  const timer = fate < LOST / 2 ? setTimeout(() => cut.abort(), 3 * chance()) : undefined;
  try {
    const answer = await fetch(`${base}${LOT}/units`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify(unit),
      signal: cut.signal,
    });
    await answer.arrayBuffer();
    if (answer.status !== 200 && answer.status !== 201 && answer.status !== 503)
      throw new Error(`answered ${answer.status}`);
    return answer.status < 300 && !(fate > 1 - LOST / 2);
  } catch (error) {
    if (error instanceof Error && error.message.startsWith('answered')) throw error;
    return false;
  } finally {
    clearTimeout(timer);
  }
}

async function kill(): Promise<void> {
  kills += 1;
  const dying = service;
  dying.kill('SIGKILL');
  if (dying.exitCode === null && dying.signalCode === null) await once(dying, 'exit');
  service = await start();
}

async function start(): Promise<ChildProcess> {
  const child = spawn(process.execPath, ['src/main.ts'], {
    cwd: new URL('../..', import.meta.url).pathname,
    env: { ...process.env, PORT: String(port), DATA_DIR: folder, LOG_LEVEL: 'error' },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  for (;;) {
    const ready = await fetch(`${base}/readyz`).catch(() => undefined);
    if (ready?.ok) return child;
    if (child.exitCode !== null) throw new Error('the service did not start');
    await delay(50);
  }
}

async function call(method: string, path: string, body?: object): Promise<unknown> {
  const answer = await fetch(base + path, {
    method,
    ...(body && { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }),
  });
  if (!answer.ok) throw new Error(`${method} ${path}: ${answer.status} ${await answer.text()}`);
  return answer.json();
}

async function everyUnit(): Promise<string[]> {
  const found: string[] = [];
  let after: string | null = '';
  while (after !== null) {
    const page = (await call('GET', `${LOT}/units?limit=200${after && `&after=${after}`}`)) as {
      units: { unit: { serial: string } }[];
      after: string | null;
    };
    found.push(...page.units.map(({ unit }) => unit.serial));
    after = page.after;
  }
  return found;
}

function freePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.listen(0, '127.0.0.1', () => {
      const { port: free } = probe.address() as { port: number };
      probe.close(() => resolve(free));
    });
  });
}
