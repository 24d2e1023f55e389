import { describe, expect, it } from 'vitest';
import { dowellRatio } from '../../../src/physics/losses/dowell.ts';
import reference from '../../fixtures/mpmath/winding-losses.json' with { type: 'json' };

describe("Dowell's ratio", () => {
  it('agrees with the published form at 120 digits to 1e-15, Δ from 1e-6 to 1e4 and 1 to 1000 layers', () => {
    expect(reference.dowell.length).toBeGreaterThan(350);
    for (const [delta, layers, exact] of reference.dowell as [number, number, number][]) {
      expect(Math.abs(dowellRatio(delta, layers) / exact - 1), `Δ = ${delta}, p = ${layers}`).toBeLessThan(1e-15);
    }
  });

  it('is 1.0142 for 4 layers at Δ = 0.3 (Dowell 1966; series in Hurley, Gath, Breslin 2000)', () => {
    expect(Math.abs(dowellRatio(0.3, 4) - 1.0142)).toBeLessThan(2e-4);
  });

  it('is 4/3 at the foil thickness of least loss, 10 layers (Hurley, Gath, Breslin, IEEE Trans. PE 15(2), 2000)', () => {
    // Loss over thickness goes as F/Δ: the resistance of the foil itself as 1/Δ.
    let optimum = 0;
    let least = Number.POSITIVE_INFINITY;
    for (let delta = 0.3; delta < 0.6; delta += 1e-4) {
      const loss = dowellRatio(delta, 10) / delta;
      if (loss < least) [least, optimum] = [loss, delta];
    }
    expect(Math.abs(optimum - (15 / (5 * 100 - 1)) ** 0.25)).toBeLessThan(2e-3);
    expect(Math.abs(dowellRatio(optimum, 10) - 4 / 3)).toBeLessThan(0.005);
  });

  it('is the average of one slab in the fields of its two sides, integrated over the thickness', () => {
    // Layer m of p carries I with fields (m−1)·I and m·I along its faces; the diffusion equation h″ = (2j/δ²)·h solved as
    // h = [H_low·sinh(γ(D−y)) + H_high·sinh(γy)]/sinh(γD), and ∫|h′|² dy by Simpson: J² and nothing of Dowell's algebra.
    for (const [delta, layers] of [
      [0.4, 3],
      [1.3, 2],
      [2.5, 4],
    ] as const) {
      let sum = 0;
      for (let m = 1; m <= layers; m++) sum += slabLoss(delta, m - 1, m);
      // Direct current spreads evenly: ∫ (I/Δ)² dy = 1/Δ for each layer.
      expect(Math.abs(sum / (layers / delta) / dowellRatio(delta, layers) - 1)).toBeLessThan(1e-11);
    }
  });

  it('never falls as Δ grows, whatever the layers', () => {
    for (const layers of [1, 1.5, 2, 5, 50]) {
      let previous = 1;
      for (let delta = 0.01; delta < 60; delta += 0.01) {
        const ratio = dowellRatio(delta, layers);
        expect(ratio).toBeGreaterThan(previous);
        previous = ratio;
      }
    }
  });

  it('is continuous where the method changes', () => {
    for (const at of [1, 20, 40]) {
      for (const layers of [1, 10]) {
        const step = dowellRatio(at * (1 + Number.EPSILON), layers) / dowellRatio(at * (1 - Number.EPSILON), layers);
        expect(Math.abs(step - 1)).toBeLessThan(5e-15);
      }
    }
  });

  it('has its limits: 1 at Δ = 0, 1 + (5p² − 1)Δ⁴/45 near it, (2p² + 1)Δ/3 far from it', () => {
    for (const layers of [1, 2, 7.5, 1000]) {
      for (const delta of [0, 1e-300, 1e-100, 1e-20, 1e-6]) expect(dowellRatio(delta, layers)).toBeCloseTo(1, 12);
      const delta = 0.02 / Math.sqrt(layers);
      const series = ((5 * layers * layers - 1) * delta ** 4) / 45;
      expect(Math.abs((dowellRatio(delta, layers) - 1) / series - 1)).toBeLessThan(1e-3);
      for (const far of [1e3, 1e9, 1e150]) {
        expect(Math.abs(dowellRatio(far, layers) / ((far * (2 * layers * layers + 1)) / 3) - 1)).toBeLessThan(1e-14);
      }
    }
  });
});

/** ∫₀^Δ |h′(y)|² dy of a slab Δ skin depths thick with real fields `low` and `high` along its faces. */
function slabLoss(thickness: number, low: number, high: number): number {
  // sinh and cosh of (1+j)y as [real, imaginary].
  const sinh = (y: number) => [Math.sinh(y) * Math.cos(y), Math.cosh(y) * Math.sin(y)] as const;
  const cosh = (y: number) => [Math.cosh(y) * Math.cos(y), Math.sinh(y) * Math.sin(y)] as const;
  const [sr, si] = sinh(thickness);
  const gradientSquared = (y: number) => {
    const [ar, ai] = cosh(thickness - y);
    const [br, bi] = cosh(y);
    const re = high * br - low * ar;
    const im = high * bi - low * ai;
    // |γ|² = 2
    return (2 * (re * re + im * im)) / (sr * sr + si * si);
  };
  const panels = 2000;
  let sum = gradientSquared(0) + gradientSquared(thickness);
  for (let i = 1; i < panels; i++) sum += (i % 2 ? 4 : 2) * gradientSquared((i * thickness) / panels);
  return (sum * thickness) / panels / 3;
}
