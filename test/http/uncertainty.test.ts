import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { useService } from '../support/service.ts';

const api = useService();
const post = (path: string, body: object) => request(api.server).post(path).send(body);

// ½·L·I²: the relative variance is that of L plus four times that of I.
const energy = {
  inductor: { inductance_H: 2e-3 },
  current_A: 10,
  uncertainty: { '/inductor/inductance_H': 2e-5, '/current_A': 0.05 },
};
const expected = { energy_J: 0.1, standardUncertainty: 0.1 * Math.hypot(0.01, 2 * 0.005) };

describe('uncertainty of a calculation', () => {
  it('is propagated to each main output, with each input’s share', async () => {
    const { body } = await post('/v1/energy', energy).expect(200);
    const { standardUncertainty, contributions } = body.uncertainty.outputs.energy_J;
    expect(standardUncertainty / expected.standardUncertainty).toBeCloseTo(1, 8);
    expect(
      contributions.map(({ pointer, share }: { pointer: string; share: number }) => [
        pointer,
        Number(share.toFixed(9)),
      ]),
    ).toEqual([
      ['/inductor/inductance_H', 0.5],
      ['/current_A', 0.5],
    ]);
    for (const output of Object.values(body.uncertainty.outputs) as {
      standardUncertainty: number;
      contributions: { share: number }[];
    }[]) {
      const sum = output.contributions.reduce((total, { share }) => total + share, 0);
      expect(sum).toBeCloseTo(output.standardUncertainty > 0 ? 1 : 0, 9);
    }
  });

  it('agrees by Monte Carlo, repeats with the seed and changes with it', async () => {
    const simulated = { ...energy, method: 'monte-carlo', trials: 200_000, seed: 7 };
    const [first, again, other] = await Promise.all(
      [simulated, simulated, { ...simulated, seed: 8 }].map((body) => post('/v1/energy', body)),
    );
    const { energy_J } = first!.body.uncertainty.outputs;
    // The standard deviation of a standard deviation over n trials is 1/√(2n) of it: 0.16 %; five of these.
    expect(Math.abs(energy_J.standardUncertainty / expected.standardUncertainty - 1)).toBeLessThan(0.008);
    expect(Math.abs(energy_J.mean - expected.energy_J)).toBeLessThan(5e-3 * expected.standardUncertainty + 1e-5);
    expect(energy_J.symmetric.upper - energy_J.symmetric.lower).toBeCloseTo(2 * 1.96 * expected.standardUncertainty, 4);
    expect(again!.body).toEqual(first!.body);
    expect(other!.body.uncertainty.outputs.energy_J.mean).not.toBe(energy_J.mean);
  });

  it.each(['first-order', 'monte-carlo'])('names a pointer that leads to no number, %s', async (method) => {
    const { body, status } = await post('/v1/energy', { ...energy, method, uncertainty: { '/inductor/turns': 1 } });
    expect([status, body.errors[0].pointer]).toEqual([422, '/uncertainty/~1inductor~1turns']);
  });

  it('refuses an uncertainty that leaves the model, rather than answer with half of the trials', async () => {
    const coil = { shape: 'solenoid', turns: 10, diameter_m: 0.01, length_m: 0.01 };
    const body = { coil, uncertainty: { '/coil/diameter_m': 0.02 }, method: 'monte-carlo', trials: 10_000 };
    const answer = await post('/v1/inductance', body);
    expect([answer.status, answer.body.errors[0].pointer.startsWith('/uncertainty')]).toEqual([422, true]);
  });

  it('reaches an approval’s checks: tolerances that straddle the limit leave it open', async () => {
    const toroid = {
      shape: 'toroid',
      section: 'rectangle',
      turns: 400,
      innerDiameter_m: 0.05,
      outerDiameter_m: 0.09,
      height_m: 0.03,
    };
    const inductance = (4e-7 * Math.PI * 400 ** 2 * 0.03 * Math.log(9 / 5)) / (2 * Math.PI);
    const body = {
      part: {
        number: 'LG-T-1',
        revision: 'A',
        construction: { coil: toroid },
        drawing: { inductance: { nominal_H: inductance, lower_H: inductance * 0.96, upper_H: inductance * 1.04 } },
      },
      duty: { peakCurrent_A: 1 },
    };
    const sharp = await post('/v1/approvals', body);
    expect(sharp.body.verdict).toBe('approve');
    const blurred = await post('/v1/approvals', {
      ...body,
      uncertainty: { '/part/construction/coil/height_m': 0.001 },
    });
    const [check] = blurred.body.checks;
    expect([blurred.body.verdict, check.outcome]).toEqual(['refer', 'inconclusive']);
    expect(check.observed.standardUncertainty / (inductance / 30)).toBeCloseTo(1, 1);
  });
});
