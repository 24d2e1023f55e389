import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { isIntact } from '../../src/approval/record.ts';
import { testService } from '../support/service.ts';
import { STORES } from '../support/stores.ts';

const drawing = { inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 } };
const unit = (serial: string) => ({
  serial,
  measuredAt: '2026-03-01T08:00:00Z',
  instrument: { inductance: { relative: 0.002 } },
  sweep: { kind: 'differential', current_A: [0, 5], inductance_H: [1e-3, 9.9e-4] },
});

describe.each(STORES.filter(({ engine }) => engine === 'PostgreSQL'))('two services on one $engine', ({ make }) => {
  it('share all state: what one records the other reads, counts once and chains on', async () => {
    const place = await make();
    const services = await Promise.all([testService(place.environment), testService(place.environment)]);
    const [one, other] = services.map(({ app }) => request(app.server));
    await one!.put('/v1/parts/LG-1/revisions/A').send({ drawing }).expect(201);
    await other!
      .put('/v1/lots/L-1')
      .send({ part: { number: 'LG-1', revision: 'A' } })
      .expect(201);
    const serials = Array.from({ length: 30 }, (_, k) => `S-${k}`);
    const answers = await Promise.all(
      serials.flatMap((serial) => [one!, other!].map((api) => api.post('/v1/lots/L-1/units').send(unit(serial)))),
    );
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(30);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(30);
    const [first, second] = await Promise.all([one!, other!].map((api) => api.get('/v1/lots/L-1/statistics')));
    expect(first!.body).toEqual(second!.body);
    expect(first!.body.quantities[0].n).toBe(30);
    const approvals = await Promise.all(
      Array.from({ length: 10 }, (_, k) =>
        (k % 2 ? one! : other!).post('/v1/approvals').send({
          part: { number: 'LG-1', revision: 'A' },
          duty: { peakCurrent_A: 1 },
          evidence: { units: [unit(`A-${k}`)] },
        }),
      ),
    );
    expect(approvals.map(({ status }) => status)).toEqual(Array(10).fill(201));
    const { body } = await other!.get('/v1/approvals').query({ limit: 50 }).expect(200);
    for (const [index, { digests }] of body.approvals.entries()) {
      expect(digests.previous).toBe(index === 0 ? null : body.approvals[index - 1].digests.record);
    }
    const whole = await one!.get(`/v1/approvals/${body.approvals[3].id}`).expect(200);
    expect(isIntact(whole.body)).toBe(true);
    await Promise.all(services.map((service) => service.dispose()));
    await place.remove();
  });
});
