import { spawn } from 'node:child_process';
import { once } from 'node:events';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { testService } from '../support/service.ts';
import { STORES, type StorePlace } from '../support/stores.ts';

const drawing = {
  inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 },
  saturation: { current_A: 4, inductanceDrop: 0.3, temperature_degC: 25 },
};
const rig = {
  instrument: { inductance: { relative: 0.002 }, current: { relative: 0.001 } },
  calibrationDue: '2026-12-31',
};
/** Falls along L0·(1 − i/20 A): drops by 30 % at 6 A. */
const unit = (serial: string, l0 = 1e-3, over: object = {}) => ({
  serial,
  measuredAt: '2026-03-01T08:00:00Z',
  rig: 'bench',
  sweep: {
    kind: 'differential',
    current_A: [0, 2, 4, 6, 8],
    inductance_H: [0, 2, 4, 6, 8].map((i) => l0 * (1 - i / 20)),
  },
  ...over,
});

async function register(api: () => ReturnType<typeof request>, lot: string): Promise<void> {
  await api().put('/v1/rigs/bench').send(rig);
  await api().put('/v1/parts/LG-9/revisions/A').send({ drawing });
  await api()
    .put(`/v1/lots/${lot}`)
    .send({ part: { number: 'LG-9', revision: 'A' } });
}

const lines = (text: string) =>
  text
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));

function asText(response: NodeJS.ReadableStream, done: (error: Error | null, body: string) => void): void {
  let text = '';
  response.setEncoding('utf8');
  response.on('data', (chunk: string) => {
    text += chunk;
  });
  response.on('end', () => done(null, text));
}

