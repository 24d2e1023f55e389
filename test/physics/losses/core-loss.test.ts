import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import {
  coreLoss,
  cosinePowerIntegral,
  igseLossDensity_W_per_m3,
  type PiecewiseLinearFlux,
  steinmetzLossDensity_W_per_m3,
} from '../../../src/physics/losses/core-loss.ts';
import loops from '../../fixtures/igse/minor-loops.json' with { type: 'json' };
import reference from '../../fixtures/mpmath/winding-losses.json' with { type: 'json' };

const loss = { k: 1.3, alpha: 1.46, beta: 2.75 };
const flux = (phase: number[], fluxDensity_T: number[], frequency_Hz = 1e5): PiecewiseLinearFlux => ({
  frequency_Hz,
  phase,
  fluxDensity_T,
});
const relative = (a: number, b: number) => Math.abs(a / b - 1);

describe("Steinmetz's equation", () => {
  it('is k f^α B^β times the volume', () => {
    const sine = { frequency_Hz: 1e5, amplitude_T: 0.1 };
    // 10^(0 + 5·1.46 − 2.75)
    expect(relative(steinmetzLossDensity_W_per_m3(loss, sine), 1.3 * 10 ** 4.55)).toBeLessThan(1e-13);
    expect(relative(coreLoss({ volume_m3: 2e-6, loss }, sine).power_W, 2e-6 * 1.3 * 10 ** 4.55)).toBeLessThan(1e-13);
    expect(coreLoss({ volume_m3: 2e-6, loss }, { ...sine, amplitude_T: 0 }).power_W).toBe(0);
  });
});

describe('∫|cos θ|^α over a turn', () => {
  it('agrees with the Beta function at 50 digits to 2e-15, α from 0.01 to 100', () => {
    for (const [alpha, exact] of reference.cosinePower as [number, number][]) {
      expect(relative(cosinePowerIntegral(alpha), exact), `α = ${alpha}`).toBeLessThan(2e-15);
    }
  });

  it('is 2π, 4, π and 8/3 at 0, 1, 2 and 3', () => {
    expect(relative(cosinePowerIntegral(0), 2 * Math.PI)).toBeLessThan(2e-15);
    expect(relative(cosinePowerIntegral(1), 4)).toBeLessThan(2e-15);
    expect(relative(cosinePowerIntegral(2), Math.PI)).toBeLessThan(2e-15);
    expect(relative(cosinePowerIntegral(3), 8 / 3)).toBeLessThan(2e-15);
  });
});

