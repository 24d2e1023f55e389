import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { useService } from '../support/service.ts';

const api = useService();

/** A step of `source_V` into a linear inductance: i = V/R (1 − exp(−t R/L)) from the onset on, exact. */
function pulseOf({ inductance_H = 0.01, resistance_ohm = 0.5, source_V = 12, samples = 400, offset_V = 0 } = {}) {
  const step = 2e-5;
  const quiet = 40;
  const time_s = Array.from({ length: samples }, (_, k) => k * step);
  const current = (t: number) =>
    t <= 0 ? 0 : (source_V / resistance_ohm) * -Math.expm1((-t * resistance_ohm) / inductance_H);
  return {
    time_s,
    voltage_V: time_s.map((_, k) => (k < quiet ? 0 : source_V) + offset_V),
    current_A: time_s.map((t) => current(t - quiet * step)),
    resistance_ohm,
  };
}

describe('pulse analysis over HTTP', () => {
  it('finds inductance, offset and the energies of a linear inductor', async () => {
    const pulse = pulseOf({ offset_V: 0.05 });
    const { body } = await request(api.server).post('/v1/pulse-analysis').send(pulse).expect(200);
    expect(body.voltageOffset_V).toBeCloseTo(0.05, 6);
    const peak = pulse.current_A.at(-1)!;
    for (const value of body.sweep.differentialInductance_H) expect(Math.abs(value / 0.01 - 1)).toBeLessThan(0.01);
    expect(Math.abs(body.energy.stored_J / (0.005 * peak ** 2) - 1)).toBeLessThan(0.01);
    expect(body.energy.delivered_J).toBeGreaterThan(body.energy.stored_J);
    expect(body.cautions[0].code).toBe('stored-energy');
  });

  it('takes 100,000 samples in one request', async () => {
    const { status } = await request(api.server)
      .post('/v1/pulse-analysis')
      .send(pulseOf({ samples: 100_000, inductance_H: 10 }));
    expect(status).toBe(200);
  });

  it('names the array that does not fit', async () => {
    const pulse = pulseOf();
    const { body, status } = await request(api.server)
      .post('/v1/pulse-analysis')
      .send({ ...pulse, voltage_V: pulse.voltage_V.slice(1) });
    expect([status, body.errors[0].pointer]).toEqual([422, '/voltage_V']);
  });

  it('judges a unit by its pulse, as sure as the rig’s voltage', async () => {
    const drawing = { inductance: { nominal_H: 0.01, lower_H: 0.009, upper_H: 0.011 } };
    await request(api.server)
      .put('/v1/rigs/pulser')
      .send({ instrument: { voltage: { relative: 0.01 } }, calibrationDue: '2027-01-01' });
    await request(api.server).put('/v1/parts/LG-P/revisions/A').send({ drawing });
    await request(api.server)
      .put('/v1/lots/P-1')
      .send({ part: { number: 'LG-P', revision: 'A' } });
    const unit = { serial: 'P-1', measuredAt: '2026-05-01T10:00:00Z', rig: 'pulser', pulse: pulseOf() };
    const first = await request(api.server).post('/v1/lots/P-1/units').send(unit);
    expect([first.status, first.body.outcome]).toEqual([201, 'pass']);
    const [{ observed }] = first.body.quantities;
    expect(Math.abs(observed.value / 0.01 - 1)).toBeLessThan(0.01);
    expect(observed.standardUncertainty / 1e-4).toBeGreaterThan(0.98);
    expect((await request(api.server).post('/v1/lots/P-1/units').send(unit)).body.status).toBe('repeated');
    const page = await request(api.server).get('/v1/lots/P-1/units').expect(200);
    expect(page.body.units[0].unit).toMatchObject({ fromPulse: true, sweep: { kind: 'differential' } });
    const approval = await request(api.server)
      .post('/v1/approvals')
      .send({ part: { number: 'LG-P', revision: 'A' }, duty: { peakCurrent_A: 1 }, evidence: { units: [unit] } });
    expect([approval.status, approval.body.verdict]).toEqual([201, 'approve']);
  });
});