describe.each(STORES)('units of a lot on $engine', ({ make }) => {
  let place: StorePlace;
  let service: Awaited<ReturnType<typeof testService>>;
  const api = () => request(service.app.server);
  const postText = (lot: string, type: string, body: string) =>
    api()
      .post(`/v1/lots/${lot}/units`)
      .set('content-type', type)
      .buffer()
      .parse(asText as never)
      .send(body);
  beforeAll(async () => {
    place = await make();
    service = await testService(place.environment);
    await register(api, 'L-1');
  });
  afterAll(async () => {
    await service.dispose();
    await place.remove();
  });

  it('judges a unit at once, each quantity with the rig’s uncertainty', async () => {
    const { body, status } = await api().post('/v1/lots/L-1/units').send(unit('U-1'));
    expect([status, body.status, body.outcome]).toEqual([201, 'recorded', 'pass']);
    const [inductance, saturation, energy] = body.quantities;
    expect(inductance).toMatchObject({ quantity: 'inductance', outcome: 'pass', observed: { value: 1e-3 } });
    // The gain's 0.2 % of 1 mH; the current's gain moves nothing at zero current.
    expect(inductance.observed.standardUncertainty).toBeGreaterThan(1.99e-6);
    expect(saturation.observed.value).toBeCloseTo(6, 6);
    // ∫ i L0 (1 − i/20) di up to 4 A
    expect(energy.observed.value).toBeCloseTo(1e-3 * (8 - 64 / 60), 9);
    expect(energy).not.toHaveProperty('outcome');
  });

  it('answers a repeat as before, and refuses another content under the same key', async () => {
    const first = await api().post('/v1/lots/L-1/units').send(unit('U-1'));
    expect([first.status, first.body.status]).toEqual([200, 'repeated']);
    const other = await api().post('/v1/lots/L-1/units').send(unit('U-1', 1.01e-3));
    expect([other.status, other.body.type]).toEqual([409, 'urn:coilproof:problem:conflict']);
    const later = unit('U-1', 1e-3, { measuredAt: '2026-03-01T09:00:00Z' });
    expect((await api().post('/v1/lots/L-1/units').send(later)).status).toBe(201);
  });

  it('answers NDJSON line by line, in order, a bad line as a problem on that line', async () => {
    const body = [
      JSON.stringify(unit('N-1')),
      '{"serial": ',
      JSON.stringify({ ...unit('N-2'), sped: 1 }),
      JSON.stringify(unit('N-3', 2e-3)),
      JSON.stringify(unit('N-1')),
      JSON.stringify(unit('N-4', 1e-3, { rig: 'nobody' })),
      JSON.stringify(unit('N-5', 1e-3, { sweep: { kind: 'differential', current_A: [0, 0], inductance_H: [1, 1] } })),
    ].join('\n');
    const answer = await postText('L-1', 'application/x-ndjson', body);
    expect(answer.status).toBe(200);
    const answers = lines(answer.body);
    expect(answers.map(({ line, status, outcome }) => [line, status, outcome])).toEqual([
      [1, 'recorded', 'pass'],
      [2, 'refused', undefined],
      [3, 'refused', undefined],
      [4, 'recorded', 'fail'],
      [5, 'repeated', 'pass'],
      [6, 'refused', undefined],
      [7, 'refused', undefined],
    ]);
    expect(answers[1].problem.status).toBe(400);
    expect(answers[2].problem.errors).toEqual([{ pointer: '/sped', detail: 'unknown field' }]);
    expect(answers[5].problem.errors[0].pointer).toBe('/rig');
    expect(answers[6].problem.errors[0].pointer).toMatch(/^\/sweep\/current_A/);
  });

  it('reads a spreadsheet’s CSV, and refuses one whose header it cannot read', async () => {
    const csv =
      '\uFEFFserial;measured at;rig;current [A];inductance [µH]\r\nC-1;2026-03-02T08:00:00Z;bench;0;1000,0\r\nC-1;2026-03-02T08:00:00Z;bench;8;600,0\r\n';
    const answer = await postText('L-1', 'text/csv', csv);
    expect(lines(answer.body)).toMatchObject([{ line: 2, status: 'recorded', serial: 'C-1', outcome: 'pass' }]);
    const bad = await postText('L-1', 'text/csv', 'serial;current\r\n');
    expect(bad.status).toBeGreaterThanOrEqual(400);
    expect(bad.status).toBeLessThan(500);
    expect(bad.headers['content-type']).toMatch(/problem\+json/);
  });

  it('is inconclusive where the sweep ends before the current it must prove', async () => {
    const sweep = { kind: 'differential', current_A: [0, 3], inductance_H: [1e-3, 1e-3] };
    const { body } = await api()
      .post('/v1/lots/L-1/units')
      .send(unit('S-1', 1e-3, { sweep }));
    expect(body.outcome).toBe('inconclusive');
    expect(body.quantities[1].detail).toMatch(/at least 3 A/);
  });

  it('404 for a lot that is not registered', async () => {
    await api().post('/v1/lots/nobody/units').send(unit('X')).expect(404);
  });

  it('counts each unit once however often and however concurrently it is posted', async () => {
    await register(api, 'L-2');
    const serials = Array.from({ length: 40 }, (_, k) => `P-${k}`);
    const posts = [...serials, ...serials, ...serials].map((serial) =>
      api().post('/v1/lots/L-2/units').send(unit(serial)),
    );
    const answers = await Promise.all(posts);
    expect(answers.every(({ status }) => status === 200 || status === 201)).toBe(true);
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(40);
    const { body } = await api().get('/v1/lots/L-2').expect(200);
    expect(body.counts).toEqual({ pass: 40, inconclusive: 0, fail: 0, outOfCalibration: 0 });
  });

  it('pages through what was recorded', async () => {
    const seen: string[] = [];
    let after: string | null = '';
    while (after !== null) {
      const page: request.Response = await api()
        .get('/v1/lots/L-2/units')
        .query({ limit: 15, ...(after && { after }) })
        .expect(200);
      seen.push(...page.body.units.map((entry: { unit: { serial: string } }) => entry.unit.serial));
      after = page.body.after;
    }
    expect([new Set(seen).size, seen.length]).toEqual([40, 40]);
    const failed = await api().get('/v1/lots/L-1/units').query({ outcome: 'fail' });
    expect(failed.body.units.map((entry: { unit: { serial: string } }) => entry.unit.serial)).toEqual(['N-3']);
  });

  it('tells of units as they are recorded, from the last that the caller had', async () => {
    await register(api, 'L-3');
    await api().post('/v1/lots/L-3/units').send(unit('E-1'));
    await service.app.listen({ port: 0, host: '127.0.0.1' });
    const address = service.app.server.address() as { port: number };
    const events = await fetch(`http://127.0.0.1:${address.port}/v1/lots/L-3/events`, {
      headers: { 'last-event-id': '0' },
    });
    expect(events.headers.get('content-type')).toContain('text/event-stream');
    const second = new Promise((resolve) => setTimeout(resolve, 100)).then(() =>
      api().post('/v1/lots/L-3/units').send(unit('E-2', 2e-3)),
    );
    let text = '';
    for await (const chunk of events.body!) {
      text += new TextDecoder().decode(chunk);
      if (text.includes('E-2')) break;
    }
    await second;
    const told = [...text.matchAll(/id: (\d+)\nevent: unit\ndata: (.*)\n\n/g)].map(([, id, data]) => ({
      id: Number(id),
      ...JSON.parse(data!),
    }));
    expect(told.map(({ serial, outcome }) => [serial, outcome])).toEqual([
      ['E-1', 'pass'],
      ['E-2', 'fail'],
    ]);
    expect(told[1].id).toBeGreaterThan(told[0].id);
  });
});