describe('improved generalised Steinmetz equation', () => {
  it('has k_i/(k·2^−β) = 0.32276 at α = 1.5 (Venkatachalam et al., IEEE COMPEL 2002)', () => {
    // A symmetrical triangle of 1 T peak to peak at 1 Hz has |dB/dt| = 2 T/s throughout: P = k_i·2^α.
    for (const beta of [2, 2.5, 3]) {
      const density = igseLossDensity_W_per_m3({ k: 1, alpha: 1.5, beta }, flux([0, 0.5], [0, 1], 1));
      expect(Math.abs((density / 2 ** 1.5) * 2 ** beta - 0.32276)).toBeLessThan(5e-6);
    }
  });

  it('equals Steinmetz for a sine: to 1e-9 with its samples refined to none (by construction, COMPEL 2002)', () => {
    for (const parameters of [
      { k: 2, alpha: 1.4, beta: 2.6 },
      loss,
      { k: 1, alpha: 2, beta: 2 },
      { k: 1, alpha: 1.05, beta: 3 },
    ]) {
      const exact = steinmetzLossDensity_W_per_m3(parameters, { frequency_Hz: 1e5, amplitude_T: 0.2 });
      const sampled = (n: number) => {
        const phase = Array.from({ length: n }, (_, i) => i / n);
        return igseLossDensity_W_per_m3(
          parameters,
          flux(
            phase,
            phase.map((p) => 0.2 * Math.sin(2 * Math.PI * p)),
          ),
        );
      };
      expect(relative(sampled(1e5), exact)).toBeLessThan(1e-7);
      // Chords fall short by a/n² (+ b/n^(1+α) where the slope passes zero): two Richardson steps take both away.
      const orders = [2, 1 + parameters.alpha];
      let row = [4000, 8000, 16000].map(sampled);
      for (const order of orders) row = row.slice(1).map((finer, i) => finer + (finer - row[i]!) / (2 ** order - 1));
      expect(relative(row[0]!, exact)).toBeLessThan(1e-9);
    }
  });

  it('has the closed form of a triangle with any duty, and of a trapezium with rests', () => {
    const { k, alpha, beta } = loss;
    const ki = k / ((2 * Math.PI) ** (alpha - 1) * cosinePowerIntegral(alpha) * 2 ** (beta - alpha));
    for (const duty of [0.5, 0.1, 0.01, 0.999]) {
      const expected = ki * 1e5 ** alpha * 0.3 ** beta * (duty ** (1 - alpha) + (1 - duty) ** (1 - alpha));
      expect(relative(igseLossDensity_W_per_m3(loss, flux([0, duty], [-0.1, 0.2])), expected)).toBeLessThan(1e-13);
    }
    const trapezium = igseLossDensity_W_per_m3(loss, flux([0, 0.2, 0.5, 0.7, 1], [0, 0.3, 0.3, 0, 0]));
    expect(relative(trapezium, ki * 1e5 ** alpha * 0.3 ** beta * 2 * 0.2 ** (1 - alpha))).toBeLessThan(1e-13);
  });

  it('splits minor loops as the published recursion does, to 1e-14, up to 80 points', () => {
    expect(loops.cases.length).toBeGreaterThan(30);
    for (const [alpha, beta, phase, value, density] of loops.cases as [number, number, number[], number[], number][]) {
      const ours = igseLossDensity_W_per_m3({ k: 1, alpha, beta }, flux(phase, value, 1));
      expect(relative(ours, density), `${phase.length} points`).toBeLessThan(1e-14);
    }
  });

  it('gives a minor loop its own peak-to-peak: a ripple within a swing costs what each would on its own', () => {
    // Rise 0 → 0.6, dip to 0.5, on to 1, back to 0; all slopes 1 in this unit of time.
    const times = [0, 0.6, 0.7, 1.2, 2.2];
    const value = [0, 0.6, 0.5, 1, 0];
    const phase = times.map((t) => t / 2.2);
    const whole = igseLossDensity_W_per_m3(loss, flux(phase, value, 1 / 2.2));
    const triangle = (span: number) => igseLossDensity_W_per_m3(loss, flux([0, 0.5], [0, span], 1 / (2 * span)));
    expect(relative(whole, (triangle(1) * 2 + triangle(0.1) * 0.2) / 2.2)).toBeLessThan(1e-13);
  });

  it('costs nothing where nothing changes', () => {
    expect(igseLossDensity_W_per_m3(loss, flux([0, 0.5, 1], [0.2, 0.2, 0.2]))).toBe(0);
    expect(igseLossDensity_W_per_m3(loss, flux([0, 1], [0.2, 0.2]))).toBe(0);
  });

  it('takes loops nested a hundred thousand deep', () => {
    const n = 200_000;
    const phase = Array.from({ length: n }, (_, i) => i / n);
    const spiral = phase.map((p, i) => (i % 2 ? 1 : -1) * (1 - p));
    const density = igseLossDensity_W_per_m3(loss, flux(phase, spiral));
    expect(density).toBeGreaterThan(0);
    expect(Number.isFinite(density)).toBe(true);
  });

  describe('for random waveforms, with levels met more than once', () => {
    const waveform = fc
      .array(fc.tuple(fc.integer({ min: 1, max: 20 }), fc.integer({ min: -4, max: 4 })), {
        minLength: 3,
        maxLength: 25,
      })
      .filter((points) => new Set(points.map(([, b]) => b)).size > 1)
      .map((points) => {
        const total = points.reduce((sum, [t]) => sum + t, 0);
        let at = 0;
        const phase = points.map(([t]) => {
          const start = at / total;
          at += t;
          return start;
        });
        return { phase, value: points.map(([, b]) => b / 10) };
      });
    const check = (property: (phase: number[], value: number[], density: number) => void) =>
      fc.assert(
        fc.property(waveform, ({ phase, value }) =>
          property(phase, value, igseLossDensity_W_per_m3(loss, flux(phase, value))),
        ),
        { seed: 7, numRuns: 300 },
      );

    it('the loss does not depend on the sign, the level or where the period begins', () => {
      check((phase, value, density) => {
        const same = (p: number[], b: number[]) =>
          expect(relative(igseLossDensity_W_per_m3(loss, flux(p, b)), density)).toBeLessThan(1e-11);
        same(
          phase,
          value.map((b) => -b),
        );
        same(
          phase,
          value.map((b) => b + 0.7),
        );
        const cut = Math.floor(phase.length / 2);
        const turned = [
          ...phase.slice(cut).map((p) => p - phase[cut]!),
          ...phase.slice(0, cut).map((p) => p + 1 - phase[cut]!),
        ];
        same(turned, [...value.slice(cut), ...value.slice(0, cut)]);
      });
    });

    it('nor on points added along the straight lines, or on the period closed by hand', () => {
      check((phase, value, density) => {
        const denser: number[] = [];
        const along: number[] = [];
        phase.forEach((p, i) => {
          const next = phase[i + 1] ?? 1;
          denser.push(p, p + (next - p) / 2);
          along.push(value[i]!, (value[i]! + (value[i + 1] ?? value[0]!)) / 2);
        });
        for (const [p, b] of [
          [denser, along],
          [
            [...phase, 1],
            [...value, value[0]!],
          ],
        ] as const) {
          expect(relative(igseLossDensity_W_per_m3(loss, flux([...p], [...b])), density)).toBeLessThan(1e-11);
        }
      });
    });

    it('scales as f^α and B^β, over 1e9 and 1e-9', () => {
      check((phase, value, density) => {
        for (const s of [1e9, 1e-9]) {
          const larger = igseLossDensity_W_per_m3(
            loss,
            flux(
              phase,
              value.map((b) => b * s),
            ),
          );
          expect(relative(larger, density * s ** loss.beta)).toBeLessThan(1e-11);
          const faster = igseLossDensity_W_per_m3(loss, flux(phase, value, 1e5 * s));
          expect(relative(faster, density * s ** loss.alpha)).toBeLessThan(1e-11);
        }
      });
    });
  });

  it.each<[string, PiecewiseLinearFlux, string]>([
    ['one point', flux([0], [0.1]), '/phase'],
    ['no points', flux([], []), '/phase'],
    ['more flux densities than phases', flux([0, 0.5], [0, 0.1, 0]), '/fluxDensity_T'],
    ['a phase below 0', flux([-0.1, 0.5], [0, 0.1]), '/phase/0'],
    ['a phase above 1', flux([0, 1.1], [0, 0.1]), '/phase/1'],
    ['a phase twice', flux([0, 0.5, 0.5], [0, 0.1, 0.2]), '/phase/2'],
    ['phases going back', flux([0, 0.5, 0.4], [0, 0.1, 0.2]), '/phase/2'],
    ['a period that does not close', flux([0, 0.5, 1], [0, 0.1, 1e-3]), '/fluxDensity_T/2'],
  ])('refuses %s', (_name, bad, pointer) => {
    expect(() => igseLossDensity_W_per_m3(loss, bad)).toThrow(InvalidQuantity);
    expect(() => igseLossDensity_W_per_m3(loss, bad)).toThrow(`${pointer}:`);
  });

  it('forgives what rounding leaves of a closed period', () => {
    const closed = igseLossDensity_W_per_m3(loss, flux([0, 0.5, 1], [0, 0.1, 0]));
    expect(igseLossDensity_W_per_m3(loss, flux([0, 0.5, 1], [0, 0.1, 1.2e-17]))).toBe(closed);
  });
});
