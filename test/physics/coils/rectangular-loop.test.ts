import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rectangularLoopInductance } from '../../../src/physics/coils/rectangular-loop.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/mpmath/rectangular-loop.json' with { type: 'json' };

const loop = (sideA_m: number, sideB_m: number, wireDiameter_m: number) =>
  rectangularLoopInductance({ shape: 'rectangular-loop', sideA_m, sideB_m, wireDiameter_m });

/** Grover's closed form for thin wire and uniform current, Inductance Calculations (1946), ch. 8. */
function grover_H(a: number, b: number, diameter: number): number {
  const rho = diameter / 2;
  const logarithms = a * Math.log((2 * a) / rho) + b * Math.log((2 * b) / rho);
  const mutual = 2 * Math.hypot(a, b) - a * Math.asinh(a / b) - b * Math.asinh(b / a);
  return (VACUUM_PERMEABILITY_H_PER_M / Math.PI) * (logarithms + mutual - 1.75 * (a + b));
}

describe('rectangle of round wire', () => {
  it('agrees with an independent evaluation, side ratio 1 to 1e6, wire/side 1e-9 to 0.9', () => {
    expect(reference.length).toBe(57);
    for (const [a, b, diameter, expected] of reference as [number, number, number, number][]) {
      const got = loop(a, b, diameter).inductance_H / (VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI));
      expect(Math.abs(got / expected - 1)).toBeLessThan(2e-14);
    }
  });

  it('gives the published constant of the square, (2µ0 s/π)[ln(s/ρ) + ρ/s − 0.524] (Rosa and Grover, NBS Paper 169)', () => {
    for (const ratio of [1e-3, 1e-5]) {
      const bracket = (loop(1, 1, 2 * ratio).inductance_H * Math.PI) / (2 * VACUUM_PERMEABILITY_H_PER_M);
      // The term ρ/s is theirs to the first digit only; it is left within the constant's last printed digit.
      expect(Math.abs(bracket - (Math.log(1 / ratio) + ratio - 0.524))).toBeLessThan(5e-4);
    }
  });

  it('gives the published high-frequency constant −0.77401 of the square with 1/4 for the inside (Grover 1946, ch. 8)', () => {
    const ratio = 1e-8;
    const bracket = (loop(1, 1, 2 * ratio).inductance_H * Math.PI) / (2 * VACUUM_PERMEABILITY_H_PER_M);
    expect(Math.abs(bracket - Math.log(1 / ratio) - 0.25 - -0.77401)).toBeLessThan(1.1e-5);
  });

  it('differs from Grover’s closed form by no more than it says corners do', () => {
    for (const [a, b] of [
      [1, 1],
      [1, 0.1],
      [1, 1e-3],
    ] as const) {
      for (const relative of [1e-6, 1e-3, 0.1, 0.5]) {
        const { inductance_H, method } = loop(a, b, b * relative);
        expect(Math.abs(grover_H(a, b, b * relative) / inductance_H - 1)).toBeLessThan(method.relativeError);
      }
    }
  });

  it('is symmetric, positive, grows with its sides and scales with its size', () => {
    const side = fc.double({ min: 1e-2, max: 1e4, noNaN: true });
    const share = fc.double({ min: 1e-9, max: 0.9, noNaN: true });
    fc.assert(
      fc.property(side, side, share, (a, b, relative) => {
        const diameter = relative * Math.min(a, b);
        const L = loop(a, b, diameter).inductance_H;
        expect(L).toBeGreaterThan(0);
        expect(Math.abs(loop(b, a, diameter).inductance_H / L - 1)).toBeLessThan(1e-14);
        expect(loop(a * 1.01, b, diameter).inductance_H).toBeGreaterThan(L);
        for (const scale of [1e9, 1e-9]) {
          const scaled = loop(a * scale, b * scale, diameter * scale).inductance_H / scale;
          expect(Math.abs(scaled / L - 1)).toBeLessThan(1e-13);
        }
      }),
      { seed: 2, numRuns: 100 },
    );
  });

  it('refuses a wire that fills the opening, by the side that is too short', () => {
    expect(() => loop(1, 0.01, 0.01)).toThrow('/sideB_m');
    expect(() => loop(0.01, 1, 0.02)).toThrow('/sideA_m');
  });
});