describe.each(STORES)('kill -9 on $engine', ({ make }) => {
  it('leaves every acknowledged unit in the store, once', async () => {
    const place = await make();
    const start = async () => {
      const child = spawn(process.execPath, ['src/main.ts'], {
        env: { ...process.env, ...place.environment, PORT: '0', LOG_LEVEL: 'info' },
        stdio: ['ignore', 'pipe', 'inherit'],
      });
      let log = '';
      child.stdout.setEncoding('utf8');
      while (!/listening at/i.test(log)) log += (await once(child.stdout, 'data'))[0];
      child.stdout.resume();
      return { child, base: /http:\/\/127\.0\.0\.1:\d+/.exec(log)![0] };
    };
    const send = (base: string, method: string, path: string, body: object) =>
      fetch(base + path, { method, headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) });
    let { child, base } = await start();
    await send(base, 'PUT', '/v1/rigs/bench', rig);
    await send(base, 'PUT', '/v1/parts/LG-9/revisions/A', { drawing });
    await send(base, 'PUT', '/v1/lots/K-1', { part: { number: 'LG-9', revision: 'A' } });
    const acknowledged = new Set<string>();
    const serials = Array.from({ length: 60 }, (_, k) => `K-${k}`);
    // The kill comes between two acknowledgements, whatever the machine's speed: after the twentieth.
    const posting = serials.map(async (serial) => {
      const answer = await send(base, 'POST', '/v1/lots/K-1/units', unit(serial)).catch(() => undefined);
      if (!answer?.ok) return;
      acknowledged.add(serial);
      if (acknowledged.size === 20) child.kill('SIGKILL');
    });
    await Promise.all(posting);
    if (child.exitCode === null && child.signalCode === null) await once(child, 'exit');
    ({ child, base } = await start());
    const found = (await (await fetch(`${base}/v1/lots/K-1/units?limit=200`)).json()) as {
      units: { unit: { serial: string } }[];
    };
    const stored = found.units.map((entry) => entry.unit.serial);
    expect(acknowledged.size).toBeGreaterThanOrEqual(20);
    expect([...acknowledged].filter((serial) => !stored.includes(serial))).toEqual([]);
    const again = await Promise.all(serials.map((serial) => send(base, 'POST', '/v1/lots/K-1/units', unit(serial))));
    expect(again.filter(({ status }) => status === 200)).toHaveLength(stored.length);
    expect(again.filter(({ status }) => status === 201)).toHaveLength(60 - stored.length);
    const { counts } = (await (await fetch(`${base}/v1/lots/K-1`)).json()) as { counts: object };
    expect(counts).toEqual({ pass: 60, inconclusive: 0, fail: 0, outOfCalibration: 0 });
    child.kill('SIGTERM');
    await once(child, 'exit');
    await place.remove();
  });
});
