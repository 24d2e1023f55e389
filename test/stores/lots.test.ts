import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { testService } from '../support/service.ts';
import { STORES, type StorePlace } from '../support/stores.ts';

const drawing = {
  inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 },
  saturation: { current_A: 4, inductanceDrop: 0.3, temperature_degC: 25 },
};
const rig = { instrument: { inductance: { relative: 0.001 } }, calibrationDue: '2026-12-31' };
const CURRENTS = [0, 2, 4, 6, 8];
const VALUES = [0.97, 0.98, 0.99, 1, 1.01, 1.02, 1.03].map((factor) => factor * 1e-3);

/** Seven values on each of two days, by two rigs of which the second reads 2 % high. */
const units = ['2026-03-01', '2026-03-02'].flatMap((day) =>
  ['bench-a', 'bench-b'].flatMap((bench) =>
    VALUES.map((value, k) => {
      const l0 = bench === 'bench-b' ? value * 1.02 : value;
      return {
        serial: `${day} ${bench} ${k}`,
        measuredAt: `${day}T08:0${k}:00Z`,
        rig: bench,
        sweep: {
          kind: 'differential',
          current_A: CURRENTS,
          inductance_H: CURRENTS.map((i) => l0 * (1 - i / (20 + k / 5))),
        },
      };
    }),
  ),
);
const inductances = units.map(({ sweep }) => sweep.inductance_H[0]!);
const mean = inductances.reduce((sum, value) => sum + value, 0) / inductances.length;
const deviation = Math.sqrt(
  inductances.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (inductances.length - 1),
);

describe.each(STORES)('a lot on $engine', ({ make }) => {
  let place: StorePlace;
  let service: Awaited<ReturnType<typeof testService>>;
  const api = () => request(service.app.server);
  beforeAll(async () => {
    place = await make();
    service = await testService(place.environment);
    await api().put('/v1/rigs/bench-a').send(rig);
    await api().put('/v1/rigs/bench-b').send(rig);
    await api().put('/v1/parts/LG-9/revisions/A').send({ drawing });
    await api()
      .put('/v1/lots/L-1')
      .send({ part: { number: 'LG-9', revision: 'A' }, size: 100 });
    await api()
      .put('/v1/lots/L-0')
      .send({ part: { number: 'LG-9', revision: 'A' } });
    const body = units.map((unit) => JSON.stringify(unit)).join('\n');
    await api().post('/v1/lots/L-1/units').set('content-type', 'application/x-ndjson').send(body).expect(200);
  });
  afterAll(async () => {
    await service.dispose();
    await place.remove();
  });

  it('has the statistics of its units, each quantity', async () => {
    const { body } = await api().get('/v1/lots/L-1/statistics').expect(200);
    expect(body.counts).toEqual({ pass: 28, inconclusive: 0, fail: 0, outOfCalibration: 0 });
    const inductance = body.quantities.find(({ quantity }: { quantity: string }) => quantity === 'inductance');
    expect(inductance.n).toBe(28);
    expect(inductance.mean).toBeCloseTo(mean, 15);
    expect(inductance.standardDeviation / deviation).toBeCloseTo(1, 12);
    expect([inductance.minimum, inductance.maximum]).toEqual([Math.min(...inductances), Math.max(...inductances)]);
    const cpk = Math.min(mean - 9e-4, 1.1e-3 - mean) / (3 * deviation);
    expect(inductance.capability.cpk.value).toBeCloseTo(cpk, 12);
    expect(inductance.capability.cpk.interval.lower).toBeLessThan(cpk);
    expect(inductance.histogram.counts.reduce((sum: number, count: number) => sum + count, 0)).toBe(28);
    const energy = body.quantities.find(({ quantity }: { quantity: string }) => quantity === 'energy');
    expect(energy).not.toHaveProperty('capability');
    expect(energy.n).toBe(28);
  });

  it('answers for a lot without units, and says what is absent', async () => {
    const { body } = await api().get('/v1/lots/L-0/statistics').expect(200);
    expect(body.quantities[0]).toMatchObject({ n: 0, quantiles: [] });
    expect(body.quantities[0].notes.length).toBeGreaterThan(0);
  });

  it('shows by analysis of variance that the rigs disagree and the days do not', async () => {
    const [byRig, byDay, byLot] = await Promise.all(
      ['rig', 'day', 'lot'].map((by) => api().get('/v1/parts/LG-9/revisions/A/trend').query({ by }).expect(200)),
    );
    const inductanceOf = ({ body }: request.Response) =>
      body.quantities.find(({ quantity }: { quantity: string }) => quantity === 'inductance');
    expect(inductanceOf(byRig!).groups.map(({ group, n }: { group: string; n: number }) => [group, n])).toEqual([
      ['bench-a', 14],
      ['bench-b', 14],
    ]);
    expect(inductanceOf(byRig!).analysisOfVariance.differ).toBe(true);
    expect(inductanceOf(byDay!).analysisOfVariance.differ).toBe(false);
    expect(byLot!.body.lots).toEqual(['L-0', 'L-1']);
    expect(inductanceOf(byLot!).groups).toHaveLength(1);
  });

  it('is evidence for an approval, by its capability and its rigs’ calibration', async () => {
    const { body } = await api()
      .post('/v1/approvals')
      .send({
        part: { number: 'LG-9', revision: 'A' },
        duty: { peakCurrent_A: 3, evidence: { minimumUnits: 28, minimumCpk: 0.5 } },
        evidence: { lots: ['L-1'] },
      })
      .expect(201);
    expect(body.checks.map(({ check, outcome }: { check: string; outcome: string }) => [check, outcome])).toEqual([
      ['lot-capability', 'pass'],
      ['calibration', 'pass'],
    ]);
    expect(body.verdict).toBe('approve');
    expect(body.evidence.lotSummaries[0].counts.pass).toBe(28);
    const wrong = await api()
      .post('/v1/approvals')
      .send({
        part: { number: 'LG-8', revision: 'A', drawing },
        duty: { peakCurrent_A: 3 },
        evidence: { lots: ['L-1'] },
      });
    expect([wrong.status, wrong.body.errors[0].pointer]).toEqual([422, '/evidence/lots/0']);
  });

  it.each([
    ['histogram.svg', ''],
    ['histogram.svg', '?quantity=saturation-current'],
    ['trend.svg', '?by=rig'],
    ['fan.svg', ''],
    ['unit.svg', `?serial=${encodeURIComponent(units[0]!.serial)}`],
  ])('is drawn as %s%s', async (name, query) => {
    const answer = await api().get(`/v1/lots/L-1/figures/${name}${query}`).expect(200);
    expect(answer.headers['content-type']).toMatch(/^image\/svg\+xml/);
    expect(answer.body.toString()).toMatch(/^<svg[\s\S]*<\/svg>\s*$/);
    expect(answer.body.toString()).not.toMatch(/NaN|undefined/);
    await api()
      .get(`/v1/lots/L-0/figures/${name === 'unit.svg' ? 'fan.svg' : name}`)
      .expect(200);
  });

  it('names what a figure lacks', async () => {
    await api().get('/v1/lots/L-1/figures/unit.svg').expect(400);
    await api().get('/v1/lots/L-1/figures/unit.svg?serial=nobody').expect(404);
    await api().get('/v1/lots/L-1/figures/pie.svg').expect(400);
  });
});
